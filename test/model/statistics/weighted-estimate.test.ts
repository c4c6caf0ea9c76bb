import fc from 'fast-check'
import { expect, test } from 'vitest'
import { createGenerator } from '../../../model/random/generator.ts'
import { normalQuantile } from '../../../model/statistics/normal.ts'
import { weightedEstimate } from '../../../model/statistics/weighted-estimate.ts'

function normalised(weights: readonly number[]): Float64Array {
  const sum = weights.reduce((total, weight) => total + weight, 0)
  return Float64Array.from(weights, (weight) => weight / sum)
}

test('a weight of m is m draws of weight 1', () => {
  const draws = fc.array(fc.tuple(fc.integer({ min: -9, max: 9 }), fc.integer({ min: 1, max: 5 })), { minLength: 1, maxLength: 12 })
  fc.assert(fc.property(draws, fc.constantFrom(0.55, 0.83, 0.91), (rows, interval) => {
    const repeated = rows.flatMap(([value, times]) => new Array<number>(times).fill(value))
    const weighted = weightedEstimate(Float64Array.from(rows, ([value]) => value), normalised(rows.map(([, times]) => times)), interval)
    const plain = weightedEstimate(Float64Array.from(repeated), normalised(repeated.map(() => 1)), interval)
    for (const key of ['mean', 'low', 'high', 'sd'] as const) expect(weighted[key]).toBeCloseTo(plain[key], 10)
  }))
})

test('weights turn draws of one normal into a summary of another; it can fail: even weights do not', () => {
  const [n, shift] = [40_000, 0.5]
  const draws = new Float64Array(n)
  createGenerator(91, 0).fillNormal(draws)
  const found = weightedEstimate(draws, normalised([...draws].map((x) => Math.exp(shift * x))), 0.9)
  expect(found.mean).toBeCloseTo(shift, 1)
  expect(found.sd).toBeCloseTo(1, 1)
  expect(found.low).toBeCloseTo(shift - normalQuantile(0.95), 1)
  expect(found.high).toBeCloseTo(shift + normalQuantile(0.95), 1)
  expect(Math.abs(weightedEstimate(draws, normalised([...draws].map(() => 1)), 0.9).mean - shift)).toBeGreaterThan(0.4)
})

test('a draw without weight is not in the interval', () => {
  expect(weightedEstimate(Float64Array.of(100, 1, 2, -100), Float64Array.of(0, 0.5, 0.5, 0), 0.9)).toEqual({ mean: 1.5, low: 1, high: 2, sd: 0.5 })
})
