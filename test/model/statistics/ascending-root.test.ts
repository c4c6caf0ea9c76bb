import fc from 'fast-check'
import { expect, test } from 'vitest'
import { ascendingRoot } from '../../../model/statistics/ascending-root.ts'

test('a root of straight pieces, wherever the search starts', () => {
  const pieces = fc.array(fc.record({ from: fc.double({ min: -5, max: 5, noNaN: true }), length: fc.double({ min: 0.01, max: 5, noNaN: true }), slope: fc.double({ min: 0.01, max: 100, noNaN: true }) }), { minLength: 1, maxLength: 10 })
  fc.assert(fc.property(pieces, fc.double({ min: -10, max: 10, noNaN: true }), fc.double({ min: 0.001, max: 0.999, noNaN: true }), (rows, start, part) => {
    const rise = rows.reduce((sum, { length, slope }) => sum + length * slope, 0)
    const f = (x: number) => rows.reduce(({ value, slope }, row) => ({
      value: value + row.slope * Math.min(row.length, Math.max(0, x - row.from)),
      slope: slope + (x > row.from && x < row.from + row.length ? row.slope : 0),
    }), { value: -part * rise, slope: 0 })
    expect(Math.abs(f(ascendingRoot(f, -10, 10, start)).value)).toBeLessThan(1e-12 * rise)
  }))
})

test('a curved one, to rounding', () => {
  expect(ascendingRoot((x) => ({ value: x ** 3 - 2, slope: 3 * x * x }), -4, 4, 0)).toBeCloseTo(Math.cbrt(2), 14)
})
