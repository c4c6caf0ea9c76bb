import type { AuthorCounts, CellColumns, Factor, Timeline } from '../../model/intake/intake-tables.ts'

/** Authors of ready-made cells, summed: whoever is in two cells counts twice. */
export function summedAuthors(cells: Pick<CellColumns, 'count' | 'step' | 'levels' | 'authors'>, axis: Timeline, factors: readonly Factor[]): AuthorCounts {
  const byStep = new Float64Array(axis.steps.length)
  const byPeriod = new Float64Array(axis.periods.length)
  const byPeriodLevel = factors.map((factor) => new Float64Array(axis.periods.length * factor.levels.length))
  for (let cell = 0; cell < cells.count; cell++) {
    const period = axis.periodOf[cells.step[cell]!]!
    const authors = cells.authors[cell]!
    byStep[cells.step[cell]!]! += authors
    byPeriod[period]! += authors
    for (const [index, factor] of factors.entries()) byPeriodLevel[index]![period * factor.levels.length + cells.levels[index]![cell]!]! += authors
  }
  return { exact: false, byStep, byPeriod, byPeriodLevel }
}
