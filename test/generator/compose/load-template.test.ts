import { mkdirSync, mkdtempSync, rmSync, writeFileSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { afterEach, beforeEach, expect, test } from 'vitest'
import { compose } from '../../../generator/compose/compose.ts'
import { loadTemplate } from '../../../generator/compose/load-template.ts'
import { tablesOf } from '../../../generator/tables/tables-of.ts'
import { houseCharts, houseTemplate, sectionText } from '../../support/house-composition.ts'
import { houseWords, templatesFolder } from '../../support/house-words.ts'
import { sampleFindings } from '../../support/sample-findings.ts'

let folder = ''
const own = () => ({ folder, template: 'template.md', notes: null, reporting: 'month' as const })
beforeEach(() => { folder = mkdtempSync(join(tmpdir(), 'template-')) })
afterEach(() => rmSync(folder, { recursive: true }))

test('an account\'s own review chooses sections, and its own sections go before those of the house', async () => {
  mkdirSync(join(folder, 'sections'))
  writeFileSync(join(folder, 'template.md'), '::section{name="opinion"}\n\n::section{name="glossary"}\n\n::section{name="made"}\n')
  writeFileSync(join(folder, 'sections', 'glossary.md'), '## Words of ours\n\n:figure{of="brand" as="text"}\n')
  const template = await loadTemplate(templatesFolder, own())
  const findings = sampleFindings()
  const document = compose({ template, words: await houseWords(), findings, tables: tablesOf(findings), charts: houseCharts })
  expect(document.headings.filter(({ depth }) => depth === 2).map(({ text }) => text)).toEqual(['Opinion over time', 'Words of ours', 'How this review was made'])
  expect(sectionText(document, 'glossary')).toContain('Skerrow Ferries')
})

test('without an own review it is the house\'s', async () => {
  expect(await loadTemplate(templatesFolder)).toEqual(houseTemplate)
})

test('a review that is not there is a fault that names it', async () => {
  await expect(loadTemplate(templatesFolder, own())).rejects.toMatchObject({ faults: [{ code: 'template-missing', place: 'template.md' }] })
})

test('a fault in an own review names its own file', async () => {
  writeFileSync(join(folder, 'template.md'), '::chart{name="opnion"}\n')
  const template = await loadTemplate(templatesFolder, own())
  const findings = sampleFindings()
  const words = await houseWords()
  expect(() => compose({ template, words, findings, tables: tablesOf(findings), charts: houseCharts })).toThrow('template.md:1:1: Unexpected chart "opnion"')
})
