import { sumByStep } from '../reading/cell-sums.ts'
import type { Reading } from '../reading/context.ts'
import { points } from '../reading/summarise.ts'
import { mean } from '../statistics/moments.ts'
import type { StepSeries } from './windows.ts'

/** A series that the survey is compared with, in points. */
export interface Candidate extends StepSeries {
  readonly series: 'adjusted' | 'raw' | 'venue'
  readonly venue: string | null
  readonly label: string
}

/** Mix-adjusted opinion, the raw average of all posts, and that of every venue alone. */
export function candidatesOf(reading: Reading): readonly Candidate[] {
  const { tables, adjusted } = reading
  const venueOf = tables.cells.levels[0]
  const level: Candidate = {
    series: 'adjusted', venue: null, label: 'adjusted',
    value: Float64Array.from(adjusted, (draws) => points * mean(draws)), weight: new Float64Array(adjusted.length).fill(1),
  }
  const averageOf = (series: 'raw' | 'venue', venue: string | null, label: string, holds: (cell: number) => boolean): Candidate => {
    const { mentions, raw } = sumByStep(tables, holds)
    return { series, venue, label, value: Float64Array.from(raw, (score) => points * (score ?? 0)), weight: mentions }
  }
  return [
    level,
    averageOf('raw', null, 'raw', () => true),
    ...tables.factors[0].levels.map(({ name, label }, v) => averageOf('venue', name, label, (c) => venueOf[c] === v)),
  ]
}
