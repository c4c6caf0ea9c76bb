import type { IntakeTables } from '../intake/intake-tables.ts'

/** What a set of cells adds up to, as coded: no model in it. */
export interface CellSum {
  readonly mentions: number
  /** Mean score; null where there is no mention. */
  readonly raw: number | null
  /** Standard deviation of scores about the set's own mean; null with fewer than two mentions of known spread. */
  readonly spread: number | null
}

/** Sums over the cells that `holds` says yes to. */
export function sumCells(tables: IntakeTables, holds: (cell: number) => boolean): CellSum {
  const { cells } = tables
  let mentions = 0
  let total = 0
  // of the cells whose inner spread is known: a cell of one mention has none to know
  let known = 0
  let knownTotal = 0
  let knownSquares = 0
  for (let c = 0; c < cells.count; c++) {
    if (!holds(c)) continue
    const n = cells.mentions[c]
    mentions += n
    total += n * cells.mean[c]
    if (cells.freedom[c] === n - 1) {
      known += n
      knownTotal += n * cells.mean[c]
      knownSquares += cells.squares[c] + n * cells.mean[c] * cells.mean[c]
    }
  }
  const variance = known < 2 ? null : Math.max(0, (knownSquares - knownTotal * knownTotal / known) / (known - 1))
  return { mentions, raw: mentions === 0 ? null : total / mentions, spread: variance === null ? null : Math.sqrt(variance) }
}

/** Mentions and mean score per step; the mean is null where a step holds none. */
export function sumByStep(tables: IntakeTables, holds: (cell: number) => boolean = () => true): { mentions: Float64Array; raw: (number | null)[] } {
  const { cells, timeline } = tables
  const mentions = new Float64Array(timeline.steps.length)
  const total = new Float64Array(timeline.steps.length)
  for (let c = 0; c < cells.count; c++) {
    if (!holds(c)) continue
    mentions[cells.step[c]] += cells.mentions[c]
    total[cells.step[c]] += cells.mentions[c] * cells.mean[c]
  }
  return { mentions, raw: Array.from(mentions, (n, t) => (n === 0 ? null : total[t] / n)) }
}
