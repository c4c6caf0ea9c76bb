import { toString } from 'hast-util-to-string'
import { expect, test } from 'vitest'
import { elementsOf, sectionText } from '../../support/house-composition.ts'
import { composeFiles, faultsOf } from '../../support/own-account.ts'

const withNotes = (notes: string, template = '::house{to="venues"}') => ({ 'template.md': template, 'notes/2026-10.md': notes })
const blocks = async (files: Parameters<typeof composeFiles>[0]) => elementsOf(await composeFiles(files), 'div').filter(({ properties }) => String(properties['className']) === 'analyst-note')

test('the general note stands after the first page, one beside a section at its end, told apart', async () => {
  const files = withNotes('A strike.\n\n## More\n\nText.\n\n# venues\n\nClosed for :figure{of="opinion.mentions" as="count"}.\n')
  const document = await composeFiles(files)
  expect((await blocks(files)).map((block) => toString(block).replaceAll('\n', ' ').trim())).toMatchObject([
    expect.stringMatching(/^Analyst’s note *A strike\. *More *Text\.$/) as string, expect.stringMatching(/^Analyst’s note *Closed for [\d,]+\.$/) as string,
  ])
  expect(sectionText(document, 'venues')).toMatch(/Analyst’s note Closed for [\d,]+\.$/)
  expect(document.headings.find(({ text }) => text === 'More')?.depth).toBe(3)
  expect((await blocks(files))[0]!.properties).toMatchObject({ role: 'note', ariaLabel: 'Analyst’s note' })
})

test('without notes of the period the review is as it was', async () => {
  const files = { 'template.md': '::house{to="venues"}' }
  const before = await composeFiles(files)
  expect(await composeFiles({ ...files, 'notes/2026-09.md': 'Of another month.', 'notes/readme.txt': 'x' })).toEqual(before)
  expect(await composeFiles(withNotes('Words.'))).not.toEqual(before)
})

test.each([
  ['x\n\n# survye\n\ny', 'note-section-unknown', 'notes/2026-10.md:3:1', '"survey"', '::house'],
  ['# constructor\n\ny', 'note-section-unknown', 'notes/2026-10.md:1:1', '', '::house'],
  ['# glossary\n\ny', 'note-section-unknown', 'notes/2026-10.md:1:1', 'venues', '::house{to="venues"}'],
  ['Words.', 'note-unplaced', 'notes/2026-10.md:1:1', '::notes', '::section{name="venues"}'],
  ['::include{file="a.md"}', 'note-directive', 'notes/2026-10.md:1:1', 'template', '::house'],
  [':::each{of="venues" as="v"}\nx\n:::', 'note-directive', 'notes/2026-10.md:1:1', 'template', '::house'],
  ['x :figure{of="bran" as="text"}', 'path-unknown', 'notes/2026-10.md:1:3', '"brand"', '::house'],
  ['x <b>y</b>', 'html-in-template', 'notes/2026-10.md:1:3', 'Remove', '::house'],
])('%s: %s', async (notes, code, place, mend, template) => {
  const [fault] = await faultsOf(withNotes(notes, template))
  expect(fault).toMatchObject({ code, place })
  expect(fault!.mend).toContain(mend)
})

test('a name that is no period’s is told, and a fault in the notes of another period', async () => {
  expect(await faultsOf({ 'template.md': '::house', 'notes/2026-1O.md': 'x' })).toMatchObject([{ code: 'notes-name', place: 'notes/2026-1O.md' }])
  expect(await faultsOf({ 'template.md': '::house', 'notes/2026-09.md': '# nothing' })).toMatchObject([{ code: 'note-section-unknown', place: 'notes/2026-09.md:1:1' }])
})
