import { beforeAll, describe, expect, test } from 'vitest'
import { contrast } from '../../../generator/theme/colour/contrast.ts'
import { loadTheme } from '../../../generator/theme/load-theme.ts'
import type { Theme } from '../../../generator/theme/theme.ts'
import { templates } from '../render/sample-document.ts'

// axe-core cannot judge text inside a drawing, so its contrast is held here.
let theme: Theme
beforeAll(async () => { theme = await loadTheme(`${templates}theme`) })

const colourOf = (style: string): string => String(theme.chart.styles[style].color)

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
    const ratios = shares.map((colour) => contrast(colour, paper))
    for (const ratio of ratios) expect(ratio).toBeGreaterThanOrEqual(3)
    expect(ratios).toEqual([...ratios].sort((a, b) => b - a))
  })
})
