import { readFile } from 'node:fs/promises'
import { beforeAll, describe, expect, test } from 'vitest'
import { loadTheme, type Theme } from '../../../generator/render/theme.ts'
import { templates } from './sample-document.ts'

// axe-core cannot judge text inside a drawing, so its contrast is held here.
let theme: Theme
beforeAll(async () => { theme = await loadTheme(`${templates}theme`) })

/** Relative luminance and contrast as WCAG 2.2 defines them. */
function luminance(colour: string): number {
  const [red, green, blue] = [1, 3, 5].map((at) => Number.parseInt(colour.slice(at, at + 2), 16) / 255).map((part) => (part <= 0.04045 ? part / 12.92 : ((part + 0.055) / 1.055) ** 2.4))
  return 0.2126 * red + 0.7152 * green + 0.0722 * blue
}
function contrast(one: string, other: string): number {
  const [darker, lighter] = [luminance(one), luminance(other)].sort((a, b) => a - b)
  return (lighter + 0.05) / (darker + 0.05)
}
const colourOf = (style: string): string => String(theme.chart.styles[style].color)

test('black on white is 21, grey #777777 on white just under 4.5', () => {
  expect(contrast('#000000', '#ffffff')).toBeCloseTo(21, 9)
  expect(contrast('#777777', '#ffffff')).toBeLessThan(4.5)
})

test('every label has a contrast of 4.5 on paper', () => {
  const labels = Object.keys(theme.chart.styles).filter((style) => style.startsWith('label-'))
  expect(labels.length).toBeGreaterThan(3)
  for (const style of labels) expect(contrast(colourOf(style), theme.chart.paper), style).toBeGreaterThanOrEqual(4.5)
  expect(contrast(theme.chart.quiet, theme.chart.paper)).toBeGreaterThanOrEqual(4.5)
})

describe('marks that carry meaning have a contrast of 3 on paper', () => {
  test.each(['adjusted', 'raw', 'bar', 'base-interval', 'bar-opinion', 'bar-total', 'bar-lost', 'whisker', 'interval', 'dot', 'base-dot', 'zero', 'survey-interval', 'survey-dot', 'survey-line', 'raw-line', 'best-lag'])('%s', (style) => {
    expect(contrast(colourOf(style), theme.chart.paper)).toBeGreaterThanOrEqual(3)
  })
  test('shares, from dark to light', () => {
    const { shares, paper } = theme.chart
    for (const colour of shares) expect(contrast(colour, paper)).toBeGreaterThanOrEqual(3)
    expect(shares.map(luminance)).toEqual(shares.map(luminance).sort((a, b) => a - b))
  })
})

test('the style sheet and the charts use the same ink, grey and accent', async () => {
  const css = await readFile(`${templates}theme/page.css`, 'utf8')
  expect(css).toContain(`--ink: ${theme.chart.ink}`)
  expect(css).toContain(`--quiet: ${theme.chart.quiet}`)
  expect(css).toContain(`--accent: ${colourOf('adjusted')}`)
})
