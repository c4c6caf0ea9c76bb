import type { IntakeTables } from '../intake/intake-tables.ts'

/** Share of the mentions of the period under review whose score lies at either end of the scale; null where no such count is known. */
export function extremeShare({ extremes, timeline }: Pick<IntakeTables, 'extremes' | 'timeline'>): number | null {
  const now = extremes.filter(({ period }) => period === timeline.current)
  const mentions = now.reduce((sum, row) => sum + row.mentions, 0)
  return mentions === 0 ? null : now.reduce((sum, row) => sum + row.extremes, 0) / mentions
}
