import { h } from 'hastscript'
import { beforeAll, expect, test } from 'vitest'
import { fitsPortrait } from '../../../generator/render/table-width.ts'
import { loadTheme } from '../../../generator/theme/load-theme.ts'
import type { AdvanceTable } from '../../../generator/theme/theme.ts'
import { templates } from './sample-document.ts'

let advances: AdvanceTable
beforeAll(async () => { ({ advances } = (await loadTheme(`${templates}theme`))) })

const table = (columns: number, cell: string, kind: string) => h('div.table', [h('table', [
  h('thead', [h('tr', Array.from({ length: columns }, () => h('th', { scope: 'col' }, 'Level now')))]),
  h('tbody', [h('tr', Array.from({ length: columns }, () => h('td', { className: [kind] }, cell)))]),
])])

test('ten columns of figures fit, thirty do not', () => {
  expect(fitsPortrait(table(10, '\u221212.5', 'kind-points'), advances)).toBe(true)
  expect(fitsPortrait(table(30, '\u221212.5', 'kind-points'), advances)).toBe(false)
})

test('text may break between words, figures may not', () => {
  expect(fitsPortrait(table(5, 'some longer words in one cell that break into lines', 'kind-text'), advances)).toBe(true)
  expect(fitsPortrait(table(5, 'some longer words in one cell that break into lines', 'kind-points'), advances)).toBe(false)
})
