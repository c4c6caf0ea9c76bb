import type { CellColumns, Factor, FitTables, IntakeTables } from '../intake/intake-tables.ts'

/**
 * The tables as they could have been made before a step began: the cells of the steps before it, less those whose poster classes
 * rest on later mentions; only the levels seen in them; the authors' clustering from the mentions before the first forecast.
 * A mention posted later changes no bit of them.
 *
 * @param end - steps known: those before this one
 */
export function tablesBefore(tables: IntakeTables, end: number): FitTables {
  const { cells, hindsight, timeline } = tables
  const settling = (hindsight?.settling ?? []).filter(({ settled }) => settled > end)
  const known: number[] = []
  for (let c = 0; c < cells.count; c++) {
    if (cells.step[c] < end && !settling.some(({ venue, from, to }) => cells.levels[0][c] === venue && cells.step[c] >= from && cells.step[c] <= to)) known.push(c)
  }
  const relevelled = tables.factors.map((factor, f) => levelsSeen(factor, cells.levels[f], known))
  const variation = hindsight?.variation ?? tables.variation.map(() => null)
  return {
    // up to the last one with a mention: whether a later one follows says something of what came later
    timeline: { steps: timeline.steps.slice(0, known.reduce((last, c) => Math.max(last, cells.step[c] + 1), 0)), stepDays: timeline.stepDays },
    factors: relevelled.map(({ factor }) => factor),
    cells: pickCells(cells, known, relevelled.map(({ indices }) => indices)),
    variation: relevelled[0].seen.map((v) => variation[v]),
  }
}

function levelsSeen(factor: Factor, column: Int32Array, cells: readonly number[]) {
  const seen = [...new Set(cells.map((c) => column[c]))].sort((a, b) => a - b)
  const place = new Map(seen.map((level, i) => [level, i]))
  return { seen, factor: { ...factor, levels: seen.map((level) => factor.levels[level]) }, indices: Int32Array.from(cells, (c) => place.get(column[c])!) }
}

function pickCells(cells: CellColumns, known: readonly number[], levels: readonly Int32Array[]): CellColumns {
  const pick = (column: Float64Array) => Float64Array.from(known, (c) => column[c])
  return {
    count: known.length, step: Int32Array.from(known, (c) => cells.step[c]), levels,
    mentions: pick(cells.mentions), authors: pick(cells.authors), mean: pick(cells.mean), squares: pick(cells.squares),
    freedom: pick(cells.freedom), clustering: pick(cells.clustering), deff: pick(cells.deff),
  }
}
