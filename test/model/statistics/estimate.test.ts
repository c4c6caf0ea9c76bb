import { expect, test } from 'vitest'
import { estimate } from '../../../model/findings/parts-schema.ts'
import { createGenerator } from '../../../model/random/generator.ts'
import { estimateOf } from '../../../model/statistics/estimate.ts'
import { mean, standardDeviation } from '../../../model/statistics/moments.ts'
import { normalQuantile } from '../../../model/statistics/normal.ts'
import { quantiles } from '../../../model/statistics/quantile.ts'

const draws = new Float64Array(4000)
createGenerator(31, 0).fillNormal(draws)

test('mean, sd and quantiles as computed one by one', () => {
  const [low, high] = quantiles(draws, [(1 - 0.9) / 2, (1 + 0.9) / 2])
  expect(estimateOf(draws, 0.9)).toEqual({ mean: mean(draws), low, high, sd: standardDeviation(draws) })
})

test('of standard normal draws: the normal interval within 3.5 standard errors, and another where the interval is another', () => {
  const bound = normalQuantile(0.95)
  const error = Math.sqrt((0.05 * 0.95) / draws.length) / 0.1031
  const { low, high } = estimateOf(draws, 0.9)
  expect(Math.abs(high - bound)).toBeLessThan(3.5 * error)
  expect(Math.abs(low + bound)).toBeLessThan(3.5 * error)
  expect(Math.abs(estimateOf(draws, 0.8).high - bound)).toBeGreaterThan(3.5 * error)
})

test('draws keep their order; a scratch array is used where given', () => {
  const kept = draws.slice()
  const scratch = new Float64Array(draws.length)
  expect(estimateOf(draws, 0.9, scratch)).toEqual(estimateOf(draws, 0.9))
  expect([...draws]).toEqual([...kept])
  expect(scratch.slice().sort()).toEqual(kept.slice().sort())
})

test('the result is a valid estimate of the findings', () => {
  expect(estimate.parse(estimateOf(Float64Array.of(2, 2, 2), 0.9))).toEqual({ mean: 2, low: 2, high: 2, sd: 0 })
})

test('what cannot be summarised is refused by name', () => {
  expect(() => estimateOf(Float64Array.of(1), 0.9)).toThrow('expected at least 2')
  expect(() => estimateOf(Float64Array.of(1, Number.NaN, 3), 0.9)).toThrow('values[1] NaN')
  expect(() => estimateOf(draws, 90)).toThrow('interval 90')
  expect(() => estimateOf(draws, 0.9, new Float64Array(3))).toThrow('3')
})
