import fc from 'fast-check'
import { expect, test } from 'vitest'
import { auditAllocation, leastTotal } from '../../../generator/intake/audit-allocation.ts'

test('posts go by size times standard deviation where no bound is met', () => {
  expect(auditAllocation({ sizes: [3000, 1000], sds: [0.5, 0.5] }, 400, 50)).toEqual([300, 100])
  expect(auditAllocation({ sizes: [1000, 1000], sds: [0.6, 0.2] }, 400, 50)).toEqual([300, 100])
})

test('a venue has at least the least, and no more than there is', () => {
  expect(auditAllocation({ sizes: [10_000, 60, 20], sds: [0.5, 0.5, 0.5] }, 400, 50)).toEqual([330, 50, 20])
  expect(auditAllocation({ sizes: [100, 1000], sds: [0.9, 0.01] }, 400, 50)).toEqual([100, 300])
  // Both bounds at once: what the first leaves lifts the second above its least.
  expect(auditAllocation({ sizes: [60, 400, 400], sds: [9, 1, 1] }, 200, 50)).toEqual([60, 70, 70])
})

test('by size alone where scores do not vary', () => {
  expect(auditAllocation({ sizes: [300, 100], sds: [0, 0] }, 200, 10)).toEqual([150, 50])
})

test('is whole, within bounds, adds up, and no unbounded venue has less for a larger claim', () => {
  const strata = fc.array(fc.record({ size: fc.integer({ min: 1, max: 5000 }), sd: fc.double({ min: 0, max: 1, noNaN: true }) }), { minLength: 1, maxLength: 8 })
  fc.assert(fc.property(strata, fc.nat(30), fc.double({ min: 0, max: 1, noNaN: true }), (given, least, part) => {
    const [sizes, sds] = [given.map(({ size }) => size), given.map(({ sd }) => sd)]
    const low = leastTotal(sizes, least)
    const total = Math.round(low + part * (sizes.reduce((sum, size) => sum + size, 0) - low))
    const counts = auditAllocation({ sizes, sds }, total, least)
    expect(counts.reduce((sum, count) => sum + count, 0)).toBe(total)
    for (const [v, count] of counts.entries()) {
      expect(Number.isInteger(count)).toBe(true)
      expect(count).toBeGreaterThanOrEqual(Math.min(least, sizes[v]))
      expect(count).toBeLessThanOrEqual(sizes[v])
      for (const [u, other] of counts.entries()) {
        // One post either way is rounding.
        if (sizes[v] * sds[v] >= sizes[u] * sds[u] && count < sizes[v] && other > Math.min(least, sizes[u])) expect(count).toBeGreaterThanOrEqual(other - 1)
      }
    }
  }), { numRuns: 300 })
})
