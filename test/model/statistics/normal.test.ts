import { describe, expect, test } from 'vitest'
import { ModelError } from '../../../model/model-error.ts'
import { normalCdf, normalDensity, normalQuantile } from '../../../model/statistics/normal.ts'

/** Simpson's rule with n (even) steps. */
function integral(f: (x: number) => number, from: number, to: number, n: number): number {
  const h = (to - from) / n
  let sum = f(from) + f(to)
  for (let i = 1; i < n; i += 1) sum += (i % 2 === 1 ? 4 : 2) * f(from + i * h)
  return (sum * h) / 3
}
const plainDensity = (x: number) => Math.exp(-0.5 * x * x) / Math.sqrt(2 * Math.PI)
const relative = (found: number, expected: number) => Math.abs(found / expected - 1)

describe('distribution function', () => {
  test.each([-30, -8, -5, -3, -1.51, -1.49, -0.5, 0.3, 1.49, 1.51, 2.2, 4])('at %d it is the integral of the density', (x) => {
    expect(relative(normalCdf(x), integral(plainDensity, x < -4 ? x + 40 / x : -12, x, 20_000))).toBeLessThan(2e-13)
  })

  // To 30 digits by mpmath 1.3.0 (ncdf), rounded.
  test.each([[-37, 5.725571222524577e-300], [-10, 7.619853024160525e-24], [-2, 0.02275013194817921], [-1.5, 0.06680720126885807], [1, 0.8413447460685429]])(
    'at %d it is %d to a few units in the last place', (x, expected) => { expect(relative(normalCdf(x), expected)).toBeLessThan(2e-15) })

  test('it is symmetric, rises, and ends at 0 and 1', () => {
    for (let x = -9; x < 9; x += 0.01) {
      expect(normalCdf(x) + normalCdf(-x)).toBeCloseTo(1, 15)
      expect(normalCdf(x + 0.01)).toBeGreaterThanOrEqual(normalCdf(x))
    }
    expect([normalCdf(-Infinity), normalCdf(Infinity), normalDensity(Infinity)]).toEqual([0, 1, 0])
  })
})

describe('quantile', () => {
  const probabilities = [1e-300, 1e-100, 1e-30, 1e-12, 1e-6, 0.001, 0.0749, 0.0751, 0.2, 0.4, 0.49, 0.51, 0.6, 0.8, 0.924, 0.926, 0.999, 1 - 1e-9]

  test.each(probabilities)('the distribution function takes it back to %d', (p) => {
    const x = normalQuantile(p)
    const upper = p > 0.5
    // An error e in x comes back as e x f(x) / F(x) in p: what a relative error of 3e-16 in x allows.
    const sensitivity = Math.max(1, (Math.abs(x) * normalDensity(x)) / (upper ? 1 - p : p))
    expect(relative(normalCdf(x), p)).toBeLessThan(1e-15 * sensitivity)
  })

  test('it can fail: a quantile off by 1e-12 would show', () => {
    const p = 0.4
    expect(relative(normalCdf(normalQuantile(p) * (1 + 1e-12)), p)).toBeGreaterThan(1e-15)
  })

  test('the three branches meet, and it is antisymmetric', () => {
    for (const seam of [0.075, Math.exp(-25)]) {
      const step = seam * 1e-7
      const slope = (normalQuantile(seam + step) - normalQuantile(seam - step)) / (2 * step)
      expect(relative(slope, 1 / normalDensity(normalQuantile(seam)))).toBeLessThan(1e-6)
    }
    for (const p of [0.01, 0.1, 0.25, 0.3]) expect(normalQuantile(1 - p)).toBeCloseTo(-normalQuantile(p), 14)
    expect([normalQuantile(0), normalQuantile(0.5), normalQuantile(1)]).toEqual([-Infinity, 0, Infinity])
  })

  test.each([-0.1, 1.1, Number.NaN])('probability %d is refused', (p) => { expect(() => normalQuantile(p)).toThrow(ModelError) })
})

test('NaN has no probability', () => { expect(() => normalCdf(Number.NaN)).toThrow(ModelError) })
