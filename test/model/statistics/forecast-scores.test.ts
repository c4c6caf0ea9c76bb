import { expect, test } from 'vitest'
import { intervalScore, normalCrps, quantileLoss } from '../../../model/statistics/forecast-scores.ts'
import { normalCdf, normalQuantile } from '../../../model/statistics/normal.ts'

test('the continuous ranked probability score is the integral of the squared distance to the step at the observation', () => {
  const [observed, centre, sd] = [1.3, 0.4, 0.7]
  const step = 1e-3
  let integral = 0
  for (let x = centre - 8 * sd + step / 2; x < centre + 8 * sd; x += step) {
    integral += step * (normalCdf((x - centre) / sd) - (x >= observed ? 1 : 0)) ** 2
  }
  expect(normalCrps(observed, centre, sd)).toBeCloseTo(integral, 3)
  expect(normalCrps(observed, centre, 2 * sd)).not.toBeCloseTo(integral, 2)
})

test('it is twice the quantile loss averaged over all quantiles', () => {
  const levels = Array.from({ length: 5000 }, (_, i) => (i + 0.5) / 5000)
  const average = levels.reduce((sum, p) => sum + 2 * quantileLoss(1.3, 0.4 + 0.7 * normalQuantile(p), p), 0) / levels.length
  expect(normalCrps(1.3, 0.4, 0.7)).toBeCloseTo(average, 4)
})

test('no spread: the absolute error, which small spreads approach', () => {
  expect(normalCrps(2, 5, 0)).toBe(3)
  expect(normalCrps(2, 5, 1e-9)).toBeCloseTo(3, 8)
})

test('what is no forecast is refused by name', () => {
  expect(() => normalCrps(0, 0, -1)).toThrow('sd -1')
  expect(() => normalCrps(Number.NaN, 0, 1)).toThrow('observed NaN')
  expect(() => intervalScore(0, 1, -1, 0.1)).toThrow('1 to -1')
  expect(() => quantileLoss(0, 0, 1)).toThrow('p 1')
})
