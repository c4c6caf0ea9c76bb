import fc from 'fast-check'
import { expect, test } from 'vitest'
import { quantiles, selectQuantile, sortedQuantile } from '../../../model/statistics/quantile.ts'

// Hyndman and Fan (1996), definition 7, by hand: (n - 1) p = 2.25 of 10 values at p = 0.25.
test('ten values, by hand', () => {
  const x = [15, 20, 35, 40, 50, 55, 70, 80, 90, 100]
  expect([...quantiles(x, [0, 0.25, 0.5, 0.9, 1])]).toEqual([15, 36.25, 52.5, 91, 100])
})

test('it can fail: definition 6, (n + 1) p, gives another figure', () => {
  const definition6 = 20 + 0.75 * (35 - 20)
  expect(sortedQuantile([15, 20, 35, 40, 50, 55, 70, 80, 90, 100], 0.25)).not.toBe(definition6)
})

const numbers = fc.array(fc.oneof(fc.integer({ min: -5, max: 5 }), fc.double({ min: -1e6, max: 1e6, noNaN: true })), { minLength: 1, maxLength: 300 })

test('bounds, order, and the values themselves at their own places', () => {
  fc.assert(fc.property(numbers, fc.double({ min: 0, max: 1, noNaN: true }), fc.double({ min: 0, max: 1, noNaN: true }), (x, p, q) => {
    const sorted = Float64Array.from(x).sort()
    const [low, high] = [Math.min(p, q), Math.max(p, q)].map((probability) => sortedQuantile(sorted, probability))
    expect(low).toBeLessThanOrEqual(high)
    expect(sortedQuantile(sorted, 0)).toBe(sorted[0])
    expect(sortedQuantile(sorted, 1)).toBe(sorted[sorted.length - 1])
    if (x.length === 5) expect(sortedQuantile(sorted, 0.5)).toBe(sorted[2])
  }))
})

test('selection gives the same figures as sorting, bit for bit, also when begun from a lower quantile', () => {
  fc.assert(fc.property(numbers, fc.double({ min: 0, max: 1, noNaN: true }), fc.double({ min: 0, max: 1, noNaN: true }), (x, p, q) => {
    const [low, high] = [Math.min(p, q), Math.max(p, q)]
    const scratch = Float64Array.from(x)
    const first = selectQuantile(scratch, low)
    expect([first.value, selectQuantile(scratch, high, first.below).value]).toEqual([...quantiles(x, [low, high])])
  }))
})

test('inputs are left as they are', () => {
  const x = Float64Array.of(3, 1, 2)
  quantiles(x, [0.5])
  expect([...x]).toEqual([3, 1, 2])
})

test('what cannot be computed with is refused by name', () => {
  expect(() => quantiles([1, Number.NaN], [0.5])).toThrow('values[1] NaN')
  expect(() => quantiles([], [0.5])).toThrow('expected at least 1')
  expect(() => sortedQuantile([1], 1.01)).toThrow('1.01')
  expect(() => selectQuantile(new Float64Array(2), Number.NaN)).toThrow('NaN')
})
