import { expect, test } from 'vitest'
import { drawChart } from '../../../../generator/render/charts/draw-chart.ts'
import { readOwnChart } from '../../../../generator/render/charts/own-chart.ts'
import type { Json } from '../../../../generator/render/charts/chart-spec.ts'
import type { DrawingSize } from '../../../../generator/theme/theme.ts'
import { sampleRendering } from '../sample-document.ts'

const rendering = await sampleRendering()
const draw = (spec: Json, size: DrawingSize = 'wide') => drawChart(readOwnChart('mine', 'charts/mine.json', JSON.stringify(spec), rendering), rendering.tables, rendering.words, rendering.theme, size)
const chart = (mark: string, more: object = {}) => ({
  data: { name: 'venues' }, mark, height: { step: 26 },
  encoding: { y: { field: 'label', type: 'nominal', axis: { title: null } }, x: { field: 'share', type: 'quantitative', axis: { title: null, format: '.0%' } }, ...more },
}) as Json
/** Vega's own colours of marks and categories, as its manual has them (from memory: tableau10). */
const foreign = /#4c78a8|#f58518|#e45756|#72b7b2|#54a24b|#eeca3b|#b279a2|#ff9da6|#9d755d|#bab0ac/i

const { ink, accent, styles } = rendering.theme.chart
/** A look that is called as a mark is that mark's. */
const colours: Readonly<Record<string, string>> = { rule: ink, bar: String(styles['bar']!['color']), boxplot: accent }

test.each(['bar', 'tick', 'rect', 'line', 'point', 'circle', 'square', 'area', 'trail', 'rule', 'boxplot', 'errorband'])('a %s without looks has a colour of the theme', async (mark) => {
  const svg = await draw(mark === 'rect' ? chart(mark, { x2: { datum: 0 } }) : chart(mark))
  expect(svg).not.toMatch(foreign)
  expect(svg.toLowerCase()).toContain(colours[mark] ?? accent)
})

test('series without looks have colours of the theme', async () => {
  const svg = await draw(chart('bar', { color: { field: 'label', type: 'nominal' } }))
  expect(svg).not.toMatch(foreign)
  expect(svg.toLowerCase()).toContain(rendering.theme.chart.series[1])
})

test.each([['wide', 12], ['narrow', 7]] as const)('an axis of figures has room between its labels: %s', async (size, most) => {
  const labels = [...(await draw(chart('bar'), size)).matchAll(/>(\d+%)</g)]
  expect(labels.length).toBeGreaterThan(2)
  expect(labels.length).toBeLessThanOrEqual(most)
})
