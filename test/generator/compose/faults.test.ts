import { expect, test } from 'vitest'
import { compose } from '../../../generator/compose/compose.ts'
import type { Composition } from '../../../generator/compose/compose.ts'
import { InputFault } from '../../../generator/faults/fault.ts'
import type { Fault } from '../../../generator/faults/fault.ts'
import { smallCatalogue, smallComposition } from '../../support/small-template.ts'

function faultsOf(input: string, given: Parameters<typeof smallComposition>[1] = {}): readonly Fault[] {
  try {
    compose(smallComposition(input, given))
  } catch (error) {
    if (error instanceof InputFault) return error.faults
    throw error
  }
  return []
}

test.each([
  ['directive-unknown', 'a :figur{of="brand" as="text"}', 'review.md:1:3', '"figure"'],
  ['directive-unknown', '::chrt{name="bars"}', 'review.md:1:1', '"chart"'],
  ['directive-unknown', ':::keyfigur\ntext\n:::', 'review.md:1:1', '"keyfigure"'],
  ['path-unknown', 'a :figure{of="opinion.chnge.mean" as="change"}', 'review.md:1:3', '"change"'],
  ['path-unknown', ':figure{of="decomposition.parts[prt=opinion].estimate" as="interval"}', 'review.md:1:1', '"part"'],
  ['path-unknown', ':::when{that="vnues exists"}\nx\n:::', 'review.md:1:1', '"venues"'],
  ['path-unknown', ':::each{of="venues" as="venue" where="mentons > 3"}\nx\n:::', 'review.md:1:1', '"mentions"'],
  ['path-unknown', ':::each{of="venues" as="venue"}\n:figure{of="venue.lable" as="text"}\n:::', 'review.md:2:1', '"label"'],
  ['path-invalid', ':figure{of="a..b" as="text"}', 'review.md:1:1', 'opinion.change.mean'],
  ['path-not-a-list', ':::each{of="opinion" as="it"}\nx\n:::', 'review.md:1:1', 'list'],
  ['path-not-a-caveat', ':caveat{of="opinion.change" part="title"}', 'review.md:1:1', 'caveats'],
  ['form-unknown', ':figure{of="opinion.change.mean" as="chnge"}', 'review.md:1:1', '"change"'],
  ['form-unfit', ':figure{of="opinion.change" as="change"}', 'review.md:1:1', 'form'],
  ['unit-missing', ':figure{of="survey.next_wave.last" as="measure"}', 'review.md:1:1', 'unit'],
  ['message-unknown', 'b\n\n## :say{message="headin-words"}', 'review.md:3:4', '"heading-words"'],
  ['path-unknown', ':say{message="named"}', 'review.md:1:1', ''],
  ['chart-unknown', '::chart{name="bar"}', 'review.md:1:1', '"bars"'],
  ['table-unknown', '::table{name="smal" columns="label"}', 'review.md:1:1', '"small"'],
  ['column-unknown', '::table{name="small" columns="lable, low..hgh"}', 'review.md:1:1', '"label"'],
  ['column-unknown', '::table{name="small" columns="label" by="mention"}', 'review.md:1:1', '"mentions"'],
  ['section-unknown', '::section{name="opinion"}', 'review.md:1:1', ''],
  ['condition-invalid', ':::when{that="venues exists and topics exists or posters exists"}\nx\n:::', 'review.md:1:1', 'and'],
  ['condition-value-unknown', ':::when{that="opinion.movement is upwards"}\nx\n:::', 'review.md:1:1', ''],
  ['attribute-missing', ':figure{of="brand"}', 'review.md:1:1', 'as='],
  ['attribute-missing', 'see :say now', 'review.md:1:5', 'message='],
  ['attribute-unknown', ':figure{of="brand" as="text" style="red"}', 'review.md:1:1', ''],
  ['attribute-invalid', ':::each{of="venues" as="venue" most="many"}\nx\n:::', 'review.md:1:1', 'most=3'],
  ['attribute-invalid', ':::each{of="venues" as="venue" order="top"}\nx\n:::', 'review.md:1:1', 'Known are most,'],
  ['attribute-invalid', ':::each{of="venues" as="opinion"}\nx\n:::', 'review.md:1:1', 'venue'],
  ['attribute-invalid', ':::each{of="caveats" as="it"}\n:caveat{of="it" part="titel"}\n:::', 'review.md:2:1', '"title"'],
  ['anchor-unknown', '## :say{message="plain"}\n\n[x](#plane)', 'review.md:3:1', '"plain"'],
  ['anchor-unknown', '## :say{message="plain"}\n\n::chart{name="bars" made="plan"}', 'review.md:3:1', '"plain"'],
  ['address-unfit', '[x](javascript:alert)', 'review.md:1:1', 'https'],
  ['html-in-template', 'a <b>bold</b> word', 'review.md:1:3', 'Remove'],
  ['html-in-template', '<script>\nalert(1)\n</script>', 'review.md:1:1', 'Remove'],
  ['image-in-template', '![x](https://example.org/x.png)', 'review.md:1:1', 'Remove'],
])('%s: %s', (code, input, place, mend) => {
  const found = faultsOf(input).filter((fault) => fault.code === code)
  expect(found.length).toBeGreaterThan(0)
  expect(found[0]!.place).toBe(place)
  expect(found[0]!.message).toMatch(/^Unexpected .+, expected .+/)
  expect(found[0]!.mend).toContain(mend)
})

test('it can fail: a right template has no fault', () => {
  expect(faultsOf('## :say{message="plain"}\n\n:figure{of="opinion.change.mean" as="change"} [x](#plain)')).toEqual([])
})

test('all faults are told at once, also those inside a block that does not appear', () => {
  const faults = faultsOf(':::when{that="benchmark exists"}\n:figure{of="bran" as="text"}\n\n::chart{name="pie"}\n:::\n\n:say{message="absent"}')
  expect(faults.map(({ code, place }) => [code, place])).toEqual([['path-unknown', 'review.md:2:1'], ['chart-unknown', 'review.md:4:1'], ['message-unknown', 'review.md:7:1']])
})

test('a fault names the file of its section', () => {
  const composition = smallComposition('::section{name="one"}')
  const template: Composition['template'] = { ...composition.template, sections: { one: { place: 'templates/sections/one.md', text: 'x\n\n::section{name="one"}' } } }
  expect(() => compose({ ...composition, template })).toThrow('templates/sections/one.md:3:1: Unexpected section "one" inside a section')
})

test.each([
  ['message-unknown', 'moovd: {}', 'sentences.yaml:1:8'],
  ['argument-undeclared', 'moved: { movement: { of: opinion.movement, as: code } }', 'sentences.yaml:1:8'],
  ['argument-unused', 'plain:\n  extra: { of: brand, as: text }', 'sentences.yaml:2:10'],
  ['form-unknown', 'named: { label: { of: brand, as: txt } }', 'sentences.yaml:1:17'],
  ['argument-key-unknown', 'named: { label: { off: brand, as: text } }', 'sentences.yaml:1:17'],
  ['sentences-invalid', 'named: { label: ', 'sentences.yaml:1:17'],
])('sentences.yaml, %s: %s', (code, sentencesText, place) => {
  const found = faultsOf('x', { sentencesText, messages: smallCatalogue }).filter((fault) => fault.code === code)
  expect(found.map((fault) => fault.place)).toContain(place)
})

test('a message with arguments but without a sentence is a fault where it is said', () => {
  expect(faultsOf(':say{message="moved"}', { sentencesText: '{}' }).map(({ code, place }) => [code, place]))
    .toEqual([['sentence-missing', 'sentences.yaml'], ['sentence-missing', 'review.md:1:1']])
})

test('a selection in a sentence is checked: its list, its paths, its form', () => {
  const of = (spec: string) => faultsOf(':say{message="named"}', { sentencesText: `document-title: { brand: { of: brand, as: text } }\nnamed: { label: { ${spec} } }` }).map(({ code }) => code)
  expect(of('of: venues, pick: label, as: list')).toEqual([])
  expect(of('of: venues, pick: lable, as: list')).toEqual(['path-unknown'])
  expect(of('of: brand, pick: label, as: list')).toEqual(['path-not-a-list'])
  expect(of('of: venues, pick: label, as: points')).toEqual(['form-unfit'])
  expect(of('of: venues, by: label, pick: label, as: list')).toEqual(['form-unfit'])
})
