import fc from 'fast-check'
import { expect, test } from 'vitest'
import { holmAdjusted } from '../../../model/statistics/holm.ts'

/** Holm's own step-down rule, at one level: refuse while the smallest of the rest is at most alpha over their number. */
function refused(pValues: readonly number[], alpha: number): Set<number> {
  const order = pValues.map((_, i) => i).sort((one, other) => pValues[one] - pValues[other])
  const stop = order.findIndex((test, rank) => pValues[test] * (pValues.length - rank) > alpha)
  return new Set(stop === -1 ? order : order.slice(0, stop))
}

test('at every level the adjusted values refuse what the step-down rule does, in whatever order', () => {
  const p = fc.array(fc.double({ min: 0, max: 1, noNaN: true }), { maxLength: 12 })
  fc.assert(fc.property(p, fc.double({ min: 0.001, max: 0.999, noNaN: true }), (pValues, alpha) => {
    const adjusted = holmAdjusted(pValues)
    expect(new Set(pValues.map((_, i) => i).filter((i) => adjusted[i] <= alpha))).toEqual(refused(pValues, alpha))
  }))
})

test('it can fail: without the running maximum a later one would be refused alone', () => {
  expect([...holmAdjusted([0.02, 0.021, 0.5])]).toEqual([0.06, 0.06, 0.5])
})

test('what is no p-value is refused by name', () => {
  expect(() => holmAdjusted([0.1, 1.2])).toThrow('pValues[1] 1.2')
  expect(() => holmAdjusted([Number.NaN])).toThrow('NaN')
})
