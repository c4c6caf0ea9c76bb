import { write, type FormName } from './forms.ts'
import type { WordArgument, Words } from './words.ts'

/** How each figure of a piece of advice is written, by its name: widths are those of whole intervals and are worded as plus or minus half. */
const formOf: Readonly<Record<string, FormName>> = {
  authors: 'plain', heard: 'plain', width_before: 'half-width', width_after: 'half-width', width: 'half-width', cost: 'count',
  alone: 'plain', talk: 'share', importance: 'share', customers: 'share', share: 'share', extremes: 'share', effective_before: 'count', effective_after: 'count',
  waves: 'plain', waves_now: 'plain', interviews: 'plain', interviews_now: 'plain', correlation: 'number', codings: 'plain', per_venue: 'plain', needed: 'plain',
}

/** Of a segment `heard` is a share of the authors; of a venue it counts them. */
const formsOfCode: Readonly<Record<string, Readonly<Record<string, FormName>>>> = { 'hear-segment': { heard: 'share' } }

export const adviceParts = ['action', 'evidence', 'success'] as const
export type AdvicePart = (typeof adviceParts)[number]

type Figures = Readonly<Record<string, number | string>>

/** Figures of which 0 says that there is nothing to tell: `has_correlation` is then `no`. */
const nothingAtZero = ['correlation', 'extremes', 'alone'] as const

/** A piece's figures as arguments of its messages; `narrows` tells whether the two widths differ as they are written. */
export function adviceArguments(code: string, figures: Figures, words: Words): Record<string, WordArgument> {
  const written = Object.fromEntries(Object.entries(figures).map(([name, value]) => (
    [name, typeof value === 'string' ? value : write(value, formsOfCode[code]?.[name] ?? formOf[name] ?? 'number', words)] as const
  )))
  const has = Object.fromEntries(nothingAtZero.filter((name) => name in figures).map((name) => [`has_${name}`, figures[name] === 0 ? 'no' : 'yes']))
  const narrows = 'width_before' in written ? { narrows: written['width_before'] === written['width_after'] ? 'no' : 'yes' } : {}
  return { ...written, ...has, ...narrows }
}

/**
 * Word a piece of advice from its code and its figures: what to do, what it rests on, how the next period will show whether it worked.
 *
 * @throws {Error} for a code or a figure that the catalogue doesn't know, which is a fault of the program
 * @example wordAdvice(words, 'invite-everyone', { extremes: 0.61 }).action // => 'Invite everyone ...'
 */
export function wordAdvice(words: Words, code: string, figures: Figures): Readonly<Record<AdvicePart, string>> {
  const args = adviceArguments(code, figures, words)
  const say = (part: AdvicePart) => words.say(`advice-${code}-${part}`, args)
  return { action: say('action'), evidence: say('evidence'), success: say('success') }
}
