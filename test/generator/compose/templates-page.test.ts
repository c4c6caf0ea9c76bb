import { readFileSync } from 'node:fs'
import { toString } from 'hast-util-to-string'
import { describe, expect, test } from 'vitest'
import { namesOf } from '../../../generator/compose/directives/all.ts'
import { formNames } from '../../../generator/words/forms.ts'
import { tablesOf } from '../../../generator/tables/tables-of.ts'
import { houseCharts, houseTemplate, sectionText } from '../../support/house-composition.ts'
import { templatesFolder } from '../../support/house-words.ts'
import { composeFiles, faultsOf } from '../../support/own-account.ts'
import { sampleFindings } from '../../support/sample-findings.ts'

const page = readFileSync(`${templatesFolder}/TEMPLATES.md`, 'utf8')
const fences = [...page.matchAll(/^```(?:markdown|json)(?: (\S+))?\n([\s\S]*?)^```$/gm)].map(([, path, text = '']) => ({ path, text }))
const files = Object.fromEntries(fences.filter(({ path }) => path !== undefined).map(({ path = '', text }) => [path, text]))
const examples = fences.filter(({ path }) => path === undefined).map(({ text }) => text)
/** What an example may lean on: the chart and the text that the page shows. */
const beside = Object.fromEntries(Object.entries(files).filter(([path]) => /^(charts|texts)\//.test(path)))

describe('the page on templates', () => {
  test.each(examples.map((text) => [text.split('\n')[0], text]))('its example composes: %s', async (_first, text) => {
    expect(await faultsOf({ ...beside, 'template.md': text })).toEqual([])
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
    expect(await faultsOf({ ...beside, 'template.md': examples[0]!.replace('opinion.change', 'opinion.chnge') })).toMatchObject([{ code: 'path-unknown', place: 'template.md:3:40' }])
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
