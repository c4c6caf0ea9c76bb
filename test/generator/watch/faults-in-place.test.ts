import { expect, test } from 'vitest'
import { parseMarkdown } from '../../../generator/compose/parse-markdown.ts'
import type { Template } from '../../../generator/compose/template.ts'
import { showInPlace } from '../../../generator/watch/faults-in-place.ts'

const template: Template = {
  review: { place: 'template.md', text: '::section{name="a"}' }, house: { place: 'templates/review.md', text: '::section{name="a"}' },
  sections: { a: { place: 'sections/a.md', text: 'A' }, b: { place: 'sections/b.md', text: 'B' } }, ownSections: ['a', 'b'],
  sentences: { place: 'templates/sentences.yaml', text: '' }, included: { 'c.md': { place: 'c.md', text: 'C' } }, notes: { '2026-10': { place: 'notes/2026-10.md', text: 'N' } },
}
const faultAt = (place: string, message = 'Unexpected x') => ({ code: 'x', place, message, mend: 'Mend it.' })

test('a fault stands where its file would, the others are as they were', () => {
  const fault = faultAt('sections/a.md:3:1', 'Unexpected `::sektion{name="x"}`')
  const { template: shown, rest } = showInPlace(template, [fault])
  expect(rest).toEqual([])
  expect(parseMarkdown(shown.sections['a']).children).toMatchObject([{ type: 'code', value: 'Unexpected `::sektion{name="x"}`\nMend it.' }])
  expect({ ...shown, sections: { ...shown.sections, a: template.sections['a'] } }).toEqual(template)
})

test.each([['c.md:1:1', 'included'], ['notes/2026-10.md:2:4', 'notes']] as const)('so at %s', (place, part) => {
  const { template: shown, rest } = showInPlace(template, [faultAt(place)])
  expect(rest).toEqual([])
  expect(JSON.stringify(shown[part])).toContain('Unexpected x')
})

test('a fault of the list of sections stands above the house’s own list', () => {
  const { template: shown } = showInPlace(template, [faultAt('template.md:1:1')])
  expect(parseMarkdown(shown.review).children.map(({ type }) => type)).toEqual(['code', 'leafDirective'])
  expect(shown.ownSections).toEqual([])
})

test('what a fault quotes never ends the block it stands in', () => {
  const { template: shown } = showInPlace(template, [faultAt('sections/a.md:1:1', 'Unexpected ```\n<script>alert(1)</script>')])
  expect(parseMarkdown(shown.sections['a']).children).toMatchObject([{ type: 'code' }])
})

test('a fault of a file that is none of the template is told apart', () => {
  const elsewhere = faultAt('theme.yaml:1:1')
  expect(showInPlace(template, [elsewhere])).toEqual({ template, rest: [elsewhere] })
})
