import { describe, expect, test } from 'vitest'
import { heardBy, leastHeard, neededAt, neededJointly, readBenchmark } from '../../../model/customers/benchmark.ts'
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
  describe('the authors needed to bring all levels to their shares at once', () => {
    const besides = (authors: readonly number[], shares: readonly number[]) => {
      const needed = neededJointly(authors, shares)!
      const all = authors.reduce((sum, count, l) => sum + count + needed[l], 0)
      return { needed, all, reached: authors.map((count, l) => (count + needed[l]) / all) }
    }
    test('fill every level that is below its share, and no fewer in all would', () => {
      const shares = [0.19, 0.14, 0.46, 0.21]
      const authors = [967, 718, 963, 158]
      const { needed, all, reached } = besides(authors, shares)
      // commuters, 718 at a share of 0.14, set the size: 718 / 0.14 = 5128.57
      expect(needed).toEqual([8, 0, 1397, 919])
      expect(all).toBe(5130)
      reached.forEach((share, l) => expect(share).toBeCloseTo(shares[l], 3))
      // with one author less in all the commuters would be above their share by more than one author, so that others are short
      expect(718 / 0.14).toBeGreaterThan(all - 2)
    })
    test('are more than for each level alone, if the others stay: those numbers hold one at a time', () => {
      const authors = [967, 718, 963, 158]
      const { needed } = besides(authors, [0.19, 0.14, 0.46, 0.21])
      expect(needed[3]).toBeGreaterThan(neededAt(158, 2806, 0.21))
      expect(needed[2]).toBeGreaterThan(neededAt(963, 2806, 0.46))
    })
    test('none where all are at their shares, nor can it be done where authors belong to a level without customers', () => {
      expect(neededJointly([30, 70], [0.3, 0.7])).toEqual([0, 0])
      expect(neededJointly([0, 0], [0.3, 0.7])).toEqual([0, 0])
      expect(neededJointly([30, 70, 1], [0.3, 0.7, 0])).toBeNull()
    })
    test('stand by level and in all; a level short of its share is told by how much', () => {
      const [segment] = found.margins
      // islanders, 200 at a share of 0.5: 400 in all
      expect(segment.levels.map(({ needed_jointly: needed }) => needed)).toEqual([0, 60, 40])
      expect(segment.needed_jointly).toBe(100)
      expect(segment.levels.map(({ shortfall }) => shortfall)).toEqual([0, expect.closeTo(100 / 15, 9), expect.closeTo(10, 9)])
    })
  })
  describe('the authors to plan for', () => {
    const planned = (heard: readonly number[]) => {
      const rows = heard.map((authors, l) => ({ levels: [l], authors, sum: 0, squares: authors }))
      const names = ['islander', 'visitor', 'freight']
      const [margin] = readBenchmark(heardBy({ margins: ['segment'], levels: [names], rows }, [margins[0]]), 0.9, 10).margins
      return margin.levels.map(({ planned: authors, needed, needed_jointly: jointly }) => [authors, needed, jointly])
    }
    test('are those for all levels at once where several are heard too little, since more are then asked of all of them', () => {
      // 700 at a share of 0.5: 1400 in all
      expect(planned([700, 250, 50])).toEqual([[0, 0, 0], [310, 250, 310], [90, 56, 90]])
    })
    test('are those for it alone where one is', () => {
      // visitors stand at their share of 0.4, islanders above theirs
      expect(planned([560, 400, 40])).toEqual([[0, 0, 0], [0, 0, 48], [67, 67, 72]])
    })
  })
  test('the least heard are the three furthest below their shares over all margins, and none that is less than half a point below', () => {
    const levels = (shortfalls: readonly (number | null)[]) => shortfalls.map((shortfall, l) => ({ ...found.margins[0].levels[0], level: `level ${l}`, shortfall }))
    const least = (...of: (readonly (number | null)[])[]) => [...leastHeard({ margins: of.map((shortfalls) => ({ ...found.margins[0], levels: levels(shortfalls) })) })].map(({ shortfall }) => shortfall)
    expect(least([4, 0.7, 0], [9, 0.6, null])).toEqual([9, 4, 0.7])
    expect(least([0.49, 0, null])).toEqual([])
  })
  test('levels of fewer authors than may be shown are not told, nor by a number worked out from theirs', () => {
    const few = readBenchmark(heardBy({ ...segments, rows: [row(0, 1, 100, 0), row(2, 0, 9, 0.5)] }, margins), 0.9, 10)
    expect(few.margins[0].levels[1]).toMatchObject({ heard: null, authors: null, gap: null })
    const fewer = readBenchmark(heardBy({ ...segments, rows: [row(0, 1, 100, 0), row(2, 0, 3, 0.5)] }, margins), 0.9, 10)
    const jointly = ({ margins: [of] }: typeof few) => [of.needed_jointly, ...of.levels.map((level) => level.needed_jointly)]
    expect(jointly(few)).toEqual([100, 0, 80, 20])
    expect(jointly(fewer)).toEqual(jointly(few))
    expect(few.margins[0].levels[1].shortfall).toBeCloseTo(40, 9)
    expect(readBenchmark(heardBy({ ...segments, rows: [row(0, 1, 4, 0), row(2, 0, 3, 0.5)] }, margins), 0.9, 10).margins[0].levels.map(({ shortfall }) => shortfall)).toEqual([null, null, null])
  })
})
