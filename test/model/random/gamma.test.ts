import { expect, test } from 'vitest'
import { drawGamma } from '../../../model/random/gamma.ts'
import { createGenerator } from '../../../model/random/generator.ts'
import { mean, sampleVariance } from '../../../model/statistics/moments.ts'
import { normalCdf } from '../../../model/statistics/normal.ts'

const n = 200_000
const draws = (shape: number, seed: number) => {
  const generator = createGenerator(seed, 0)
  return Float64Array.from({ length: n }, () => drawGamma(shape, generator))
}

test.each([0.3, 1, 2.5, 40])('mean and variance of shape %d are the shape, within 3.5 standard errors', (shape) => {
  const found = draws(shape, 5)
  expect(found.every((draw) => draw >= 0)).toBe(true)
  expect(Math.abs(mean(found) - shape)).toBeLessThan(3.5 * Math.sqrt(shape / n))
  // Fourth central moment of a gamma: 3 shape^2 + 6 shape.
  expect(Math.abs(sampleVariance(found) - shape)).toBeLessThan(3.5 * Math.sqrt((2 * shape * shape + 6 * shape) / n))
})

/** Largest distance of the empirical distribution from a distribution function, times sqrt(n): above 1.63 in 1 % of samples (Kolmogorov). */
function distance(sample: Float64Array, cdf: (x: number) => number): number {
  return Math.sqrt(n) * sample.toSorted().reduce((most, x, i) => Math.max(most, Math.abs(cdf(x) - i / n), Math.abs(cdf(x) - (i + 1) / n)), 0)
}

// Closed forms: half a squared normal, the exponential, Erlang's with three waits.
const forms: readonly (readonly [number, (x: number) => number])[] = [
  [0.5, (x) => 1 - 2 * normalCdf(-Math.sqrt(2 * x))],
  [1, (x) => 1 - Math.exp(-x)],
  [3, (x) => 1 - Math.exp(-x) * (1 + x + (x * x) / 2)],
]

test.each(forms)('the whole distribution of shape %d', (shape, cdf) => {
  expect(distance(draws(shape, 6), cdf)).toBeLessThan(1.63)
})

test('it can fail: a shape that is off by one part in fifty', () => {
  expect(distance(draws(1.02, 6), forms[1][1])).toBeGreaterThan(1.63)
})

test('refused by name', () => {
  for (const shape of [0, -1, Number.NaN, Infinity]) expect(() => drawGamma(shape, createGenerator(1, 0))).toThrow(`shape ${shape}`)
})
