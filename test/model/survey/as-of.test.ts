import { describe, expect, test } from 'vitest'
import { createGenerator } from '../../../model/random/generator.ts'
import type { IntakeTables } from '../../../model/intake/intake-tables.ts'
import { tablesBefore } from '../../../model/survey/as-of.ts'
import { simulateCells } from '../../support/simulate-cells.ts'

const { tables } = simulateCells({
  steps: 30, venues: 3, topics: 2, posters: 2, mentionsPerStep: 60,
  sigmas: { mu: 0.03, venueDrift: [0.01, 0.01, 0.01], venue: 0.2, topic: 0.2, poster: 0.1, tau: 0.05 },
}, createGenerator(1, 0))

/** The same tables without the cells that a rule picks. */
function without(drop: (cell: number) => boolean): IntakeTables {
  const { cells } = tables
  const kept = Array.from({ length: cells.count }, (_, c) => c).filter((c) => !drop(c))
  const pick = (column: Float64Array) => Float64Array.from(kept, (c) => column[c])
  return {
    ...tables,
    cells: {
      count: kept.length, step: Int32Array.from(kept, (c) => cells.step[c]), levels: cells.levels.map((column) => Int32Array.from(kept, (c) => column[c])),
      mentions: pick(cells.mentions), authors: pick(cells.authors), mean: pick(cells.mean), squares: pick(cells.squares),
      freedom: pick(cells.freedom), clustering: pick(cells.clustering), deff: pick(cells.deff),
    },
  }
}

describe('the tables as of a step', () => {
  test('hold the cells before it and no later one', () => {
    const before = tablesBefore(tables, 12)
    expect(before.timeline.steps).toEqual(tables.timeline.steps.slice(0, 12))
    expect(Math.max(...before.cells.step)).toBe(11)
    expect(before.cells.mentions.reduce((a, b) => a + b, 0)).toBe(tables.cells.mentions.reduce((sum, n, c) => sum + (tables.cells.step[c] < 12 ? n : 0), 0))
  })
  test('do not know a level that comes later', () => {
    const late = without((c) => tables.cells.levels[0][c] === 1 && tables.cells.step[c] < 15)
    expect(tablesBefore(late, 12).factors[0].levels.map(({ name }) => name)).toEqual(['venue-1', 'venue-3'])
    expect(Math.max(...tablesBefore(late, 12).cells.levels[0])).toBe(1)
    expect(tablesBefore(late, 20).factors[0].levels).toHaveLength(3)
  })
  test('take the clustering of authors from before the first forecast, venue by venue', () => {
    const sums = tables.variation.map((_, v) => ({ authors: 10 + v, mentions: 20, squaredSizes: 60, betweenSquares: 1, withinSquares: 1 }))
    const late = without((c) => tables.cells.levels[0][c] === 0 && tables.cells.step[c] < 15)
    expect(tablesBefore({ ...late, hindsight: { before: 9, variation: sums, settling: [] } }, 12).variation).toEqual([sums[1], sums[2]])
  })
  test('leave out cells whose poster classes were not settled, until they are', () => {
    const hindsight = { before: 9, variation: tables.variation, settling: [{ venue: 2, from: 0, to: 5, settled: 6 }, { venue: 0, from: 4, to: 9, settled: 14 }] }
    const stepsOf = (end: number, venue: string) => {
      const { cells, factors } = tablesBefore({ ...tables, hindsight }, end)
      const v = factors[0].levels.findIndex(({ name }) => name === venue)
      return [...new Set(Array.from(cells.step).filter((_, c) => cells.levels[0][c] === v))]
    }
    expect(stepsOf(12, 'venue-1')).toEqual([0, 1, 2, 3, 10, 11])
    expect(stepsOf(14, 'venue-1')).toHaveLength(14)
    expect(stepsOf(12, 'venue-3')).toHaveLength(12)
  })
})
