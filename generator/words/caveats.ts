import type { FormName } from './forms.ts'
import { write } from './forms.ts'
import { levelLabel } from './labels.ts'
import type { WordArgument, Words } from './words.ts'

/** How each figure of a caveat is written, by its name. */
const formOf: Readonly<Record<string, FormName>> = {
  share: 'share', from: 'share', to: 'share', correlation: 'number', pareto_k: 'number', ess: 'count',
  raw_change: 'change', change: 'change', first: 'date', last: 'date', factor: 'factor',
  mentions: 'plain', authors: 'plain', steps: 'plain', count: 'plain', least: 'plain', most: 'count',
  correction: 'change', gap: 'change', reason: 'code', now: 'points', base: 'points', usual: 'count', unreached: 'plain', slope: 'number-size', shift: 'number',
  pairs: 'plain', needed: 'plain', waves: 'plain', hidden: 'plain', flagged: 'plain', observed: 'measure', expected: 'measure',
  typical: 'size', half: 'points', of: 'code', part: 'definition', after: 'period', before: 'period', bridged: 'code', late: 'plain', gone: 'plain', periods: 'plain',
}

/** Forms of texts; what is a text where its name is that of a number stays as it is. */
const textForms: readonly FormName[] = ['factor', 'code', 'definition', 'period']

export const caveatParts = ['title', 'evidence', 'meaning', 'remedy'] as const
export type CaveatPart = (typeof caveatParts)[number]

/** A caveat's figures as arguments of its messages; the sign of a change (`raw_change_sign`) chooses cases. */
export function caveatArguments(figures: Readonly<Record<string, string | number>>, words: Words): Record<string, WordArgument> {
  return Object.fromEntries(Object.entries(figures).flatMap(([name, value]) => {
    const written = [name, writeFigure(name, value, words, String(figures['kind'] ?? ''))] as const
    return name.endsWith('change') && typeof value === 'number' ? [written, [`${name}_sign`, write(value, 'sign', words)] as const] : [written]
  }))
}

/** Dates are written by the form of dates, numbers by the form of their name, a survey's by its `kind`, a level as tables name it, all else as it stands. */
function writeFigure(name: string, value: string | number, words: Words, kind: string): WordArgument {
  const form = formOf[name]
  if (typeof value === 'number') return write(value, form === undefined || form === 'factor' || form === 'date' ? 'number' : form, words, kind)
  if (name === 'level') return levelLabel({ label: value, level: value }, words)
  if (form === 'date' && /^\d{4}-\d{2}-\d{2}$/.test(value)) return write(value, 'date', words)
  return form !== undefined && textForms.includes(form) ? write(value, form, words) : value
}

/**
 * Word a caveat from its code and its figures: what was seen, what it means, what mends it.
 *
 * @throws {Error} for a code or a figure that the catalogue doesn't know, which is a fault of the program
 */
export function wordCaveat(
  words: Words, code: string, figures: Readonly<Record<string, string | number>>,
): { readonly evidence: string, readonly meaning: string, readonly remedy: string } {
  const args = caveatArguments(figures, words)
  const say = (part: CaveatPart) => words.say(`caveat-${code}-${part}`, args)
  return { evidence: say('evidence'), meaning: say('meaning'), remedy: say('remedy') }
}
