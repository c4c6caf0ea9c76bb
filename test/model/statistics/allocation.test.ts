import fc from 'fast-check'
import { expect, test } from 'vitest'
import { costAllocation, neymanAllocation } from '../../../model/statistics/allocation.ts'

const strata = fc.array(fc.record({ size: fc.integer({ min: 1, max: 1000 }), sd: fc.double({ min: 0.1, max: 20, noNaN: true }), cost: fc.double({ min: 0.1, max: 9, noNaN: true }) }), { minLength: 2, maxLength: 8 })
const sum = (values: Iterable<number>) => [...values].reduce((a, b) => a + b, 0)

test('no shift of interviews between two strata is more precise, nor at the same cost', () => {
  fc.assert(fc.property(strata, fc.nat(), fc.nat(), fc.double({ min: -0.5, max: 0.5, noNaN: true }), (rows, from, to, part) => {
    const [sizes, sds, costs] = [rows.map((row) => row.size), rows.map((row) => row.sd), rows.map((row) => row.cost)]
    const variance = (allocation: ArrayLike<number>) => rows.reduce((total, { size, sd }, i) => total + (size * sd) ** 2 / allocation[i], 0)
    const [i, j] = [from % rows.length, to % rows.length]
    const shifted = (best: Float64Array, price: readonly number[]) => {
      const moved = part * Math.min(best[i] * price[i], best[j] * price[j])
      return best.map((n, at) => n + (at === i ? moved / price[i] : 0) - (at === j ? moved / price[j] : 0))
    }
    const [precise, cheap] = [neymanAllocation(sizes, sds, 100), costAllocation(sizes, sds, costs, 100)]
    expect(sum(precise)).toBeCloseTo(100, 9)
    expect(sum(cheap)).toBeCloseTo(100, 9)
    expect(variance(shifted(precise, costs.map(() => 1)))).toBeGreaterThanOrEqual(variance(precise) * (1 - 1e-12))
    expect(variance(shifted(cheap, costs))).toBeGreaterThanOrEqual(variance(cheap) * (1 - 1e-12))
  }))
})

test('it can fail: at unequal costs Neyman\'s allocation is not the most precise for its money', () => {
  const [sizes, sds, costs] = [[100, 100], [1, 1], [1, 9]]
  const [precise, cheap] = [neymanAllocation(sizes, sds, 100), costAllocation(sizes, sds, costs, 100)]
  const money = (allocation: Float64Array) => allocation[0] * costs[0] + allocation[1] * costs[1]
  const atSameMoney = cheap.map((n) => (n * money(precise)) / money(cheap))
  expect(1 / atSameMoney[0] + 1 / atSameMoney[1]).toBeLessThan(0.9 * (1 / precise[0] + 1 / precise[1]))
})

test('a stratum of one mind gets no interview', () => { expect([...neymanAllocation([10, 10], [0, 2], 7)]).toEqual([0, 7]) })

test('refused by name', () => {
  expect(() => neymanAllocation([1, 2], [1], 10)).toThrow('sds 1')
  expect(() => neymanAllocation([1, -2], [1, 1], 10)).toThrow('sizes[1] -2')
  expect(() => costAllocation([1, 2], [1, 1], [1, 0], 10)).toThrow('costs[1] 0')
  expect(() => neymanAllocation([1, 2], [1, 1], -1)).toThrow('n -1')
  expect(() => neymanAllocation([1, 2], [0, 0], 10)).toThrow('none of 2')
})
