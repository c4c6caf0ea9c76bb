import { describe, expect, test } from 'vitest'
import type { ChartSpec } from '../../../../generator/render/charts/chart-spec.ts'
import { drawChart } from '../../../../generator/render/charts/draw-chart.ts'
import type { Rendering } from '../../../../generator/render/render.ts'
import type { DrawingSize } from '../../../../generator/theme/theme.ts'
import type { Findings } from '../../../../model/findings/schema.ts'
import { postsAlone, sampleFindings, withVerdict } from '../../../support/sample-findings.ts'
import { chartNames, sampleRendering } from '../sample-document.ts'
import { stretchedFindings } from '../stretched-findings.ts'

const draw = async ({ charts, tables, words, theme }: Rendering, name: string, size: DrawingSize = 'wide'): Promise<string> => {
  const spec = charts.get(name)
  if (spec === undefined) throw new Error(`no chart ${name}`)
  return drawChart(spec, tables, words, theme, size)
}
const widthOf = (svg: string): number => Number(/viewBox="0 0 ([\d.]+) /.exec(svg)?.[1])
const textsOf = (svg: string): readonly string[] => [...svg.matchAll(/<text[^>]*>([\s\S]*?)<\/text>/g)].map((match) => match[1].replace(/<[^>]+>/g, ' ').trim())

describe.each(['wide', 'narrow'] as const)('%s', (size) => {
  test.each([
    ['the sample', undefined],
    ['one venue, one topic, half a year', { venues: 1, topics: 1, steps: 26, grid: 'week' }],
    ['twelve venues, twenty topics, ten years', { venues: 12, topics: 20, steps: 520, grid: 'week' }],
    ['months', { venues: 3, topics: 4, steps: 60, grid: 'month' }],
  ] as const)('every chart of %s keeps to the width of the page', async (_what, stretch) => {
    const rendering = await sampleRendering(stretch === undefined ? undefined : stretchedFindings(stretch))
    for (const name of chartNames) {
      const svg = await draw(rendering, name, size)
      expect(svg, name).toMatch(/^<svg viewBox="0 0 [\d.]+ [\d.]+"/)
      expect(Math.abs(widthOf(svg) / rendering.theme.chart.widths[size] - 1), name).toBeLessThan(0.03)
      expect(svg, name).not.toMatch(/NaN|undefined|Infinity/)
      expect(svg.match(/<path/g)?.length ?? 0, name).toBeGreaterThan(2)
    }
  })
})

test('the same bytes every time, whatever was drawn between', async () => {
  const rendering = await sampleRendering()
  const first = await draw(rendering, 'venues')
  await draw(rendering, 'opinion')
  expect(await draw(rendering, 'venues')).toBe(first)
})

test('a gap in the raw average is a gap, not a zero', async () => {
  const gapless = await draw(await sampleRendering(stretchedFindings({ venues: 1, topics: 1, steps: 12, grid: 'week' })), 'opinion')
  const gapped = await draw(await sampleRendering(stretchedFindings({ venues: 1, topics: 1, steps: 26, grid: 'week' })), 'opinion')
  const linePieces = (svg: string): number => Math.max(...[...svg.matchAll(/ d="([^"]+)"/g)].map((match) => (match[1].match(/M/g) ?? []).length))
  expect(linePieces(gapped)).toBeGreaterThan(linePieces(gapless))
})

describe('the survey', () => {
  const withSurvey = async (findings: Findings) => sampleRendering(findings)
  test('stands below opinion where there is one, named by its metric', async () => {
    const [with_, without] = [await draw(await withSurvey(sampleFindings()), 'opinion'), await draw(await withSurvey(postsAlone()), 'opinion')]
    expect(textsOf(with_)).toContain('Survey: Favourability, %')
    expect(textsOf(without).join(' ')).not.toContain('Survey')
    const dates = (svg: string) => textsOf(svg).filter((text) => text === '2025').length
    expect([dates(with_), dates(without)]).toEqual([1, 1])
  })
  test.each(['tracks', 'contradicts', 'not-established', 'too-few-waves'] as const)('its charts can be drawn with the verdict %s', async (verdict) => {
    const rendering = await withSurvey(withVerdict(verdict))
    const names = verdict === 'too-few-waves' ? ['tracker', 'agreement'] : ['tracker', 'agreement', 'survey-lags', 'survey-forecasts', 'lag-weights']
    for (const name of names) expect(await draw(rendering, name), name).not.toMatch(/NaN|undefined|Infinity/)
  })
  test('the best lag is written with its correlation, the posts with how far they are moved', async () => {
    const rendering = await sampleRendering()
    expect(textsOf(await draw(rendering, 'survey-lags'))).toEqual(expect.arrayContaining(['0.84', '0.22', '0.5']))
    expect(textsOf(await draw(rendering, 'agreement'))).toContain('Posts, moved 4 week later')
    expect(textsOf(await draw(rendering, 'lag-weights'))).toContain('28%')
  })
  test('hidden waves leave a gap: no point is drawn for them', async () => {
    const findings = sampleFindings()
    const points = (svg: string) => svg.match(/<path[^>]*transform="translate/g)?.length ?? 0
    const hidden = { ...findings, survey: { ...findings.survey!, waves: findings.survey!.waves.map((wave, at) => (at < 10 ? { ...wave, shown: 'hidden' as const } : wave)) } }
    expect(points(await draw(await withSurvey(findings), 'agreement')) - points(await draw(await withSurvey(hidden), 'agreement'))).toBe(10)
  })
})

describe('what is written', () => {
  test('the last bar of the decomposition is the raw change, figures as the document prints them', async () => {
    const texts = textsOf(await draw(await sampleRendering(), 'decomposition'))
    expect(texts.filter((text) => /^[+\u2212]?\d+\.\d$/.test(text))).toEqual(expect.arrayContaining(['+2.2', '\u22121.7']))
    expect(texts).toContain('raw_change')
  })
  test('axes count in plain figures, also in tens', async () => {
    const findings = stretchedFindings({ venues: 2, topics: 3, steps: 26, grid: 'week' })
    const far = { ...findings, topics: findings.topics.map((of, index) => ({ ...of, offset: { mean: 30 * index - 30, low: 30 * index - 32, high: 30 * index - 28, sd: 1 } })) }
    const texts = textsOf(await draw(await sampleRendering(far), 'topics'))
    expect(texts).toEqual(expect.arrayContaining(['+20', '0', '\u221220']))
    expect(texts.join(' ')).not.toMatch(/\de[+\u2212-]?\d/)
  })
  test('labels of untrusted origin stay text', async () => {
    const findings = stretchedFindings({ venues: 2, topics: 2, steps: 26, grid: 'week' })
    const evil = { ...findings, topics: findings.topics.map((of) => ({ ...of, label: '<script>"&' })) }
    const svg = await draw(await sampleRendering(evil), 'topics')
    expect(svg).not.toContain('<script')
    expect(svg).toContain('&lt;script&gt;')
  })
  test('ids carry the name of the chart, and no mark an attribute of its own for readers', async () => {
    const svg = await draw(await sampleRendering(), 'opinion')
    for (const [, id] of svg.matchAll(/ id="([^"]+)"/g)) expect(id).toMatch(/^opinion-wide-/)
    expect(svg).not.toMatch(/aria-|role=/)
  })
})

test('a table that is not there is named', async () => {
  const { tables, words, theme } = await sampleRendering()
  const spec: ChartSpec = { name: 'c', data: { name: 'nothing' }, mark: 'point', encoding: {} }
  await expect(drawChart(spec, tables, words, theme)).rejects.toThrow('"nothing" in chart c')
})

test('what Vega-Lite warns of does not pass', async () => {
  const { tables, words, theme } = await sampleRendering()
  const spec: ChartSpec = { name: 'c', data: { name: 'venues' }, mark: 'bar', encoding: { x: { field: 'share', type: 'quantitative', scale: { wobble: 1, type: 'band' } } } }
  await expect(drawChart(spec, tables, words, theme)).rejects.toThrow('Unexpected warning while drawing chart c')
})
