import fc from 'fast-check'
import { expect, test } from 'vitest'
import { mean, requireFinite, sampleVariance, standardDeviation } from '../../../model/statistics/moments.ts'

const values = fc.array(fc.integer({ min: -1000, max: 1000 }), { minLength: 2, maxLength: 50 })

test('against exact arithmetic on whole numbers, however far the values lie from zero', () => {
  fc.assert(fc.property(values, fc.constantFrom(0, 1e6, 2 ** 40), (x, far) => {
    const n = BigInt(x.length)
    const sum = x.reduce((total, value) => total + BigInt(value), 0n)
    const squares = x.reduce((total, value) => total + BigInt(value) ** 2n, 0n)
    const exact = Number(n * squares - sum * sum) / (x.length * (x.length - 1))
    const moved = x.map((value) => value + far)
    expect(Math.abs(mean(moved) - far - Number(sum) / x.length)).toBeLessThanOrEqual(1e-15 * (far + 1000))
    expect(Math.abs(sampleVariance(moved) - exact)).toBeLessThanOrEqual(1e-12 * exact + 1e-9 * Number(far > 1e9))
  }))
})

test('it can fail: the one-pass formula loses everything at 2^40', () => {
  const x = [1, 2, 6].map((value) => value + 2 ** 40)
  const onePass = (x.reduce((sum, v) => sum + v * v, 0) - x.reduce((sum, v) => sum + v, 0) ** 2 / 3) / 2
  expect(Math.abs(onePass - 7)).toBeGreaterThan(1)
  expect(sampleVariance(x)).toBe(7)
})

test('equal values have no spread, to the last bit', () => {
  expect(standardDeviation(new Float64Array(1000).fill(0.1))).toBe(0)
  expect(mean(new Float64Array(1000).fill(0.1))).toBe(0.1)
})

test('what cannot be computed with is refused by name', () => {
  expect(() => mean([])).toThrow('0')
  expect(() => sampleVariance([1])).toThrow('expected at least 2')
  expect(() => mean([1, Number.NaN])).toThrow('values[1] NaN')
  expect(() => sampleVariance([1, 2, Infinity])).toThrow('values[2] Infinity')
  expect(() => requireFinite([0, -Infinity], 'draws')).toThrow('draws[1] -Infinity')
})

test('a centre that is a little off, as rounding leaves it, is made good', () => {
  expect(sampleVariance([1, 2, 6], 3.01)).toBeCloseTo(7, 12)
})
