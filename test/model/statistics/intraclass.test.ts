import { describe, expect, test } from 'vitest'
import { createGenerator } from '../../../model/random/generator.ts'
import { intraclassCorrelation, oneWayAnova } from '../../../model/statistics/intraclass.ts'
import { oneWaySums } from './one-way-sums.ts'

/** Groups of unequal sizes whose means vary with standard deviation `between`, members with `within` about them. */
function simulated(between: number, within: number, groups: number, stream: number): number[][] {
  const generator = createGenerator(41, stream)
  return Array.from({ length: groups }, () => {
    const centre = between * generator.normal()
    return Array.from({ length: 1 + generator.integer(9) }, () => centre + within * generator.normal())
  })
}
const correlation = (groups: readonly (readonly number[])[]) => intraclassCorrelation(oneWaySums(groups)).value ?? Number.NaN

describe('unequal groups', () => {
  test.each([[1, 1, 0.5], [0.5, 1, 0.2], [2, 1, 0.8]])('between %d, within %d: the true correlation %d is met', (between, within, expected) => {
    expect(Math.abs(correlation(simulated(between, within, 5000, 0)) - expected)).toBeLessThan(0.02)
  })

  test('it can fail: taking the mean size for n0 misses it where sizes differ much', () => {
    const generator = createGenerator(42, 0)
    const groups = Array.from({ length: 4000 }, (_, i) => {
      const centre = generator.normal()
      return Array.from({ length: i % 40 === 0 ? 60 : 2 }, () => centre + generator.normal())
    })
    const { betweenMeanSquare, withinMeanSquare } = oneWayAnova(oneWaySums(groups))
    const naive = (betweenMeanSquare - withinMeanSquare) / (betweenMeanSquare + (groups.flat().length / 4000 - 1) * withinMeanSquare)
    expect(Math.abs(correlation(groups) - 0.5)).toBeLessThan(0.05)
    const pairs = oneWayAnova({ authors: 2, mentions: 4, squaredSizes: 10, betweenSquares: 4, withinSquares: 2 })
    expect(pairs.groupSize).toBe(1.5)
    expect(naive).not.toBe(correlation(groups))
  })

  test('neither unit nor zero of the scores matters', () => {
    const groups = simulated(1, 1, 50, 3)
    expect(correlation(groups.map((group) => group.map((value) => 7 - 3 * value)))).toBeCloseTo(correlation(groups), 12)
  })
})

test('floored at 0 where authors differ less than chance has it, though the component stays negative', () => {
  const sums = oneWaySums([[-0.1, 0.1], [-0.1, 0.1], [-0.11, 0.12]])
  expect(intraclassCorrelation(sums)).toEqual({ value: 0 })
  expect(oneWayAnova(sums).betweenVariance).toBeLessThan(0)
})

test('1 where no author varies', () => {
  expect(intraclassCorrelation(oneWaySums([[1, 1], [0, 0, 0]]))).toEqual({ value: 1 })
})

test.each([
  [[], 'too-few-authors'], [[[1, 2, 3]], 'too-few-authors'], [[[1], [2], [3]], 'no-author-twice'], [[[1, 1], [1]], 'no-variation'],
])('%j is left open: %s', (groups, reason) => {
  expect(intraclassCorrelation({ ...oneWaySums(groups), ...(groups.length === 0 ? { betweenSquares: 0, withinSquares: 0 } : {}) })).toEqual({ value: null, reason })
})

test('sums that cannot be are refused by name', () => {
  const sums = oneWaySums([[1, 2], [3, 5]])
  expect(() => intraclassCorrelation({ ...sums, withinSquares: -1 })).toThrow('withinSquares -1')
  expect(() => intraclassCorrelation({ ...sums, betweenSquares: Number.NaN })).toThrow('betweenSquares NaN')
  expect(() => intraclassCorrelation({ ...sums, mentions: 1 })).toThrow('mentions 1')
  expect(() => intraclassCorrelation({ ...sums, squaredSizes: 7 })).toThrow('squaredSizes 7')
  expect(() => intraclassCorrelation({ ...sums, squaredSizes: 17 })).toThrow('squaredSizes 17')
  expect(() => oneWayAnova(oneWaySums([[1], [2]]))).toThrow('expected two authors or more')
})
