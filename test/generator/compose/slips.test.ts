import { toString } from 'hast-util-to-string'
import { describe, expect, test } from 'vitest'
import { elementsOf, sectionText } from '../../support/house-composition.ts'
import { composeFiles, faultsOf } from '../../support/own-account.ts'
import { slipsIn } from '../../../generator/compose/check-slips.ts'
import { parseMarkdown } from '../../../generator/compose/parse-markdown.ts'
import { nearest } from '../../../generator/compose/faults.ts'

const slips = (text: string) => slipsIn({ place: 'a.md', text }, parseMarkdown({ place: 'a.md', text })).map(({ code, place }) => `${code} ${place}`)

describe('directives that were taken for text', () => {
  test.each([
    ['::: note\ntext\n:::', ['directive-slip a.md:1:1']],
    ['x\n\n::section {name="venues"}', ['directive-slip a.md:3:1']],
    [':: chart{name="venues"}', ['directive-slip a.md:1:1']],
    ['::chart {name="venues"}', ['directive-slip a.md:1:1']],
    ['a : figure{of="brand" as="text"}', ['directive-slip a.md:1:3']],
    ['one\ntwo :figure {of="brand" as="text"}', ['directive-slip a.md:2:5']],
    ['one\ntwo : figure{of="brand" as="text"}', ['directive-slip a.md:2:5']],
    ['> :: chart{name="venues"}', ['directive-slip a.md:1:3']],
    ['- ::: note', ['directive-slip a.md:1:3']],
    [':::note\ntext', ['block-open a.md:1:1']],
    ['::::note\n:::lead\ntext\n::::\n\nafter', ['block-open a.md:2:1']],
    [':::note\n:::lead\ntext\n:::\n:::', ['block-colons a.md:2:1']],
    ['text\n\n:::', ['fence-stray a.md:3:1']],
  ])('%s', (text, told) => expect(slips(text)).toEqual(told))

  test('it can fail: what is meant as text, or stands right, is none', () => {
    expect(slips('note: figures {a}\n\n\\::chart\n\n`:: chart`\n\n```\n::: note\n```\n\n12:30 :figure{of="brand" as="text"} x')).toEqual([])
    expect(slips('::::note\n:::lead\ntext\n:::\n::::\n\n- :::note\n  x\n  :::\n\n> :::note\n> x\n> :::')).toEqual([])
  })

  test('a slip has no second fault, and notes are looked at too', async () => {
    expect(await faultsOf({ 'template.md': 'x :figure {of="brand" as="text"}' })).toMatchObject([{ code: 'directive-slip', place: 'template.md:1:3' }])
    expect(await faultsOf({ 'template.md': '::house', 'notes/2026-10.md': 'x : figure{of="brand"}' })).toMatchObject([{ code: 'directive-slip', place: 'notes/2026-10.md:1:3' }])
  })
})

test('an item that there is not is told with those that there are, unless its block does not appear', async () => {
  const [fault, ...more] = await faultsOf({ 'template.md': '::include{file="a.md"}', 'a.md': 'x\n\n:figure{of="venues[venue=blogg].share" as="share"}' })
  expect([fault, more]).toMatchObject([{ code: 'item-absent', place: 'a.md:3:1' }, []])
  expect(fault!.mend).toContain('boards')
  expect(await faultsOf({ 'template.md': ':::when{that="venues[venue=blogg] exists"}\n:figure{of="venues[venue=blogg].share" as="share"}\n:::' })).toEqual([])
  expect(await faultsOf({ 'template.md': ':figure{of="survey.candidates[series=rw].best.r" as="number"}' })).toMatchObject([{ code: 'path-unknown', mend: 'Known for series are adjusted, raw, venue.' }])
})

describe('sections that a review leaves out', () => {
  test('take with them what leads there', async () => {
    const document = await composeFiles({ 'template.md': '::house{from="first-page" to="venues"}' })
    expect(sectionText(document, 'first-page')).not.toMatch(/All caveats|How this is made/)
    expect(sectionText(document, 'opinion')).not.toContain('How this is made')
    const whole = await composeFiles({ 'template.md': '::house' })
    expect(sectionText(whole, 'first-page')).toMatch(/All caveats/)
    expect(elementsOf(whole, 'a').filter((link) => toString(link).startsWith('How this is made')).length).toBeGreaterThan(3)
  })
  test('can’t be led to by the account', async () => {
    expect(await faultsOf({ 'template.md': '[x](#survey) :made{at="made-opinion"}\n\n::section{name="opinion"}' })).toMatchObject([
      { code: 'anchor-left-out', place: 'template.md:1:1' }, { code: 'anchor-left-out', place: 'template.md:1:14' },
    ])
    expect(await faultsOf({ 'template.md': '[x](#survey)\n\n::section{name="survey"}' })).toEqual([])
  })
})

test('the house a second time is one fault', async () => {
  expect(await faultsOf({ 'template.md': '::house\n\n::house' })).toMatchObject([{ code: 'section-twice', place: 'template.md:3:1' }])
})

test('a chart that nothing calls is told', async () => {
  const chart = JSON.stringify({ data: { name: 'venues' }, mark: 'bar', encoding: { x: { field: 'share', type: 'quantitative' } } })
  expect(await faultsOf({ 'template.md': '::section{name="venues"}', 'charts/own.json': chart })).toMatchObject([{ code: 'chart-unused', place: 'charts/own.json' }])
  expect(await faultsOf({ 'template.md': '::section{name="venues"}', 'charts/venues.json': chart })).toEqual([])
})

test('mends', async () => {
  expect(nearest('zebra', ['opinion', 'venues'])).toBe('Known are opinion, venues.')
  expect(nearest('opinon', ['opinion', 'venues'])).toContain('Write "opinion"')
  const mend = async (text: string) => (await faultsOf({ 'template.md': text })).map(({ message, mend }) => `${message} ${mend}`)
  expect(await mend(':figure{of="venues.share" as="share"}')).toMatchObject([expect.stringContaining('"venues" is a list: write venues[first].share') as string])
  expect(await mend(':figure{of="opinion" as="interval"}')).toMatchObject([expect.stringContaining('Unexpected a group of figures "opinion", expected an interval') as string])
  expect(await mend('::figure{of="brand" as="text"}')).toMatchObject([expect.stringContaining('Write :figure') as string])
  expect(await mend(':::each{of="venus" as="it"}\n:figure{of="it.share" as="share"}\n:::')).toHaveLength(1)
})
