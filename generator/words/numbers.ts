import { plainSpaces } from './spaces.ts'
import type { Words } from './words.ts'

/**
 * Figures in the reader's locale. Rounding is Intl's: half away from zero. A figure that rounds to zero has no sign,
 * and the minus is the true minus sign (U+2212), as wide as a figure and never a line break.
 */
type Style = Pick<Intl.NumberFormatOptions, 'style' | 'signDisplay' | 'minimumFractionDigits' | 'maximumFractionDigits' | 'maximumSignificantDigits' | 'roundingPriority'>

/** Formats by what they are made from: they never change, and one costs more to make than a hundred figures to write. */
const formats = new Map<string, Intl.NumberFormat>()

function formatOf(locale: string, style: Style): Intl.NumberFormat {
  const key = `${locale} ${JSON.stringify(style)}`
  const known = formats.get(key) ?? new Intl.NumberFormat(locale, { signDisplay: 'negative', ...style })
  formats.set(key, known)
  return known
}

/** A figure in a style of Intl's. */
export function figure(value: number, locale: string, style: Style): string {
  const parts = formatOf(locale, style).formatToParts(value)
  return plainSpaces(parts.map((part) => part.type === 'minusSign' ? '\u2212' : part.value).join(''))
}

const oneDecimal = { minimumFractionDigits: 1, maximumFractionDigits: 1 } as const

/** Points, one decimal: `18.4`, `−0.3`. */
export function points(value: number, locale: string): string {
  return figure(value, locale, oneDecimal)
}

/** A change in points, with its sign: `+2.7`, `−0.3`, `0.0`. */
export function change(value: number, locale: string): string {
  return figure(value, locale, { ...oneDecimal, signDisplay: 'exceptZero' })
}

/** How far something moved, without its sign: `2.7`; what rounds to zero but is not is `less than 0.1`. */
export function size(value: number, words: Words): string {
  const [absolute, shown] = [Math.abs(value), figure(Math.abs(value), words.locale, oneDecimal)]
  return absolute > 0 && absolute < 0.05 ? words.say('size-under', { size: figure(0.1, words.locale, oneDecimal) }) : shown
}

/** A whole number, grouped: `12,480`. */
export function count(value: number, locale: string): string {
  return figure(value, locale, { maximumFractionDigits: 0 })
}

/** A plain figure of a diagnostic, a ratio or a scale: two decimals. */
export function number(value: number, locale: string): string {
  return figure(value, locale, { minimumFractionDigits: 2, maximumFractionDigits: 2 })
}

/** A figure so small that two decimals would hide it: `0.0109`, `−0.00052`; two figures that count. */
export function tinyNumber(value: number, locale: string): string {
  return figure(value, locale, { maximumSignificantDigits: 2 })
}

/** A share as a whole percentage, alike in text, tables and charts: `41%`; what rounds to nothing, or to all, but is not is `under 1%`, `over 99%`. */
export function share(value: number, words: Words): string {
  const percent = (of: number) => figure(of, words.locale, { style: 'percent', maximumFractionDigits: 0 })
  if (value > 0 && value < 0.005) return words.say('probability-under', { figure: percent(0.01) })
  if (value < 1 && value >= 0.995) return words.say('probability-over', { figure: percent(0.99) })
  return percent(value)
}

/** A share that is told as being below 5%, so that rounding does not lift it there: `3%`; from 4.5% on `under 5%`. */
export function minorShare(value: number, words: Words): string {
  const [shown, limit] = [share(value, words), share(0.05, words)]
  return value < 0.05 && shown === limit ? words.say('probability-under', { figure: limit }) : shown
}

/** A p-value: `0.031`, two decimals from 0.1 on; `under 0.001`. */
export function pValue(value: number, words: Words): string {
  if (value < 0.001) return words.say('probability-under', { figure: figure(0.001, words.locale, { maximumFractionDigits: 3 }) })
  const decimals = value < 0.0995 ? 3 : 2
  return figure(value, words.locale, { minimumFractionDigits: decimals, maximumFractionDigits: decimals })
}

/** A probability as a percentage, never rounded to certainty: `87%`, `over 99%`, `under 1%`. */
export function probabilityFigure(value: number, words: Words): string {
  const percent = (p: number) => figure(p, words.locale, { style: 'percent', maximumFractionDigits: 0 })
  if (value > 0.99) return words.say('probability-over', { figure: percent(0.99) })
  if (value < 0.01) return words.say('probability-under', { figure: percent(0.01) })
  return percent(value)
}

/**
 * A probability in words: which of seven bands it falls in.
 *
 * @see Mastrandrea et al. (2010), Guidance Note for Lead Authors of the IPCC Fifth Assessment Report on Consistent Treatment
 * of Uncertainties, table 1: over 99, 90, 66 per cent; 33 to 66; under 33, 10, 1 per cent
 */
export function probabilityBand(value: number): string {
  if (value > 0.99) return 'virtually_certain'
  if (value > 0.9) return 'very_likely'
  if (value > 0.66) return 'likely'
  if (value >= 0.33) return 'open'
  if (value >= 0.1) return 'unlikely'
  return value >= 0.01 ? 'very_unlikely' : 'exceptionally_unlikely'
}

/** In words and figure: `very likely (94%)`. */
export function probability(value: number, words: Words): string {
  return words.say('probability', { words: words.say('probability-words', { band: probabilityBand(value) }), figure: probabilityFigure(value, words) })
}

/** Smallest to largest size of several movements, without signs: `2.1 to 2.3`, or `2.2` where they round to the same. */
export function sizeRange(values: readonly number[], words: Words): string {
  const sizes = values.map(Math.abs)
  const [low, high] = [Math.min(...sizes), Math.max(...sizes)]
  return points(low, words.locale) === points(high, words.locale) ? size(low, words) : interval({ low, high }, points, words)
}

/** Smallest to largest of several counts: `382 to 417`, or `400` where they are one. */
export function countRange(values: readonly number[], words: Words): string {
  if (values.length === 0) return words.say('not-known')
  const [low, high] = [Math.min(...values), Math.max(...values)]
  return count(low, words.locale) === count(high, words.locale) ? count(low, words.locale) : interval({ low, high }, count, words)
}

/** Two bounds as `1.2 to 5.0`, both formatted alike. */
export function interval(bounds: { readonly low: number, readonly high: number }, format: (value: number, locale: string) => string, words: Words): string {
  return words.say('range', { low: format(bounds.low, words.locale), high: format(bounds.high, words.locale) })
}

/** How far something moved, as bounds without sign, the smaller first: `1.2 to 5.0`; bounds on both sides of zero keep their signs. */
export function sizeInterval({ low, high }: { readonly low: number, readonly high: number }, words: Words): string {
  if (low < 0 && high > 0) return interval({ low, high }, change, words)
  return interval({ low: Math.min(Math.abs(low), Math.abs(high)), high: Math.max(Math.abs(low), Math.abs(high)) }, points, words)
}
