import type { Unit } from '../../model/findings/parts-schema.ts'
import { date, days, period, shortDate, when } from './dates.ts'
import { factorName, levelLabel, partName } from './labels.ts'
import { measure, measureChange, measureInterval, measureSize, steps } from './measures.ts'
import { change, count, countRange, interval, minorShare, number, pValue, points, probability, probabilityBand, probabilityFigure, share, size, sizeInterval, sizeRange, tinyNumber } from './numbers.ts'
import type { WordArgument, Words } from './words.ts'

/** What a form is made from. */
export type Kind = 'number' | 'string' | 'estimate' | 'list' | 'level' | 'shift' | 'span' | 'restatable' | 'fieldwork' | 'event' | 'spans' | 'any'

export interface Form {
  readonly from: Kind
  /** Whether its figure is counted in a unit that another one names. */
  readonly needsUnit?: true
  /** What its figure, its bounds or its items may be counted in; absent: anything. */
  readonly takes?: readonly Unit[]
  /** The value has been found to be of the kind `from`, or is null; `unit` is what another figure says it is counted in, else empty. */
  readonly write: (value: never, words: Words, unit: string) => WordArgument
}

const ofNumber = (write: (value: number, words: Words) => WordArgument, takes?: readonly Unit[]): Form => ({ from: 'number', write, ...(takes && { takes }) })
const ofString = (write: (value: string, words: Words) => WordArgument): Form => ({ from: 'string', write })
const ofBounds = (write: (value: Bounds, words: Words) => WordArgument, takes?: readonly Unit[]): Form => ({ from: 'estimate', write, ...(takes && { takes }) })
const ofMeasure = (write: (value: number, unit: string, words: Words) => WordArgument, takes: readonly Unit[] = ['metric']): Form => ({ from: 'number', needsUnit: true, takes, write: (value: number, words: Words, unit: string) => write(value, unit, words) })
const ofMeasures = (format: typeof measure): Form => ({ from: 'estimate', needsUnit: true, takes: ['metric'], write: (value: Bounds, words: Words, unit: string) => measureInterval(value, unit, format, words) })
const ofList = (write: (value: readonly unknown[], words: Words) => WordArgument, takes?: readonly Unit[]): Form => ({ from: 'list', write, ...(takes && { takes }) })

/** Scores and percentages of 100 are written alike: with one decimal, and without a unit. */
const hundredths: readonly Unit[] = ['points', 'percent']
const counts: readonly Unit[] = ['count', 'steps', 'days']
/** A plain decimal says nothing wrong of these, though another form may say it better. */
const decimals: readonly Unit[] = ['number', 'points', 'percent', 'share', 'probability', 'p', 'metric']

interface Bounds { readonly low: number, readonly high: number }
interface Spans { readonly best_lag: number, readonly span_days: number }
interface Restatable { readonly previous: Level, readonly previous_sealed: Level }
interface Level { readonly mean: number }
interface Shift { readonly share_from: number, readonly share_to: number }

/** Every form that a figure can take; a template names one by `as`. */
export const forms = {
  points: ofNumber((value, words) => points(value, words.locale), hundredths),
  change: ofNumber((value, words) => change(value, words.locale), hundredths),
  size: ofNumber(size, hundredths),
  count: ofNumber((value, words) => count(value, words.locale), counts),
  number: ofNumber((value, words) => number(value, words.locale), decimals),
  'tiny-number': ofNumber((value, words) => tinyNumber(value, words.locale), decimals),
  /** Half the width of an interval, for `plus or minus`: 3.6 is `1.80`. */
  'half-width': ofNumber((value, words) => number(value / 2, words.locale), ['points']),
  share: ofNumber(share, ['share', 'probability', 'p']),
  /** A share that is told as being below 5%. */
  'minor-share': ofNumber(minorShare, ['share']),
  probability: ofNumber(probability, ['probability']),
  'probability-words': ofNumber((value, words) => words.say('probability-words', { band: probabilityBand(value) }), ['probability']),
  'probability-figure': ofNumber(probabilityFigure, ['probability']),
  /** How large a small figure is, without its sign: `0.13`. */
  'number-size': ofNumber((value, words) => number(Math.abs(value), words.locale), decimals),
  /** For choosing a case: `up`, `down`, or `flat` where one decimal shows nothing. */
  sign: ofNumber(signOf),
  /** The bare number, for plurals and exact cases. */
  plain: ofNumber((value) => value, counts),
  interval: ofBounds((value, words) => interval(value, points, words), hundredths),
  'change-interval': ofBounds((value, words) => interval(value, change, words), hundredths),
  'size-interval': ofBounds(sizeInterval, hundredths),
  /** A metric of the survey; needs `unit`, the path to its kind: a share in percent or a mean. */
  measure: ofMeasure((value, unit, words) => measure(value, unit, words.locale)),
  'measure-change': ofMeasure((value, unit, words) => measureChange(value, unit, words.locale)),
  'measure-size': ofMeasure((value, unit, words) => measureSize(value, unit, words.locale)),
  'measure-interval': ofMeasures(measure),
  'measure-change-interval': ofMeasures(measureChange),
  /** Steps of the grid, without sign; needs `unit`, the path to the grid. */
  steps: ofMeasure(steps, ['steps']),
  'number-interval': ofBounds((value, words) => interval(value, number, words), decimals),
  'p-value': ofNumber(pValue, ['p']),
  /** For choosing a case: whether chance is a poor explanation (`clear`, p at most 0.05, the level of the verdict's rule) or may do (`open`). */
  chance: ofNumber((p) => (p <= 0.05 ? 'clear' : 'open'), ['p']),
  /** What an interval leaves outside: 0.90 leaves `10%`. */
  outside: ofNumber((value, words) => share(1 - value, words), ['share']),
  /** Something that goes with 10 points, as it goes with 1: `+0.21`. */
  'per-point': ofNumber((value, words) => measureChange(value / 10, 'mean', words.locale), ['percent']),
  'per-point-size': ofNumber((value, words) => measureSize(value / 10, 'mean', words.locale), ['percent']),
  'per-point-interval': ofBounds(({ low, high }, words) => measureInterval({ low: low / 10, high: high / 10 }, 'mean', measureChange, words), ['percent']),
  /** How long after opinion the outcome follows: in months where its spans are months, else in days. */
  'span-lag': { from: 'spans', write: (value: Spans, words: Words) => spanLag(value, words) } satisfies Form,
  /** For choosing a case: whether a ratio lies above 1 (`up`), below (`down`) or is 1 (`flat`); exact, since a verdict rests on it. */
  'ratio-sign': ofNumber((value) => (value === 1 ? 'flat' : value > 1 ? 'up' : 'down'), ['number']),
  date: ofString((value, words) => date(value, words.locale)),
  'short-date': ofString((value, words) => shortDate(value, words.locale)),
  period: ofString(period),
  /** A period as an adverb of time, with its preposition: `in October 2026`. */
  when: ofString(when),
  /** A stretch of days. */
  days: { from: 'span', write: (value: Parameters<typeof days>[0], words: Words) => days(value, words.locale) } satisfies Form,
  /** Days of a wave's fieldwork. */
  fieldwork: { from: 'fieldwork', write: (value: { readonly field_start: string, readonly field_end: string }, words: Words) => days({ start: value.field_start, end: value.field_end }, words.locale) } satisfies Form,
  /** Something that happened, with its day. */
  event: { from: 'event', write: (value: { readonly label: string, readonly date: string }, words: Words) => words.say('event', { label: value.label, date: date(value.date, words.locale) }) } satisfies Form,
  /** A number that names something, ungrouped: a seed. */
  digits: ofNumber((value) => String(value), counts),
  text: ofString((value) => value),
  /** A name at the start of a line: with a capital, as levels are written in tables. */
  name: ofString((value, words) => levelLabel({ label: value }, words)),
  /** A factor's name: `venue` is worded, one that the account adds stays as it is. */
  factor: ofString(factorName),
  /** A part of a decomposition, as tables and charts name it. */
  part: ofString(partName),
  /** The factor that a part of a decomposition is the mix of: `segment_mix` is that of segment. */
  'mix-factor': ofString((value, words) => factorName(value.replace(/_mix$/, ''), words)),
  /** A part of what the figures mean: `target_mix` is `the fixed mix`. */
  definition: ofString((value, words) => words.say(`definition-${value}`)),
  /** A value of the findings that chooses a case of a message: text, truth or nothing (`none`); ICU allows no hyphen there. */
  code: { from: 'any', write: (value: unknown) => value === null || value === undefined ? 'none' : String(value).replaceAll('-', '_') } satisfies Form,
  /** The label of a venue, topic, poster class or other level. */
  label: { from: 'level', write: (value: Parameters<typeof levelLabel>[0], words: Words) => levelLabel(value, words) } satisfies Form,
  /** Of a level whose share moved: `up`, `down`, or `flat` where whole percentages show nothing. */
  'share-direction': { from: 'shift', write: ({ share_from: from, share_to: to }: Shift) => shareDirection(from, to) } satisfies Form,
  /** For choosing a case: `yes` where the period before stands otherwise now than it was sealed, as one decimal shows; else `no`. */
  restated: { from: 'restatable', write: (value: Restatable, words: Words) => (isRestated(value, words.locale) ? 'yes' : 'no') } satisfies Form,
  /** Smallest to largest size in a list of numbers. */
  'size-range': ofList((value, words) => sizeRange(value.filter((item) => typeof item === 'number'), words), hundredths),
  /** The sum of a list of changes: `+0.5`. */
  'sum-change': ofList((value, words) => change(value.reduce<number>((sum, item) => (typeof item === 'number' ? sum + item : sum), 0), words.locale), hundredths),
  /** Smallest to largest of a list of counts: `382 to 417`. */
  'count-range': ofList((value, words) => countRange(value.filter((item) => typeof item === 'number'), words), counts),
  list: ofList((value, words) => joined(value.map(String), words.locale)),
  length: ofList((value) => value.length),
} as const satisfies Readonly<Record<string, Form>>

export type FormName = keyof typeof forms
export const formNames = Object.keys(forms) as readonly FormName[]

/** The forms that can write what is made from `kind` and counted in `unit`, those made for that unit first. */
export function formsFor(kind: string, unit: string): readonly FormName[] {
  const all: Readonly<Record<string, Form>> = forms
  const breadth = (name: FormName) => all[name]?.takes?.length ?? Infinity
  return formNames.filter((name) => all[name]?.from === kind && takesUnit(name, unit) && breadth(name) < Infinity).sort((a, b) => breadth(a) - breadth(b))
}

/** Whether a figure counted in `unit` can be written in a form. */
export function takesUnit(name: FormName, unit: string): boolean {
  const { takes }: Form = forms[name]
  return takes === undefined || takes.some((taken) => taken === unit)
}

/** Whether a form asks what its figure is counted in. */
export function needsUnit(name: FormName): boolean {
  const form: Form = forms[name]
  return form.needsUnit === true
}

export function isFormName(name: string): name is FormName {
  return Object.hasOwn(forms, name)
}

/** In a row; items that hold a comma, such as figures of most languages, are parted by semicolons. */
function joined(items: readonly string[], locale: string): string {
  const between = items.some((item) => item.includes(',')) ? ';' : ','
  const parts = new Intl.ListFormat(locale, { style: 'long', type: 'conjunction' }).formatToParts(items)
  return parts.map(({ type, value }) => (type === 'literal' ? value.replace(',', between) : value)).join('')
}

function shareDirection(from: number, to: number): 'up' | 'down' | 'flat' {
  if (Math.round(100 * from) === Math.round(100 * to)) return 'flat'
  return to > from ? 'up' : 'down'
}

/** At least half of the last digit shown, and shown: 24.04 and 24.06 are no two figures. */
function isRestated({ previous, previous_sealed: sealed }: Restatable, locale: string): boolean {
  return Math.abs(previous.mean - sealed.mean) >= 0.05 && points(previous.mean, locale) !== points(sealed.mean, locale)
}

/** Lengths of a calendar month, in days. */
const [shortestMonth, longestMonth] = [28, 31]

function spanLag({ best_lag: lag, span_days: span }: Spans, words: Words): string {
  return words.say('span-lag', { monthly: span >= shortestMonth && span <= longestMonth ? 'yes' : 'no', lag, days: count(lag * span, words.locale) })
}

/** What one decimal shows of a number's direction. */
function signOf(value: number): 'up' | 'down' | 'flat' {
  if (Math.abs(value) < 0.05) return 'flat'
  return value > 0 ? 'up' : 'down'
}

/**
 * Write a value of the findings in a form.
 *
 * @param unit - what the value is counted in, where its form asks for that
 * @returns the wording of "not known" where the value is null or not of the form's kind; so it is total
 */
export function write(value: unknown, form: FormName, words: Words, unit = ''): WordArgument {
  const { from, write: toWords }: Form = forms[form]
  return fits(value, from) ? toWords(value as never, words, unit) : words.say('not-known')
}

const keysOf = { estimate: ['low', 'high'], level: ['label'], shift: ['share_from', 'share_to'], span: ['start', 'end'], restatable: ['previous', 'previous_sealed'], fieldwork: ['field_start', 'field_end'], event: ['label', 'date'], spans: ['best_lag', 'span_days'] } as const

function fits(value: unknown, kind: Kind): boolean {
  if (kind === 'any') return true
  if (kind === 'list') return Array.isArray(value)
  if (kind === 'number' || kind === 'string') return typeof value === kind
  if (typeof value !== 'object' || value === null) return false
  const parts = value as Readonly<Record<string, unknown>>
  return keysOf[kind].every((key) => key in parts && parts[key] !== null)
}
