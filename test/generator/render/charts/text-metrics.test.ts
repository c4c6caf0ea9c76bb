import { createRequire } from 'node:module'
import { openSync } from 'fontkit'
import { beforeAll, describe, expect, test } from 'vitest'
import { textWidth, wrapLabel } from '../../../../generator/render/charts/text-metrics.ts'
import { loadTheme } from '../../../../generator/theme/load-theme.ts'
import type { AdvanceTable } from '../../../../generator/theme/theme.ts'
import { templates } from '../sample-document.ts'

let table: AdvanceTable
beforeAll(async () => { table = (await loadTheme(`${templates}theme`)).advances })

describe('textWidth', () => {
  test.each([400, 600, 700])('agrees with the face of weight %i itself', (weight) => {
    const font = openSync(createRequire(import.meta.url).resolve(`@fontsource/source-sans-3/files/source-sans-3-latin-${weight}-normal.woff2`))
    if (!('unitsPerEm' in font)) throw new Error('expected one face')
    const text = 'Mix-adjusted opinion \u221212.5, caf\u00e9'
    const exact = [...text].reduce((sum, character) => sum + font.glyphForCodePoint(character.codePointAt(0) ?? 0).advanceWidth / font.unitsPerEm, 0) * 20
    expect(textWidth(text, { fontSize: 20, fontWeight: weight }, table)).toBeCloseTo(exact, 0)
    expect(Math.abs(textWidth(text, { fontSize: 20, fontWeight: weight }, table) / exact - 1)).toBeLessThan(0.002)
  })

  test('bold is wider than regular, and an unknown character counts as an m', () => {
    expect(textWidth('wide', { fontWeight: 'bold' }, table)).toBeGreaterThan(textWidth('wide', {}, table))
    expect(textWidth('\u6f22', {}, table)).toBe(textWidth('m', {}, table))
  })
})

describe('wrapLabel', () => {
  const style = { fontSize: 12 }
  test('a label that fits stays on one line', () => { expect(wrapLabel('Review sites', 200, style, table)).toBe('Review sites') })
  test('a longer one breaks between words, no line wider than the limit', () => {
    const lines = wrapLabel('Comments under the operator\u2019s own articles', 90, style, table).split('\n')
    expect(lines.length).toBeGreaterThan(1)
    for (const line of lines) expect(textWidth(line, style, table)).toBeLessThanOrEqual(90)
    expect(lines.join(' ')).toBe('Comments under the operator\u2019s own articles')
  })
  test('a word that is too long stays whole', () => { expect(wrapLabel('Donaudampfschifffahrt', 20, style, table)).toBe('Donaudampfschifffahrt') })
})
