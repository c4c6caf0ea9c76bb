import { h } from 'hastscript'
import { beforeAll, expect, test } from 'vitest'
import { hasLongWords, tableForm } from '../../../generator/render/table-width.ts'
import { loadTheme } from '../../../generator/theme/load-theme.ts'
import type { AdvanceTable } from '../../../generator/theme/theme.ts'
import { templates } from './sample-document.ts'

let advances: AdvanceTable
const fitsPortrait = (region: Parameters<typeof tableForm>[0], of: AdvanceTable) => tableForm(region, of) === 'portrait'
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

test('what just does not fit is set smaller before it takes a page of its own', () => {
  const forms = Array.from({ length: 30 }, (_, columns) => tableForm(table(columns + 1, '\u221212.5 bis +10.1', 'kind-interval'), advances))
  expect([...new Set(forms)]).toEqual(['portrait', 'tight', 'landscape'])
  expect(forms).toEqual([...forms].sort((a, b) => ['portrait', 'tight', 'landscape'].indexOf(a) - ['portrait', 'tight', 'landscape'].indexOf(b)))
})

test('a column of text is as wide as its longest word', () => {
  expect(tableForm(table(5, 'Weiter empfehlungen', 'kind-text'), advances)).toBe('portrait')
  expect(tableForm(table(5, 'Weiterempfehlungsbereitschaft', 'kind-text'), advances)).not.toBe('portrait')
})

test('a soft hyphen is a place to break a head', () => {
  const heads = (text: string) => h('div.table', [h('table', [h('thead', [h('tr', Array.from({ length: 8 }, () => h('th', { scope: 'col' }, text)))])])])
  expect(tableForm(heads('Rohdurchschnitte'), advances)).not.toBe('portrait')
  expect(tableForm(heads('Roh\u00addurchschnitte'), advances)).toBe('portrait')
})

test('only a word too long for any column may be cut', () => {
  expect(hasLongWords(table(1, 'Weiterempfehlung und Gelegenheitsschreiber', 'kind-text'), advances)).toBe(false)
  expect(hasLongWords(table(1, 'Donaudampfschifffahrtsgesellschaftskapitän', 'kind-text'), advances)).toBe(true)
  expect(hasLongWords(table(1, 'Donaudampfschifffahrtsgesellschaftskapitän', 'kind-points'), advances)).toBe(false)
})
