import { beforeAll, describe, expect, test } from 'vitest'
import { textWidth } from '../../../generator/render/charts/text-metrics.ts'
import { cssString, pageBoxes, prose, textWidthOf } from '../../../generator/render/page-boxes.ts'
import { loadTheme } from '../../../generator/theme/load-theme.ts'
import { readRunning } from '../../../generator/theme/running-text.ts'
import type { Theme } from '../../../generator/theme/theme.ts'
import { sampleWords, templates } from './sample-document.ts'

let house: Theme
beforeAll(async () => { house = await loadTheme(`${templates}theme`) })

const imprint = { brand: 'Skerrow "Ferries"', period: 'October 2026', preparedBy: null, reviewedBy: null }
const boxes = (changed: Partial<Theme> = {}) => pageBoxes({ ...house, ...changed }, sampleWords, 'A title', imprint)

describe('the printed page', () => {
  test('of the house is A4, the title on top from the second page on, the foot worded by the catalogue', () => {
    expect(boxes()).toContain('@page{size:A4;margin:21mm 20mm 20mm;font-family:"Source Sans 3"')
    expect(boxes()).toContain('@top-left{content:"A title";')
    expect(boxes()).toContain('@bottom-right{content:"Page " counter(page) " of " counter(pages);')
    expect(boxes()).toContain('@page:first{margin-top:11mm;margin-bottom:16mm;@top-left{content:none}}')
    expect(boxes()).not.toMatch(/cover|zoom|background/)
  })
  test('has the theme\u2019s own head and foot, colours and paper', () => {
    const running = { head: readRunning('{brand}, {period}'), foot: readRunning('') }
    const own = boxes({ running, paper: 'letter', chart: { ...house.chart, quiet: '#445566', paper: '#fffdf8' } })
    expect(own).toContain('@top-left{content:"Skerrow \\22 Ferries\\22 " "\\2c  " "October 2026";')
    expect(own).toContain('@bottom-right{content:none;')
    expect(own).toMatch(/size:letter;.*background:#fffdf8;.*color:#445566;.*size:letter landscape/)
  })
  test('with a cover, bare margins on it, and the first page keeps its shape by name', () => {
    expect(boxes({ cover: true })).toMatch(/@page cover\{.*@page opening\{margin-top:11mm.*\.section-first-page\{page:opening\}/)
    expect(boxes({ cover: true })).not.toContain('@page:first')
  })
  test('is the first page smaller on lower paper and in a wider typeface, and no smaller than bearable', () => {
    const zoomOf = (css: string) => Number(/zoom:([\d.]+)/.exec(css)?.[1] ?? 1)
    const wider = { ...house.advances, advances: Object.fromEntries(Object.entries(house.advances.advances).map(([weight, all]) => [weight, all.map((advance) => 1.1 * advance)])) }
    expect(zoomOf(boxes({ paper: 'letter' }))).toBeCloseTo(252.4 / 270, 3)
    expect(zoomOf(boxes({ advances: wider }))).toBeCloseTo(1 / Math.sqrt(1.1), 3)
    expect(zoomOf(boxes({ advances: { ...wider, perEm: 500 } }))).toBe(0.85)
  })
  test('the prose that typefaces are compared by is as wide as it says', () => {
    expect(textWidth(prose.text, { fontSize: 1 }, house.advances)).toBeCloseTo(prose.width, 2)
  })
  test('is as wide as its paper less the margins', () => { expect([textWidthOf('A4'), textWidthOf('letter')]).toEqual([642, 664]) })
})

test('a text can end neither the string nor the element', () => {
  expect(cssString('a"}</style><script>')).toBe('"a\\22 \\7d \\3c \\2f style\\3e \\3c script\\3e "')
  const css = boxes({ running: { head: readRunning('"}</style><script>\\'), foot: null } })
  expect(css).not.toMatch(/<|\\"/)
})

describe('a running text', () => {
  test('is what stands there and places that each page fills', () => {
    expect(readRunning('{page} of {pages}')).toEqual([{ place: 'page' }, { text: ' of ' }, { place: 'pages' }])
    expect(readRunning('')).toEqual([])
  })
  test.each(['{author}', '{', 'a}', '{{page}}', 'a\nb', 'a\u0007', 'x'.repeat(101)])('%j is refused', (text) => { expect(readRunning(text)).toBeNull() })
})
