import { readFile } from 'node:fs/promises'
import { describe, expect, test } from 'vitest'
import { parse } from 'yaml'
import { contrast } from '../../../generator/theme/colour/contrast.ts'
import { leastDifference } from '../../../generator/theme/colour/dichromacy.ts'
import { oklabOf } from '../../../generator/theme/colour/oklab.ts'
import { linearOf } from '../../../generator/theme/colour/srgb.ts'
import { houseLooks } from '../../../generator/theme/house-looks.ts'
import { paletteFaults } from '../../../generator/theme/palette-faults.ts'
import { type GivenColours, paletteOf } from '../../../generator/theme/palette.ts'
import { templates } from '../render/sample-document.ts'

const house = houseLooks.parse(parse(await readFile(`${templates}theme/theme.yaml`, 'utf8'))).colours
const faultsOf = (given: GivenColours) => paletteFaults(paletteOf(house, given), given, (role) => `theme.yaml colours.${role}`)

describe('a palette', () => {
  test('is the house\u2019s to the bit where nothing is given', () => { expect(paletteOf(house, {})).toEqual(house) })

  test('follows what is given: hairlines the paper and ink, companions the raw average', () => {
    const given = { paper: '#fffaf0', ink: '#2b1f2a', raw: '#94886f' }
    const palette = paletteOf(house, given)
    expect(palette).toMatchObject(given)
    const lightness = (colour: string) => oklabOf(linearOf(colour))[0]
    for (const tint of ['rule', 'wash', 'base_span', 'leader'] as const) {
      expect(palette[tint]).not.toBe(house[tint])
      expect(Math.abs(lightness(palette[tint]) - lightness(house[tint]))).toBeLessThan(0.05)
    }
    for (const shade of ['bar', 'raw_line', 'share_dark', 'share_middle'] as const) expect(contrast(palette[shade], given.paper)).toBeGreaterThanOrEqual(3)
  })

  test('a derived colour that would fall short takes the nearest that does not', () => {
    const { paper, share_middle: middle } = paletteOf({ ...house, share_middle: '#b0b8bc' }, { raw: '#8f8a93' })
    expect(contrast(middle, paper)).toBeGreaterThanOrEqual(3)
  })
})

test('marks that nobody chose keep their contrast on another paper', () => {
  const palette = paletteOf(house, { paper: '#fff6e6' })
  expect(contrast(house.raw, '#fff6e6')).toBeLessThan(3)
  for (const role of ['raw', 'loss', 'caution', 'serious', 'bar'] as const) expect(contrast(palette[role], '#fff6e6')).toBeGreaterThanOrEqual(3)
  expect(palette.serious).toBe(house.serious)
})

describe('the rules', () => {
  test('the house passes all of them, though nobody gave it', () => {
    expect(faultsOf({ ...house, ink: house.ink })).toEqual([])
  })

  test('faint text is refused with its ratio and the nearest colour that passes', () => {
    const [fault, ...others] = faultsOf({ accent: '#e8a33d' })
    expect(others).toEqual([])
    expect(fault).toMatchObject({ code: 'theme-contrast', place: 'theme.yaml colours.accent' })
    expect(fault!.message).toBe('Unexpected contrast of 1.83:1 between `accent` #e8a33d and `highlight` #f8ecd0 at theme.yaml colours.accent, expected 4.5:1 or more (WCAG 2.2 AA, text).')
    const nearest = /'(#[0-9a-f]{6})'/.exec(fault!.mend)![1]
    expect(faultsOf({ accent: nearest })).toEqual([])
  })

  test('a ratio just short is not rounded up', () => {
    const [fault] = faultsOf({ raw: '#959595' })
    expect(fault!.message).toMatch(/contrast of 2\.99:1 .* expected 3:1/)
  })

  test.each(['quiet', 'loss', 'caution', 'serious', 'raw'] as const)('%s is held too', (role) => {
    expect(faultsOf({ [role]: '#dddddd' }).map(({ code, place }) => [code, place])).toEqual([['theme-contrast', `theme.yaml colours.${role}`]])
  })

  test('ground that makes the house\u2019s own text faint is told, too', () => {
    expect(faultsOf({ highlight: '#9a8866' }).map(({ code }) => code)).toContain('theme-contrast')
    expect(faultsOf({ paper: '#334455' }).map(({ code }) => code)).toEqual(['theme-paper-dark'])
  })

  test('colours that some cannot tell apart are refused, the pair and the eye named', () => {
    const given = { accent: '#a3552c', loss: '#6d7a00' }
    expect(leastDifference(given.accent, given.loss).difference).toBeLessThan(0.1)
    expect(faultsOf(given).map(({ message }) => message).join()).toMatch(/nearness of `accent` #a3552c and `loss` #6d7a00 as seen with (protanopia|deuteranopia)/)
  })

  test.each(['#5f6d66', '#1c2a33'])('of a colour that no account can give the key that moves it is named: raw %s', (raw) => {
    const faults = faultsOf({ raw }).filter(({ code }) => code === 'theme-alike')
    expect(faults.map(({ message }) => message).join()).toContain('`bar`')
    expect(new Set(faults.map(({ place }) => place))).toEqual(new Set(['theme.yaml colours.raw']))
  })

  test('an accent as dark as ink stands out for nobody', () => {
    expect(faultsOf({ accent: '#1c2a33' }).map(({ code, message }) => [code, /`accent`.*`ink`/.test(message)])).toContainEqual(['theme-alike', true])
  })
})
