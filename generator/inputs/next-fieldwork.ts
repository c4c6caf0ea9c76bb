import { quantiles } from '../../model/statistics/quantile.ts'
import { dayNumber, isoDate } from '../calendar/days.ts'
import type { DateRange } from '../calendar/timeline.ts'
import type { RawWave } from './raw-inputs.ts'

export interface NextFieldwork extends DateRange {
  readonly dates: 'given' | 'usual-spacing'
}

/**
 * When the wave after these is in the field: as given, or one usual spacing (the median from first day to first day)
 * after the last, for as long as usual.
 *
 * @param waves - in order of their first day
 * @returns null with fewer than two waves
 */
export function nextFieldwork(waves: readonly RawWave[], given: DateRange | null): NextFieldwork | null {
  if (waves.length < 2) return null
  if (given !== null) return { ...given, dates: 'given' }
  const starts = waves.map(({ start }) => dayNumber(start))
  const spacing = median(starts.slice(1).map((start, index) => start - starts[index]!))
  const length = median(waves.map(({ end }, index) => dayNumber(end) - starts[index]! + 1))
  const from = starts.at(-1)! + Math.max(1, spacing)
  return { from: isoDate(from), to: isoDate(from + length - 1), dates: 'usual-spacing' }
}

function median(days: readonly number[]): number {
  return Math.round(quantiles(days, [0.5])[0]!)
}
