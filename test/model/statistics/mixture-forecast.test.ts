import fc from 'fast-check'
import { expect, test } from 'vitest'
import { mixtureCdf, mixtureMean, mixtureQuantile, mixtureSd, type MixtureComponent } from '../../../model/statistics/mixture-forecast.ts'
import { normalQuantile } from '../../../model/statistics/normal.ts'
import { studentCdf } from '../../../model/statistics/student-t.ts'

const component = fc.record({
  weight: fc.double({ min: 0.01, max: 5, noNaN: true }), centre: fc.double({ min: -50, max: 50, noNaN: true }),
  scale: fc.double({ min: 0.01, max: 20, noNaN: true }), freedom: fc.integer({ min: 1, max: 60 }),
})
const mixtures = fc.array(component, { minLength: 1, maxLength: 6 })

test('the distribution function takes the quantile back to its probability, in both tails', () => {
  fc.assert(fc.property(mixtures, fc.double({ min: 1e-6, max: 1 - 1e-6, noNaN: true }), (mixture, p) => {
    const mirrored = mixture.map((one) => ({ ...one, centre: -one.centre }))
    const x = mixtureQuantile(p, mixture)
    expect(Math.abs(mixtureCdf(x, mixture) - p)).toBeLessThan(1e-10)
    expect(mixtureCdf(x, mixture) + mixtureCdf(-x, mirrored)).toBeCloseTo(1, 13)
    // Far out in a heavy tail the rounding of 1 - p moves the quantile itself.
    expect(mixtureQuantile(1 - p, mirrored)).toBeCloseTo(-x, Math.abs(x) > 1e3 ? 2 : 6)
  }), { seed: 1, numRuns: 150 })
})

test('one component is its own; many freedoms make it the normal; one without weight does not count', () => {
  const one: MixtureComponent = { weight: 1, centre: 3, scale: 2, freedom: 4 }
  expect(mixtureCdf(5, [one])).toBe(studentCdf(1, 4))
  expect(mixtureCdf(5, [{ ...one, weight: 7 }, { ...one, weight: 0, centre: -90, freedom: 1 }])).toBe(studentCdf(1, 4))
  expect(mixtureSd([one, { ...one, weight: 0, freedom: 1 }]).value).toBeCloseTo(2 * Math.sqrt(2), 14)
  for (const p of [1e-9, 0.05, 0.3, 0.95]) expect(mixtureQuantile(p, [{ ...one, freedom: 1e13 }])).toBeCloseTo(3 + 2 * normalQuantile(p), 10)
  expect(mixtureQuantile(0.05, [{ ...one, freedom: 50 }])).not.toBeCloseTo(3 + 2 * normalQuantile(0.05), 2)
})

test('far up it is as exact as far down', () => {
  const one = [{ weight: 1, centre: 0, scale: 1, freedom: 5 }]
  expect(mixtureQuantile(1 - 2 ** -40, one) / mixtureQuantile(2 ** -40, one)).toBeCloseTo(-1, 12)
  expect(mixtureQuantile(1 - 2 ** -39, one) / mixtureQuantile(2 ** -40, one)).not.toBeCloseTo(-1, 2)
})

test('between far components the quantile finds the one that has the probability', () => {
  const far = [{ weight: 0.3, centre: -1000, scale: 1e-3, freedom: 9 }, { weight: 0.7, centre: 1000, scale: 1e-3, freedom: 9 }]
  expect(mixtureQuantile(0.15, far)).toBeCloseTo(-1000, 9)
  expect(mixtureQuantile(0.65, far)).toBeCloseTo(1000, 9)
  expect(mixtureQuantile(0, far)).toBe(-Infinity)
  expect(mixtureQuantile(1, far)).toBe(Infinity)
})

test('mean and standard deviation: of the quantiles at even probabilities', () => {
  const mixture = [{ weight: 0.4, centre: 1, scale: 2, freedom: 12 }, { weight: 0.6, centre: 6, scale: 1, freedom: 20 }]
  const draws = Array.from({ length: 4000 }, (_, i) => mixtureQuantile((i + 0.5) / 4000, mixture))
  const mean = draws.reduce((sum, x) => sum + x, 0) / 4000
  const sd = Math.sqrt(draws.reduce((sum, x) => sum + (x - mean) ** 2, 0) / 4000)
  expect(mixtureMean(mixture).value).toBeCloseTo(4, 14)
  expect(mean).toBeCloseTo(4, 3)
  expect(mixtureSd(mixture).value).toBeCloseTo(sd, 2)
  expect(mixtureSd(mixture.map((one) => ({ ...one, centre: 4 }))).value).not.toBeCloseTo(sd, 1)
})

test('left open, or refused by name', () => {
  const one: MixtureComponent = { weight: 1, centre: 0, scale: 1, freedom: 2 }
  expect(mixtureSd([one])).toEqual({ value: null, reason: 'too-little-freedom' })
  expect(mixtureMean([one, { ...one, freedom: 1 }])).toEqual({ value: null, reason: 'too-little-freedom' })
  expect(() => mixtureCdf(0, [])).toThrow('none of 0')
  expect(() => mixtureCdf(0, [{ ...one, weight: 0 }])).toThrow('none of 1')
  expect(() => mixtureMean([one, { ...one, scale: 0 }])).toThrow('components[1]')
  expect(() => mixtureSd([{ ...one, freedom: 0.5 }])).toThrow('freedom 0.5')
  expect(() => mixtureQuantile(1.1, [one])).toThrow('1.1')
  expect(() => mixtureCdf(Number.NaN, [one])).toThrow('NaN')
})
