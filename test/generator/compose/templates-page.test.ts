import { readFileSync } from 'node:fs'
import { toString } from 'hast-util-to-string'
import { describe, expect, test } from 'vitest'
import { namesOf } from '../../../generator/compose/directives/all.ts'
import { formNames } from '../../../generator/words/forms.ts'
import { loadTheme } from '../../../generator/theme/load-theme.ts'
import { parsePath } from '../../../generator/compose/path.ts'
import { findingsScope, typeAt, unitOf } from '../../../generator/compose/path-types.ts'
import { drawChart } from '../../../generator/render/charts/draw-chart.ts'
import { readOwnChart } from '../../../generator/render/charts/own-chart.ts'
import { tablesOf } from '../../../generator/tables/tables-of.ts'
import { elementsOf, houseCharts, houseTemplate, sectionText } from '../../support/house-composition.ts'
import { houseWords, templatesFolder } from '../../support/house-words.ts'
import { composeFiles, faultsOf } from '../../support/own-account.ts'
import { sampleFindings } from '../../support/sample-findings.ts'

const page = readFileSync(`${templatesFolder}/TEMPLATES.md`, 'utf8')
const fences = [...page.matchAll(/^```(?:markdown|json|yaml)(?: (\S+))?\n([\s\S]*?)^```$/gm)].map(([, path, text = '']) => ({ path, text }))
const files = Object.fromEntries(fences.filter(({ path }) => path !== undefined).map(({ path = '', text }) => [path, text]))
const examples = fences.filter(({ path }) => path === undefined).map(({ text }) => text)
/** What an example may lean on: the charts, texts and words of the page that it calls. */
const beside = (text: string) => Object.fromEntries(Object.entries(files).filter(([path]) => path.startsWith('charts/') ? text.includes(`name="${path.slice(7, -5)}"`) : /^(texts\/|words)/.test(path)))
const rows = (header: string) => (new RegExp(`^\\| ${header} \\|.*\\n\\|[-|]+\\n((?:\\|.*\\n)+)`, 'm').exec(page)?.[1] ?? '').trim().split('\n').map((row) => row.split(' | ').map((cell) => cell.replace(/^\| | \|$/g, '')))

describe('the page on templates', () => {
  test.each(examples.map((text) => [text.split('\n')[0], text]))('its example composes: %s', async (_first, text) => {
    expect(await faultsOf({ ...beside(text), 'template.md': text })).toEqual([])
  })

  test('its whole example composes: own order, own section, own chart, own sentence, notes', async () => {
    const document = await composeFiles(files)
    const titles = document.headings.filter(({ depth }) => depth === 2).map(({ text }) => text)
    expect(titles.indexOf('What we make of it')).toBeLessThan(titles.indexOf('Opinion over time'))
    expect(sectionText(document, 'topics')).toContain('Topics in short')
    expect(sectionText(document, 'venues')).toMatch(/Analyst’s note The boards were closed for two days\. Opinion moved by \+2\.2 all the same\.$/)
    expect(toString(document.tree)).toContain('The strike of the first week')
    expect(JSON.stringify(document.tree)).toContain('"dataChart":"venue-shares"')
  })

  test('it can fail: an example with a wrong name is told', async () => {
    expect(await faultsOf({ 'template.md': examples[0]!.replace('opinion.change', 'opinion.chnge') })).toMatchObject([{ code: 'path-unknown', place: 'template.md:3:40' }])
  })

  test('says of each form what it writes: as its examples show', async () => {
    const forms = rows('form')
    expect(forms.length).toBeGreaterThan(12)
    expect(forms.flatMap(([names = '']) => [...names.matchAll(/`([a-z-]+)`/g)].map(([, name]) => name)).filter((name) => !formNames.some((known) => known === name))).toEqual([])
    const figures = forms.map(([, , example = '']) => /`(:figure\{[^`]*\})`/.exec(example)?.[1])
    expect(figures.filter((figure) => figure === undefined)).toEqual([])
    const document = await composeFiles({ 'template.md': figures.join('\n\n') })
    expect(forms.map(([, , example = '']) => / writes (.*)$/.exec(example)?.[1])).toEqual(elementsOf(document, 'p').map((paragraph) => toString(paragraph)))
  })

  test('tells the unit of each path as the schema has it', () => {
    const paths = rows('path').map(([path = '', unit]) => [path.replaceAll('`', ''), unit] as const)
    expect(paths.length).toBeGreaterThan(12)
    for (const [path, unit] of paths) {
      const found = typeAt(parsePath(path)!, findingsScope)
      expect([path, found.known ? unitOf(found.type) : found.unknown]).toEqual([path, unit])
    }
  })

  test.each(Object.keys(files).filter((path) => path.startsWith('charts/')))('its chart is drawn: %s', async (path) => {
    const words = await houseWords()
    const tables = tablesOf(sampleFindings())
    const chart = readOwnChart(path.slice(7, -5), path, files[path]!, { tables, words })
    expect(await drawChart(chart, tables, words, await loadTheme(`${templatesFolder}/theme`))).toMatch(/<path /)
  })

  test('shows every directive', () => {
    const shown = [...examples, ...Object.values(files)].join('\n')
    const names = [...namesOf('textDirective'), ...namesOf('leafDirective')]
    expect(names.filter((name) => !new RegExp(`:${name}(?![a-z-])`).test(shown))).toEqual([])
    expect(listed('Blocks')).toEqual(namesOf('containerDirective').filter((name) => name !== 'when' && name !== 'each'))
  })

  test('lists every section, chart, form and table with its columns', () => {
    expect(listed('Sections of the house')).toEqual([...houseTemplate.review.text.matchAll(/section\{name="([a-z-]+)"\}/g)].map(([, name]) => name))
    expect(listed('Charts')).toEqual([...houseCharts].sort())
    expect(listed('Forms of figures')).toEqual(formNames)
    const told = [...page.matchAll(/^- `([a-z-]+)`: ([a-z0-9_, ]+)$/gm)].map(([, name, columns]) => [name, columns])
    expect(told).toEqual(tablesOf(sampleFindings()).map(({ name, columns }) => [name, columns.map(({ key }) => key).join(', ')]))
  })
})

/** Names in the first sentence of the paragraph that begins so. */
function listed(title: string): readonly string[] {
  const [, list = ''] = new RegExp(`\\*\\*${title}\\*\\*[^:]*: ([^.]*)\\.`).exec(page) ?? []
  return [...list.matchAll(/`([a-z-]+)`/g)].map(([, name = '']) => name)
}
