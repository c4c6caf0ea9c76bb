import { describe, expect, test } from 'vitest'
import { contrast, luminance } from '../../../../generator/theme/colour/contrast.ts'
import { type Demand, nearestPassing } from '../../../../generator/theme/colour/nearest-passing.ts'
import { distance, oklabOf } from '../../../../generator/theme/colour/oklab.ts'
import { colourOfBytes, linearOf } from '../../../../generator/theme/colour/srgb.ts'

const onWhite: readonly Demand[] = [{ ground: '#ffffff', least: 4.5 }]

const levels = Array.from({ length: 256 }, (_, byte) => linearOf(colourOfBytes([byte, byte, byte]))[0])

/** Distance of the nearest of every third level of red, green and blue, of whatever hue: 600,000 colours. */
function bruteForce(colour: string, least: number): number {
  const wanted = oklabOf(linearOf(colour))
  const most = 1.05 / least - 0.05
  let nearest = Infinity
  for (let red = 0; red < 256; red += 3) {
    for (let green = 0; green < 256; green += 3) {
      for (let blue = 0; blue < 256; blue += 3) {
        const light = [levels[red], levels[green], levels[blue]] as const
        if (luminance(light) <= most) nearest = Math.min(nearest, distance(oklabOf(light), wanted))
      }
    }
  }
  return nearest
}

const hue = (colour: string): number => {
  const [, a, b] = oklabOf(linearOf(colour))
  return (Math.atan2(b, a) * 180) / Math.PI
}

describe('the nearest colour that passes', () => {
  test.each(['#e8a33d', '#4f9bd9', '#7fb069', '#e0567a'])('%s: passes, keeps its hue, and no other colour is much nearer', (colour) => {
    const found = nearestPassing(colour, onWhite)!
    expect(contrast(found, '#ffffff')).toBeGreaterThanOrEqual(4.5)
    expect(contrast(found, '#ffffff')).toBeLessThan(4.7)
    expect(Math.abs(hue(found) - hue(colour))).toBeLessThan(2)
    const apart = distance(oklabOf(linearOf(found)), oklabOf(linearOf(colour)))
    const nearest = bruteForce(colour, 4.5)
    expect(apart / nearest).toBeLessThan(1.02)
  })

  test('of a light grey on white it is the lightest that passes', () => {
    expect(nearestPassing('#999999', onWhite)).toBe('#767676')
  })

  test('a colour that passes stays, and where nothing passes there is none', () => {
    expect(nearestPassing('#0a5674', onWhite)).toBe('#0a5674')
    expect(nearestPassing('#777777', [{ ground: '#777777', least: 7 }])).toBeNull()
  })

  test('on a dark ground it is lighter', () => {
    const found = nearestPassing('#335577', [{ ground: '#222222', least: 4.5 }])!
    expect(luminance(linearOf(found))).toBeGreaterThan(luminance(linearOf('#335577')))
    expect(contrast(found, '#222222')).toBeGreaterThanOrEqual(4.5)
  })

  test('holds on the worst of several grounds', () => {
    const grounds = ['#ffffff', '#f8ecd0', '#eef1f2']
    const found = nearestPassing('#e8a33d', grounds.map((ground) => ({ ground, least: 4.5 })))!
    for (const ground of grounds) expect(contrast(found, ground)).toBeGreaterThanOrEqual(4.5)
  })
})
