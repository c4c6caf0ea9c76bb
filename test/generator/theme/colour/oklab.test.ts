import fc from 'fast-check'
import { describe, expect, test } from 'vitest'
import { lightOf, oklabOf } from '../../../../generator/theme/colour/oklab.ts'
import { colourOf, linearOf } from '../../../../generator/theme/colour/srgb.ts'

describe('OKLab', () => {
  // CSS Color 4 and its tests: oklab() of the named colours, to 3 decimals; from memory
  test.each([
    ['#ffffff', [1, 0, 0]], ['#000000', [0, 0, 0]], ['#ff0000', [0.628, 0.2249, 0.1258]], ['#008000', [0.5198, -0.1403, 0.1077]], ['#0000ff', [0.452, -0.0325, -0.3115]],
  ] as const)('%s', (colour, published) => {
    oklabOf(linearOf(colour)).forEach((part, at) => { expect(part).toBeCloseTo(published[at], 3) })
  })

  test('there and back is the same colour', () => {
    fc.assert(fc.property(fc.integer({ min: 0, max: 0xffffff }), (number) => {
      const colour = `#${number.toString(16).padStart(6, '0')}`
      expect(colourOf(lightOf(oklabOf(linearOf(colour))))).toBe(colour)
    }))
  })
})
