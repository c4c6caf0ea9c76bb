import { describe, expect, test } from 'vitest'
import { heardBy, neededAt, readBenchmark } from '../../../model/customers/benchmark.ts'
import type { SegmentTable } from '../../../model/intake/intake-tables.ts'

const margins = [
  { margin: 'segment', levels: [{ level: 'islander', share: 0.5 }, { level: 'visitor', share: 0.4 }, { level: 'freight', share: 0.1 }] },
  { margin: 'age', levels: [{ level: 'under 40', share: 0.5 }, { level: '40 and over', share: 0.5 }] },
]
const row = (segment: number, age: number, authors: number, mean: number) => ({ levels: [segment, age], authors, sum: mean * authors, squares: authors * (mean ** 2 + 0.2) })
const segments: SegmentTable = {
  margins: ['segment', 'age'], levels: [['islander', 'stranger', 'visitor'], ['40 and over', 'under 40']],
  rows: [row(0, 1, 160, -0.2), row(0, 0, 40, -0.1), row(2, 1, 60, 0.4), row(2, 0, 40, 0.3), row(1, 0, 20, 0), row(-1, 1, 30, 0)],
}

describe('authors beside customers', () => {
  const found = readBenchmark(heardBy(segments, margins), 0.9, 10)
  test('shares are of the authors whose level the benchmark knows', () => {
    const [segment] = found.margins
    expect(segment).toMatchObject({ authors: 300, all_authors: 350 })
    expect(segment.levels.map(({ heard }) => heard)).toEqual([expect.closeTo(2 / 3, 12), expect.closeTo(1 / 3, 12), 0])
    // half of |1/6| + |-1/15| + |-1/10|
    expect(segment.dissimilarity).toBeCloseTo(1 / 6, 12)
    expect(segment.levels[1].gap).toBeCloseTo(-100 / 15, 9)
  })
  test('customers of whom nobody was heard are named, and no weight brings them in', () => {
    expect(found.unreachable).toEqual([{ margin: 'segment', level: 'freight', customers: 0.1 }])
  })
  test('weights bring both margins to the customers', () => {
    expect(found.raking).toMatchObject({ converged: true, authors: 300 })
    expect(found.raking!.effective_authors).toBeLessThan(300)
    expect(found.raking!.design_effect).toBeCloseTo(300 / found.raking!.effective_authors, 9)
    expect(found.as_heard).toBeCloseTo(100 * (-32 - 4 + 24 + 12) / 350, 9)
    expect(found.weighted!.mean).toBeGreaterThan(found.as_heard!)
    expect(found.weighted!.low).toBeLessThan(found.weighted!.mean)
  })
  test('the authors needed bring the share to that of customers', () => {
    const needed = neededAt(100, 300, 0.4)
    expect((100 + needed) / (300 + needed)).toBeGreaterThanOrEqual(0.4)
    expect((100 + needed - 1) / (300 + needed - 1)).toBeLessThan(0.4)
    expect(neededAt(200, 300, 0.5)).toBe(0)
  })
  test('levels of fewer authors than may be shown are not told', () => {
    const few = readBenchmark(heardBy({ ...segments, rows: [row(0, 1, 100, 0), row(2, 0, 9, 0.5)] }, margins), 0.9, 10)
    expect(few.margins[0].levels[1]).toMatchObject({ heard: null, authors: null, gap: null })
  })
})
