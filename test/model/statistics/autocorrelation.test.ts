import { expect, test } from 'vitest'
import { autocorrelations, laggedSum } from '../../../model/statistics/autocorrelation.ts'

const series = [3, 5, 4, 8, 2, 6, 7]

test('neither unit nor zero matters', () => {
  const plain = [...autocorrelations(series, 3)!]
  const scaled = autocorrelations(series.map((value) => 1e-200 * value), 3)!
  plain.forEach((r, i) => { expect(scaled[i]).toBeCloseTo(r, 12) })
  const turned = autocorrelations(series.map((value) => 40 - 3 * value), 3)!
  plain.forEach((r, i) => { expect(turned[i]).toBeCloseTo(r, 12) })
})

test('by hand: deviations -2, 0, -1, 3, -3, 1, 2', () => {
  expect(laggedSum(Float64Array.of(-2, 0, -1, 3, -3, 1, 2), 1)).toBe(-13)
  expect(autocorrelations(series, 1)![0]).toBeCloseTo(-13 / 28, 14)
  expect(autocorrelations([...series].reverse(), 1)![0]).toBeCloseTo(-13 / 28, 14)
  expect(autocorrelations([...series].sort(), 1)![0]).not.toBeCloseTo(-13 / 28, 1)
})

test('all lags of a series sum to -1/2, since its deviations sum to 0', () => {
  expect(autocorrelations(series, 6)!.reduce((sum, r) => sum + r, 0)).toBeCloseTo(-0.5, 14)
  expect(autocorrelations(series, 5)!.reduce((sum, r) => sum + r, 0)).not.toBeCloseTo(-0.5, 3)
})

test('left open, or refused by name', () => {
  expect(autocorrelations([2, 2, 2], 1)).toBeNull()
  expect(() => autocorrelations(series, 7)).toThrow('lags 7')
  expect(() => autocorrelations(series, 0)).toThrow('lags 0')
  expect(() => autocorrelations([1, Number.NaN, 2], 1)).toThrow('values[1] NaN')
})
