import fc from 'fast-check'
import { expect, test } from 'vitest'
import { twoSidedQuantile, wilsonInterval } from '../../../model/statistics/wilson.ts'

const sample = fc.integer({ min: 1, max: 500 }).chain((n) => fc.tuple(fc.integer({ min: 0, max: n }), fc.constant(n)))

test('its bounds are where the score test just rejects, inside [0, 1], and mirrored for failures', () => {
  fc.assert(fc.property(sample, fc.constantFrom(0.5, 0.9, 0.99), ([x, n], level) => {
    const { low, high } = wilsonInterval(x, n, level)
    const z = twoSidedQuantile(level)
    for (const bound of [low, high].filter((value) => value > 0 && value < 1)) {
      expect(Math.abs(x / n - bound) / Math.sqrt((bound * (1 - bound)) / n)).toBeCloseTo(z, 6)
    }
    expect(low).toBeGreaterThanOrEqual(0)
    expect(high).toBeLessThanOrEqual(1)
    expect(low).toBeLessThanOrEqual(x / n)
    expect(high).toBeGreaterThanOrEqual(x / n)
    expect(wilsonInterval(n - x, n, level).low).toBeCloseTo(1 - high, 12)
  }))
})

test('what is no proportion is refused by name', () => {
  expect(() => wilsonInterval(3, 2, 0.9)).toThrow('3 of 2')
  expect(() => wilsonInterval(0, 0, 0.9)).toThrow('0 of 0')
  expect(() => wilsonInterval(1, 2, 90)).toThrow('level 90')
})
