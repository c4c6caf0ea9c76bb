import fc from 'fast-check'
import { expect, test } from 'vitest'
import { dissimilarityIndex } from '../../../model/statistics/dissimilarity.ts'

const pairs = fc.array(fc.tuple(fc.double({ min: 0.01, max: 9, noNaN: true }), fc.double({ min: 0.01, max: 9, noNaN: true })), { minLength: 1, maxLength: 12 })

test('symmetric, in [0, 1], free of scale, and the sum of what one group is short of', () => {
  fc.assert(fc.property(pairs, (rows) => {
    const [one, other] = [rows.map(([a]) => a), rows.map(([, b]) => b)]
    const found = dissimilarityIndex(one, other)
    expect(found).toBeGreaterThanOrEqual(0)
    expect(found).toBeLessThanOrEqual(1)
    expect(dissimilarityIndex(other, one)).toBeCloseTo(found, 12)
    expect(dissimilarityIndex(one.map((a) => 1000 * a), other)).toBeCloseTo(found, 12)
    const [sumOne, sumOther] = [one, other].map((values) => values.reduce((a, b) => a + b, 0))
    expect(one.reduce((sum, a, i) => sum + Math.max(0, a / sumOne - other[i] / sumOther), 0)).toBeCloseTo(found, 12)
  }))
})

test('by hand: alike, apart, and a fifth that would have to move', () => {
  expect(dissimilarityIndex([2, 3], [4, 6])).toBe(0)
  expect(dissimilarityIndex([1, 0], [0, 7])).toBe(1)
  expect(dissimilarityIndex([0.5, 0.3, 0.2], [0.3, 0.4, 0.3])).toBeCloseTo(0.2, 14)
})

test('refused by name', () => {
  expect(() => dissimilarityIndex([1], [1, 2])).toThrow('groups 2')
  expect(() => dissimilarityIndex([1, -1], [1, 2])).toThrow('shares[1] -1')
  expect(() => dissimilarityIndex([1, 1], [0, 0])).toThrow('none of 2')
  expect(() => dissimilarityIndex([], [])).toThrow('none of 0')
})
