import { describe, expect, test } from 'vitest'
import { allVisions, leastDifference, seenBy } from '../../../../generator/theme/colour/dichromacy.ts'
import { linearOf } from '../../../../generator/theme/colour/srgb.ts'

describe('a simulated eye', () => {
  test.each(allVisions)('sees white, grey and black as they are: %s', (vision) => {
    // a dichromat's matrix keeps the greys, so its rows sum to 1: a wrong digit would show here
    for (const colour of ['#ffffff', '#808080', '#000000']) {
      seenBy(vision, linearOf(colour)).forEach((part, at) => { expect(part).toBeCloseTo(linearOf(colour)[at], 5) })
    }
  })

  test('red and green of one lightness are near for those who lack the cones, and far for those who have them', () => {
    const [red, green] = ['#c8553d', '#6e8a2c']
    const { difference, vision } = leastDifference(red, green)
    expect(difference).toBeLessThan(0.1)
    expect(['protanopia', 'deuteranopia']).toContain(vision)
  })

  test('blue and green are near where short cones lack', () => {
    expect(leastDifference('#3f7fae', '#2f8a7a').vision).toBe('tritanopia')
  })

  test('what differs in lightness stays apart for all', () => {
    expect(leastDifference('#8c1d18', '#d9a79f').difference).toBeGreaterThan(0.25)
    expect(leastDifference('#123456', '#123456').difference).toBe(0)
  })
})
