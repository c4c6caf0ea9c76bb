import { expect, test } from 'vitest'
import { createGenerator } from '../../../model/random/generator.ts'
import { fillMemory } from '../../../model/statistics/noisy-autoregression.ts'
import { neweyWest, neweyWestLags } from '../../../model/statistics/newey-west.ts'

const constant = (n: number) => new Float64Array(n).fill(1)

test('a plane without error is found again, with no error left', () => {
  const [one, other] = [[1, 4, 2, 8, 5, 7], [3, 1, 4, 1, 5, 9]]
  const { coefficients, standardErrors, freedom } = neweyWest([constant(6), one, other], one.map((value, t) => 2 - 3 * value + 0.5 * other[t]), 2)
  ;[2, -3, 0.5].forEach((expected, j) => { expect(coefficients[j]).toBeCloseTo(expected, 12) })
  for (const error of standardErrors) expect(error).toBeLessThan(1e-12)
  expect(freedom).toBe(3)
})

test('without lags: by hand White (1980), sum of squared residuals / n^2 for a mean', () => {
  const { covariance } = neweyWest([constant(4)], [1, 2, 3, 6], 0)
  expect(covariance[0]).toBeCloseTo(14 / 16, 14)
  expect(neweyWest([constant(4)], [1, 2, 3, 6], 0, { smallSample: true }).covariance[0]).toBeCloseTo((14 / 16) * (4 / 3), 14)
})

test('units of the columns do not matter, however far apart', () => {
  const [x, y] = [[1, 4, 2, 8, 5, 7, 3], [2, 3, 1, 9, 4, 8, 4]]
  const plain = neweyWest([constant(7), x], y, 2)
  const scaled = neweyWest([constant(7).map(() => 1e-6), x.map((value) => value * 1e8)], y, 2)
  expect(scaled.coefficients[1] * 1e8).toBeCloseTo(plain.coefficients[1], 10)
  expect(scaled.standardErrors[1] * 1e8).toBeCloseTo(plain.standardErrors[1], 10)
})

test('years and their squares, which are nearly collinear, give the curvature that years counted from the middle give', () => {
  const years = Array.from({ length: 11 }, (_, t) => 2000 + t)
  const y = years.map((_, t) => 3 + 0.25 * t + 0.5 * t * t + Math.sin(7 * t))
  const quadratic = (x: readonly number[]) => neweyWest([constant(11), x, x.map((value) => value * value)], y, 2)
  const [far, near] = [quadratic(years), quadratic(years.map((year) => year - 2005))]
  // One pass of orthogonalisation alone is off by 8e-13.
  expect(Math.abs(far.coefficients[2] / near.coefficients[2] - 1)).toBeLessThan(2e-13)
  expect(Math.abs(far.standardErrors[2] / near.standardErrors[2] - 1)).toBeLessThan(5e-13)
})

test('with autocorrelated errors the 90 % interval of a mean covers oftener with lags than without', () => {
  const [samples, n] = [1000, 200]
  const generator = createGenerator(12, 0)
  const y = new Float64Array(n)
  const covered = { lags: 0, none: 0 }
  for (let sample = 0; sample < samples; sample += 1) {
    fillMemory(y, { coefficient: 0.5, innovation: 1 }, generator)
    for (const [name, lags] of [['lags', 10], ['none', 0]] as const) {
      const { coefficients, standardErrors } = neweyWest([constant(n)], y, lags)
      if (Math.abs(coefficients[0]) < 1.645 * standardErrors[0]) covered[name] += 1
    }
  }
  expect(covered.lags / samples).toBeGreaterThan(0.83)
  expect(covered.none / samples).toBeLessThan(0.75)
})

test('a usual number of lags', () => {
  expect([1, 2, 8, 30, 36, 60, 99, 100, 156, 300].map(neweyWestLags)).toEqual([0, 1, 2, 3, 3, 3, 3, 4, 4, 5])
  expect(() => neweyWestLags(0)).toThrow('values 0')
})

test('refused by name', () => {
  const y = [1, 2, 4, 3]
  expect(() => neweyWest([], y, 0)).toThrow('without a column')
  expect(() => neweyWest([constant(3)], y, 0)).toThrow('design[0] 3, expected 4')
  expect(() => neweyWest([constant(4)], y, 4)).toThrow('lags 4')
  expect(() => neweyWest([constant(4), [5, 5, 5, 5]], y, 1)).toThrow('design[1]')
  expect(() => neweyWest([constant(4), [1, 2, 3, 4], [2.1, 3.1, 4.1, 5.1]], y, 1)).toThrow('design[2]')
  expect(() => neweyWest([[0, 0, 0, 0]], y, 1)).toThrow('design[0]')
  expect(() => neweyWest([constant(1)], [1], 0)).toThrow('values 1')
  expect(() => neweyWest([constant(4), [1, 2, Number.NaN, 4]], y, 1)).toThrow('design[1][2] NaN')
  expect(() => neweyWest([constant(4)], [1, 2, Infinity, 4], 1)).toThrow('y[2] Infinity')
})
