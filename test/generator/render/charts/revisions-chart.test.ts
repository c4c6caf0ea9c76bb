import { describe, expect, test } from 'vitest'
import { drawChart } from '../../../../generator/render/charts/draw-chart.ts'
import type { DrawingSize } from '../../../../generator/theme/theme.ts'
import type { Findings } from '../../../../model/findings/schema.ts'
import { sampleFindings } from '../../../support/sample-findings.ts'
import { sampleRendering } from '../sample-document.ts'

const revisions = sampleFindings().revisions!

async function drawn(change: Partial<NonNullable<Findings['revisions']>>, size: DrawingSize = 'wide'): Promise<string> {
  const { charts, tables, words, theme } = await sampleRendering({ ...sampleFindings(), revisions: { ...revisions, ...change } })
  return drawChart(charts.get('revisions')!, tables, words, theme, size)
}

const months = Array.from({ length: 36 }, (_, i) => `${2023 + Math.floor(i / 12)}-${String(i % 12 + 1).padStart(2, '0')}`)
const threeYears = months.map((period, i) => ({ ...revisions.periods[i % 6]!, period }))
const breakAfter = (i: number) => ({ after: months[i]!, before: months[i + 1]!, parts: ['base' as const, 'venues' as const], bridged: true })
const countOf = (svg: string, pattern: RegExp) => svg.match(pattern)?.length ?? 0
const labels = (svg: string) => countOf(svg, />new definition</g)
const symbols = (svg: string) => countOf(svg, /<path[^>]*transform="translate/g)

describe.each(['wide', 'narrow'] as const)('%s', (size) => {
  test('circle and diamond of every period are told apart by name and shape, beside those of the legend', async () => {
    const svg = await drawn({}, size)
    for (const name of ['As first sealed', 'As it stands now']) expect(svg).toContain(`>${name}<`)
    expect(symbols(svg)).toBe(2 * revisions.periods.length + 2)
    expect(symbols(await drawn({ periods: threeYears }, size))).toBe(2 * 36 + 2)
  })
  test('a period that is no part of the history any more has no diamond', async () => {
    const [first, ...others] = revisions.periods
    expect(symbols(await drawn({ periods: [{ ...first!, level_now: null }, ...others] }, size))).toBe(2 * revisions.periods.length + 1)
  })
  test('a break is named once, however many parts changed; of two close together the first is named', async () => {
    expect(labels(await drawn({ periods: threeYears, breaks: [breakAfter(5)] }, size))).toBe(1)
    expect(labels(await drawn({ periods: threeYears, breaks: [breakAfter(5), breakAfter(6)] }, size))).toBe(1)
    expect(labels(await drawn({ periods: threeYears, breaks: [breakAfter(5), breakAfter(30)] }, size))).toBe(2)
    expect(labels(await drawn({ breaks: [] }, size))).toBe(0)
  })
})
