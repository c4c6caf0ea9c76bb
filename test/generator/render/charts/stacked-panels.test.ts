import { beforeAll, describe, expect, test } from 'vitest'
import type { ChartSpec, JsonObject } from '../../../../generator/render/charts/chart-spec.ts'
import { withStacked } from '../../../../generator/render/charts/stacked-panels.ts'
import { loadTheme } from '../../../../generator/theme/load-theme.ts'
import type { Theme } from '../../../../generator/theme/theme.ts'
import { templates } from '../sample-document.ts'

let theme: Theme
beforeAll(async () => { theme = await loadTheme(`${templates}theme`) })

const axis = { title: null, tickCount: 4 }
const panel = (name: string, height: number) => ({ data: { name }, height, encoding: { x: { field: 'day', axis } } })
const spec: ChartSpec = { name: 'two', usermeta: { stacked: { axis: 30, gap: 20, labels: ['Wide label', 'Nar'], alone: 90 } }, vconcat: [panel('upper', 50), panel('lower', 40)] }
const panelsOf = (of: ChartSpec) => of.vconcat as readonly JsonObject[]
const row = [{ day: 1 }]

describe('panels below each other', () => {
  test('have one width, what axis and labels leave, and one axis of time', () => {
    const { resolve, spacing, ...stacked } = withStacked(spec, { upper: row, lower: row }, 400, theme)
    expect([resolve, spacing]).toEqual([{ scale: { x: 'shared' } }, 20])
    const [upper, lower] = panelsOf(stacked as ChartSpec)
    expect(upper!.width).toBe(lower!.width)
    expect(upper!.width).toBeLessThan(400 - 30 - 40)
    expect(upper!.width).toBeGreaterThan(400 - 30 - 90)
  })
  test('dates are written below the last only', () => {
    const [upper, lower] = panelsOf(withStacked(spec, { upper: row, lower: row }, 400, theme))
    expect(upper).toMatchObject({ height: 50, encoding: { x: { field: 'day', axis: { tickCount: 4, labels: false } } } })
    expect(lower!.encoding).toEqual({ x: { field: 'day', axis } })
  })
  test('one without rows is left out, and the one that stays is higher and has the dates', () => {
    const [alone, ...rest] = panelsOf(withStacked(spec, { upper: row, lower: [] }, 400, theme))
    expect(rest).toEqual([])
    expect(alone).toMatchObject({ data: { name: 'upper' }, height: 90 })
    expect(alone!.encoding).toEqual({ x: { field: 'day', axis } })
  })
  test('a chart that asks for none stays as it is', () => {
    const plain: ChartSpec = { name: 'plain', mark: 'point' }
    expect(withStacked(plain, {}, 400, theme)).toBe(plain)
  })
})
