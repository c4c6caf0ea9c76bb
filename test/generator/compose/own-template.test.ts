import { symlinkSync, writeFileSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { toString } from 'hast-util-to-string'
import { describe, expect, test } from 'vitest'
import { elementsOf } from '../../support/house-composition.ts'
import { composeFiles, faultsOf } from '../../support/own-account.ts'

const told = async (files: Parameters<typeof faultsOf>[0], prepare?: Parameters<typeof faultsOf>[1]) => (await faultsOf(files, prepare)).map(({ code, place }) => [code, place])
const template = (text: string) => told({ 'template.md': text })
const sections = async (text: string) => elementsOf(await composeFiles({ 'template.md': text }), 'section').map(({ properties }) => properties['id'])

describe('sections of the house', () => {
  test('stand in the house order, from one to another, some left out', async () => {
    expect(await sections('::house{from="opinion" to="survey" without="topics, customers"}')).toEqual(['opinion', 'moved', 'venues', 'speaking', 'survey'])
  })
  test('all of them are the house review', async () => {
    const whole = await composeFiles({ 'template.md': '::house' })
    expect(elementsOf(whole, 'section').map(({ properties }) => properties['id']).slice(0, 3)).toEqual(['first-page', 'contents', 'opinion'])
  })
  test.each([
    ['::house{from="venus"}', 'section-unknown', '"venues"'],
    ['::house{without="topcs"}', 'section-unknown', '"topics"'],
    ['::house{from="constructor"}', 'section-unknown', ''],
    ['::house{from="survey" to="venues"}', 'house-order', 'Change the two'],
    ['::section{name="venues"}\n\n::house', 'section-twice', 'without="venues"'],
    ['::notes\n\n::house', 'notes-twice', ''],
  ])('%s: %s', async (text, code, mend) => {
    const [fault] = await faultsOf({ 'template.md': text })
    expect(fault).toMatchObject({ code, place: `template.md:${text.split('\n').length}:1` })
    expect(fault!.mend).toContain(mend)
  })
  test('an own section that nothing calls is told with the name it may have been meant for', async () => {
    const [fault] = await faultsOf({ 'template.md': '::house', 'sections/suvrey.md': '## Ours\n' })
    expect(fault).toMatchObject({ code: 'section-unused', place: 'sections/suvrey.md' })
    expect(fault!.mend).toContain('survey.md')
  })
})

describe('a text put in', () => {
  test('is filled where it stands, in the names of the block around it', async () => {
    const document = await composeFiles({
      'template.md': ':::each{of="venues" as="venue" most=2}\n::include{file="texts/one.md"}\n:::', 'texts/one.md': 'Here: :figure{of="venue" as="label"}.',
    })
    expect(toString(document.tree).match(/Here: /g)).toHaveLength(2)
  })
  test('has its faults at its own place, once', async () => {
    expect(await told({ 'template.md': '::include{file="a.md"}\n\n::include{file="./a.md"}', 'a.md': 'x\n\n:figure{of="bran" as="text"}' })).toEqual([['path-unknown', 'a.md:3:1']])
  })
  test('can’t bring a section into a section', async () => {
    expect(await told({ 'template.md': '::section{name="own"}', 'sections/own.md': '::include{file="a.md"}', 'a.md': '::section{name="own"}' })).toEqual([['section-nested', 'a.md:1:1']])
  })
  test.each(['../secret.md', '/etc/hostname.md', 'a/../../b.md', 'C:\\a.md', 'texts\\a.md'])('outside the account is refused: %s', async (path) => {
    expect((await template(`::include{file='${path}'}`))[0]).toEqual(['template-outside', 'template.md:1:1'])
  })
  test('behind a link out of the account is refused, a section and notes too', async () => {
    const outside = join(tmpdir(), `outside-${process.pid}.md`)
    writeFileSync(outside, 'a secret')
    expect(await told({ 'template.md': '::include{file="a.md"}' }, (folder) => { symlinkSync(outside, join(folder, 'a.md')) })).toEqual([['template-outside', 'template.md:1:1']])
    for (const path of ['sections/a.md', 'notes/2026-10.md']) {
      expect(await told({ 'template.md': '::house', [path.replace(/[^/]+$/, 'x.txt')]: '' }, (folder) => { symlinkSync(outside, join(folder, path)) })).toEqual([['template-outside', path]])
    }
  })
  test('in a circle, very deep, or very often is refused where it is', async () => {
    expect(await told({ 'template.md': '::include{file="a.md"}', 'a.md': '::include{file="b.md"}', 'b.md': 'x\n\n::include{file="a.md"}' })).toEqual([['include-circular', 'b.md:3:1']])
    const chain = Object.fromEntries(Array.from({ length: 9 }, (_, at) => [`t${at}.md`, `::include{file="t${at + 1}.md"}`]))
    expect(await told({ 'template.md': '::include{file="t0.md"}', ...chain, 't9.md': 'end' })).toEqual([['include-deep', 't7.md:1:1']])
    const tenfold = (file: string) => Array.from({ length: 10 }, () => `::include{file="${file}"}`).join('\n\n')
    expect(await told({ 'template.md': tenfold('a.md'), 'a.md': tenfold('b.md'), 'b.md': tenfold('c.md'), 'c.md': 'x' })).toEqual([['include-many', 'a.md:17:1']])
  })
  test('of more than 1 MB, of other bytes than text, of another kind or absent is refused', async () => {
    expect(await told({ 'template.md': '::include{file="a.md"}', 'a.md': 'x '.repeat(600_000) })).toEqual([['template-large', 'template.md:1:1']])
    expect(await told({ 'template.md': '::include{file="a.md"}', 'a.md': 'x\0y' })).toEqual([['template-no-text', 'template.md:1:1']])
    expect(await told({ 'template.md': '::include{file="account.yaml"}', 'account.yaml': 'a: b' })).toEqual([['include-kind', 'template.md:1:1']])
    expect(await told({ 'template.md': '::include{file="a.md"}', 'a.md': `x\n\n${'>'.repeat(20_000)} x` })).toEqual([['nested-deep', 'template.md:1:1']])
    expect(await template('::include{file="absent.md"}')).toEqual([['template-missing', 'template.md:1:1']])
    expect(await template('::include{file="__proto__"}')).toEqual([['include-kind', 'template.md:1:1']])
  })
})

describe('what a template can’t do', () => {
  test.each([
    ['<script>alert(1)</script>', 'html-in-template'], ['a <b>c</b>', 'html-in-template'], ['<!-- later -->', 'html-in-template'],
    ['[x](javascript:alert(1))', 'address-unfit'], ['[x](data:text/html,x)', 'address-unfit'], ['[x](file:///etc/passwd)', 'address-unfit'], ['[x][y]\n\n[y]: vbscript:x', 'address-unfit'],
    ['![x](https://example.org/x.png)', 'image-in-template'], ['![x](file:///etc/passwd)', 'image-in-template'], ['x[^1]\n\n[^1]: y', 'footnote-in-template'],
    ['::section{name="__proto__"}', 'section-unknown'], ['::section{name="constructor"}', 'section-unknown'], ['::chart{name="__proto__"}', 'chart-unknown'],
    ['::chart{name="constructor"}', 'chart-unknown'], ['::table{name="constructor" columns="label"}', 'table-unknown'], [':say{message="constructor"}', 'message-unknown'],
    [':figure{of="constructor.name" as="text"}', 'path-unknown'], [':figure{of="opinion.__proto__" as="text"}', 'path-unknown'], [':figure{of="brand" as="constructor"}', 'form-unknown'],
    ['##### deep', 'heading-deep'],
  ])('%s: %s', async (text, code) => {
    expect((await template(text)).map(([found]) => found)).toContain(code)
  })
  test('links to the web, to mail and to its own headings stand', async () => {
    const document = await composeFiles({ 'template.md': '## Our view\n\n[a](https://example.org/) [b](http://example.org/) [c](mailto:a@example.org) [d](#our-view)' })
    expect(elementsOf(document, 'a').map(({ properties }) => properties['href'])).toEqual(['https://example.org/', 'http://example.org/', 'mailto:a@example.org', '#our-view'])
  })
})
