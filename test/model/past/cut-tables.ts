import type { CellColumns, IntakeTables } from '../../../model/intake/intake-tables.ts'

/**
 * Tables as a review of an earlier period would have had them: no step after it, and a last step that its end cuts by a day.
 *
 * @param keep - share of the last step's mentions that were there
 */
export function tablesUpTo(tables: IntakeTables, period: string, keep = 1): IntakeTables {
  const { timeline, cells } = tables
  const current = timeline.periods.findIndex(({ name }) => name === period)
  const last = timeline.periodOf.lastIndexOf(current)
  const rows = Array.from({ length: cells.count }, (_, c) => c).filter((c) => cells.step[c] <= last)
  const cut = pickCells(cells, rows)
  return {
    ...tables,
    timeline: {
      ...timeline, steps: timeline.steps.slice(0, last + 1), periods: timeline.periods.slice(0, current + 1), periodOf: timeline.periodOf.slice(0, last + 1), inBase: timeline.inBase.slice(0, last + 1),
      lastDays: timeline.lastDays.slice(0, last + 1).map((day, t) => (t === last && keep < 1 ? timeline.periods[current].end : day)), current, review: timeline.periods[current],
    },
    cells: { ...cut, mentions: cut.mentions.map((n, c) => (cut.step[c] === last ? Math.max(1, Math.round(keep * n)) : n)) },
  }
}

function pickCells(cells: CellColumns, rows: readonly number[]): CellColumns {
  const real = (column: Float64Array) => Float64Array.from(rows, (c) => column[c])
  return {
    count: rows.length, step: Int32Array.from(rows, (c) => cells.step[c]), levels: cells.levels.map((column) => Int32Array.from(rows, (c) => column[c])),
    mentions: real(cells.mentions), authors: real(cells.authors), mean: real(cells.mean), squares: real(cells.squares), freedom: real(cells.freedom), clustering: real(cells.clustering), deff: real(cells.deff),
  }
}

/** The same tables without some mentions of the cells of a step and venue: they come in late. */
export function withoutSome(tables: IntakeTables, step: number, venue: number, share: number): { readonly tables: IntakeTables; readonly mentions: number } {
  const { cells } = tables
  let taken = 0
  const mentions = cells.mentions.map((n, c) => {
    if (cells.step[c] !== step || cells.levels[0][c] !== venue) return n
    const less = Math.min(n - 1, Math.floor(share * n))
    taken += less
    return n - less
  })
  return { tables: { ...tables, cells: { ...cells, mentions, freedom: mentions.map((n) => n - 1) } }, mentions: taken }
}
