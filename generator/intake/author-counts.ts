import type { AuthorCounts, CellColumns, Factor, Timeline } from '../../model/intake/intake-tables.ts'

/** Authors of ready-made cells, summed: whoever is in two cells counts twice. */
export function summedAuthors(cells: Pick<CellColumns, 'count' | 'step' | 'levels' | 'authors'>, axis: Timeline, factors: readonly Factor[]): AuthorCounts {
  const byStep = new Float64Array(axis.steps.length)
  const byStepVenue = new Float64Array(axis.steps.length * factors[0]!.levels.length)
  const byPeriod = new Float64Array(axis.periods.length)
  const byPeriodLevel = factors.map((factor) => new Float64Array(axis.periods.length * factor.levels.length))
  for (let cell = 0; cell < cells.count; cell++) {
    const period = axis.periodOf[cells.step[cell]!]!
    const authors = cells.authors[cell]!
    byStep[cells.step[cell]!]! += authors
    byStepVenue[cells.step[cell]! * factors[0]!.levels.length + cells.levels[0]![cell]!]! += authors
    byPeriod[period]! += authors
    for (const [index, factor] of factors.entries()) byPeriodLevel[index]![period * factor.levels.length + cells.levels[index]![cell]!]! += authors
  }
  return { exact: false, byStep, byStepVenue, byPeriod, byPeriodLevel }
}
