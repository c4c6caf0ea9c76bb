import { date, period, shortDate } from './dates.ts'
import { levelLabel } from './labels.ts'
import { change, count, interval, number, points, probability, probabilityBand, probabilityFigure, share, shareInColumn, size, sizeInterval } from './numbers.ts'
import type { WordArgument, Words } from './words.ts'

/** What a form is made from. */
export type Kind = 'number' | 'string' | 'estimate' | 'list' | 'level' | 'any'

export interface Form {
  readonly from: Kind
  /** The value has been found to be of the kind `from`, or is null. */
  readonly write: (value: never, words: Words) => WordArgument
}

const ofNumber = (write: (value: number, words: Words) => WordArgument): Form => ({ from: 'number', write })
const ofString = (write: (value: string, words: Words) => WordArgument): Form => ({ from: 'string', write })
const ofBounds = (write: (value: Bounds, words: Words) => WordArgument): Form => ({ from: 'estimate', write })
const ofList = (write: (value: readonly unknown[], words: Words) => WordArgument): Form => ({ from: 'list', write })

interface Bounds { readonly low: number, readonly high: number }

/** Every form that a figure can take; a template names one by `as`. */
export const forms = {
  points: ofNumber((value, words) => points(value, words.locale)),
  change: ofNumber((value, words) => change(value, words.locale)),
  size: ofNumber(size),
  count: ofNumber((value, words) => count(value, words.locale)),
  number: ofNumber((value, words) => number(value, words.locale)),
  share: ofNumber((value, words) => share(value, words.locale)),
  'column-share': ofNumber((value, words) => shareInColumn(value, words.locale)),
  probability: ofNumber(probability),
  'probability-words': ofNumber((value, words) => words.say('probability-words', { band: probabilityBand(value) })),
  'probability-figure': ofNumber(probabilityFigure),
  /** For choosing a case: `up`, `down`, or `flat` where one decimal shows nothing. */
  sign: ofNumber(signOf),
  /** The bare number, for plurals and exact cases. */
  plain: ofNumber((value) => value),
  interval: ofBounds((value, words) => interval(value, points, words)),
  'change-interval': ofBounds((value, words) => interval(value, change, words)),
  'size-interval': ofBounds(sizeInterval),
  date: ofString((value, words) => date(value, words.locale)),
  'short-date': ofString((value, words) => shortDate(value, words.locale)),
  period: ofString(period),
  /** A number that names something, ungrouped: a seed. */
  digits: ofNumber((value) => String(value)),
  text: ofString((value) => value),
  /** A factor's name: `venue` is worded, one that the account adds stays as it is. */
  factor: ofString(factorName),
  /** The factor that a part of a decomposition is the mix of: `segment_mix` is that of segment. */
  'mix-factor': ofString((value, words) => factorName(value.replace(/_mix$/, ''), words)),
  /** A value of the findings that chooses a case of a message: text, truth or nothing (`none`); ICU allows no hyphen there. */
  code: { from: 'any', write: (value: unknown) => value === null || value === undefined ? 'none' : String(value).replaceAll('-', '_') } satisfies Form,
  /** The label of a venue, topic, poster class or other level. */
  label: { from: 'level', write: (value: Parameters<typeof levelLabel>[0], words: Words) => levelLabel(value, words) } satisfies Form,
  list: ofList((value, words) => new Intl.ListFormat(words.locale, { style: 'long', type: 'conjunction' }).format(value.map(String))),
  length: ofList((value) => value.length),
} as const satisfies Readonly<Record<string, Form>>

export type FormName = keyof typeof forms
export const formNames = Object.keys(forms) as readonly FormName[]

export function isFormName(name: string): name is FormName {
  return Object.hasOwn(forms, name)
}

function factorName(factor: string, words: Words): string {
  return words.has(`factor-${factor}`) ? words.say(`factor-${factor}`) : factor
}

/** What one decimal shows of a number's direction. */
export function signOf(value: number): 'up' | 'down' | 'flat' {
  if (Math.abs(value) < 0.05) return 'flat'
  return value > 0 ? 'up' : 'down'
}

/**
 * Write a value of the findings in a form.
 *
 * @returns the wording of "not known" where the value is null or not of the form's kind; so it is total
 */
export function write(value: unknown, form: FormName, words: Words): WordArgument {
  const { from, write: toWords } = forms[form]
  return fits(value, from) ? toWords(value as never, words) : words.say('not-known')
}

function fits(value: unknown, kind: Kind): boolean {
  if (kind === 'any') return true
  if (kind === 'list') return Array.isArray(value)
  if (kind === 'number' || kind === 'string') return typeof value === kind
  if (typeof value !== 'object' || value === null) return false
  return kind === 'estimate' ? 'low' in value && 'high' in value : 'label' in value
}
