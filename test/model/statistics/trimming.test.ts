import fc from 'fast-check'
import { expect, test } from 'vitest'
import { trimWeights } from '../../../model/statistics/trimming.ts'

const rows = fc.array(fc.record({ weight: fc.double({ min: 0.01, max: 100, noNaN: true }), count: fc.integer({ min: 1, max: 9 }) }), { minLength: 1, maxLength: 40 })

test('inside the bounds, the sum kept, and all that are strictly inside moved by the same', () => {
  fc.assert(fc.property(rows, fc.double({ min: 0, max: 0.95, noNaN: true }), fc.double({ min: 1.05, max: 9, noNaN: true }), (given, low, high) => {
    const [weights, counts] = [given.map((row) => row.weight), given.map((row) => row.count)]
    const total = given.reduce((sum, row) => sum + row.weight * row.count, 0)
    const mean = total / counts.reduce((a, b) => a + b, 0)
    const bounds = { lower: low * mean, upper: high * mean }
    const found = trimWeights(weights, counts, bounds)
    expect(found.every((weight) => weight >= bounds.lower && weight <= bounds.upper)).toBe(true)
    expect(Math.abs(found.reduce((sum, weight, i) => sum + weight * counts[i], 0) / total - 1)).toBeLessThan(1e-12)
    const moved = [...found.keys()].filter((i) => found[i] > bounds.lower && found[i] < bounds.upper).map((i) => found[i] - weights[i])
    for (const shift of moved) expect(Math.abs(shift - moved[0])).toBeLessThan(1e-9)
  }))
})

test('weights inside the bounds stay as they are', () => {
  expect([...trimWeights([1, 2, 3], [1, 1, 1], { lower: 0.5, upper: 3 })]).toEqual([1, 2, 3])
})

test('one that the spreading carries past the bound is held there too', () => {
  expect([...trimWeights([1, 4.9, 9.1], [1, 1, 1], { lower: 0, upper: 5 })].map((weight) => Number(weight.toFixed(12)))).toEqual([5, 5, 5])
  expect([...trimWeights([1, 3.9, 7.1], [1, 1, 1], { lower: 0, upper: 5 })].map((weight) => Number(weight.toFixed(12)))).toEqual([2.05, 4.95, 5])
})

test('refused by name', () => {
  expect(() => trimWeights([1, 2, 3], [1, 1, 1], { lower: 2.5, upper: 4 })).toThrow('[2.5, 4]')
  expect(() => trimWeights([1, 2, 3], [1, 1, 1], { lower: 0, upper: 1.5 })).toThrow('mean weight 2')
  expect(() => trimWeights([1, 2], [0, 0], { lower: 0, upper: 4 })).toThrow('mean weight NaN')
})
