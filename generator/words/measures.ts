import { figure, interval } from './numbers.ts'
import type { Words } from './words.ts'

/**
 * Figures whose unit another figure names: a survey's metric is a share, in percent, or a mean in units of its own; a lag counts
 * steps of the grid.
 */

/** Digits of a share in percent and of a mean: what a base of some hundred interviews can bear. */
const shareDecimals = { minimumFractionDigits: 1, maximumFractionDigits: 1 } as const
const meanDecimals = { minimumFractionDigits: 2, maximumFractionDigits: 2 } as const
const decimalsOf = (unit: string) => (unit === 'mean' ? meanDecimals : shareDecimals)

/** A metric's value: `43.2%`, or a mean as `7.24`. @param value - a share in percent */
export function measure(value: number, unit: string, locale: string): string {
  return unit === 'mean' ? figure(value, locale, meanDecimals) : figure(value / 100, locale, { style: 'percent', ...shareDecimals })
}

/** A difference of two values, with its sign: `+2.1` percentage points, or `+0.12`. */
export function measureChange(value: number, unit: string, locale: string): string {
  return figure(value, locale, { ...decimalsOf(unit), signDisplay: 'exceptZero' })
}

/** How large a difference or an error is, without sign: `2.1`, or `0.12`. */
export function measureSize(value: number, unit: string, locale: string): string {
  return figure(Math.abs(value), locale, decimalsOf(unit))
}

type Format = (value: number, unit: string, locale: string) => string

/** Two bounds in one unit, formatted alike: `40.1% to 46.3%`. */
export function measureInterval(bounds: { readonly low: number, readonly high: number }, unit: string, format: Format, words: Words): string {
  return interval(bounds, (value, locale) => format(value, unit, locale), words)
}

/** So many steps of the grid: `4 weeks`, `1 month`; the sign is told in words around it. */
export function steps(value: number, unit: string, words: Words): string {
  return words.say('steps', { steps: Math.abs(value), grid: unit })
}
