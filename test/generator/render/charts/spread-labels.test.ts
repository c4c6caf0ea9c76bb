import fc from 'fast-check'
import { expect, test } from 'vitest'
import { spreadLabels } from '../../../../generator/render/charts/spread-labels.ts'

test('the example of the docstring', () => {
  const [low, high] = spreadLabels([0.5, 0.5], [0.2, 0.2], [0, 1])
  expect(low).toBeCloseTo(0.4, 12)
  expect(high).toBeCloseTo(0.6, 12)
})

test('labels with room stay where they want to stand', () => {
  expect(spreadLabels([0.2, 0.5, 0.8], [0.1, 0.1, 0.1], [0, 1]).map((place) => Math.round(place * 1e9) / 1e9)).toEqual([0.2, 0.5, 0.8])
})

const labels = fc.array(fc.record({ place: fc.double({ min: 0, max: 1, noNaN: true }), size: fc.double({ min: 0.001, max: 0.3, noNaN: true }) }), { minLength: 1, maxLength: 15 })

test('never overlap where they fit, never leave the range, keep their order', () => {
  fc.assert(fc.property(labels, (given) => {
    const wanted = given.map((label) => label.place).sort((a, b) => a - b)
    const sizes = given.map((label) => label.size)
    const shrink = Math.min(1, 1 / sizes.reduce((sum, size) => sum + size, 0))
    const places = spreadLabels(wanted, sizes, [0, 1])
    expect(places[0] - (sizes[0] * shrink) / 2).toBeGreaterThanOrEqual(-1e-9)
    expect(places[places.length - 1] + (sizes[sizes.length - 1] * shrink) / 2).toBeLessThanOrEqual(1 + 1e-9)
    for (let index = 1; index < places.length; index += 1) {
      expect(places[index] - places[index - 1]).toBeGreaterThanOrEqual(((sizes[index] + sizes[index - 1]) / 2) * shrink - 1e-9)
    }
  }))
})
