import { expect, test } from 'vitest'
import { correlation } from '../../../model/statistics/correlation.ts'

test('neither unit nor zero matters; a sign turns it', () => {
  const [x, y] = [[1, 4, 2, 8], [0.5, 0.2, 0.9, 1.4]]
  const r = correlation(x, y) ?? Number.NaN
  expect(correlation(x.map((value) => 3 - 2 * value), y)).toBeCloseTo(-r, 14)
  expect(correlation(x.map((value) => value * 1e-200), y.map((value) => value + 1e6))).toBeCloseTo(r, 8)
})

test('a straight line is 1, and one partner out of place is not', () => {
  expect(correlation([1, 2, 3], [10, 20, 30])).toBe(1)
  expect(correlation([1, 2, 3], [10, 30, 20])).toBe(0.5)
})

test('left open, or refused by name', () => {
  expect(correlation([], [])).toBeNull()
  expect(correlation([1], [2])).toBeNull()
  expect(correlation([1, 1], [2, 3])).toBeNull()
  expect(() => correlation([1, 2], [1])).toThrow('1, expected 2')
  expect(() => correlation([1, Number.NaN], [1, 2])).toThrow('values[1] NaN')
})
