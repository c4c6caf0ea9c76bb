import { execFileSync, spawnSync } from 'node:child_process'
import { mkdtempSync, rmSync, writeFileSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { PDFArray, PDFDict, PDFDocument, PDFHexString, type PDFName, PDFNumber, PDFString } from '@cantoo/pdf-lib'
import { getDocument } from 'pdfjs-dist/legacy/build/pdf.mjs'
import { beforeAll, describe, expect, test } from 'vitest'
import { openBrowser } from '../../../generator/print/open-browser.ts'
import { print } from '../../../generator/print/print.ts'
import { srgbProfile } from '../../../generator/print/srgb-profile.ts'
import { elementsOf, roleOf } from '../../../generator/print/tags.ts'
import { accessRules } from './access-rules.ts'
import { archiveRules } from './archive-rules.ts'
import { annotationsOf, contentOf, dictionary, key, ofType, streamBytes, textOf, written, type OpenPdf, type Rule } from './pdf-objects.ts'
import { smallFacts, smallFiles, smallReview } from './small-review.ts'

const rules = { ...archiveRules, ...accessRules }
let bytes: Uint8Array
let again: Uint8Array

beforeAll(async () => {
  const browser = await openBrowser()
  bytes = await print(smallReview, browser, smallFacts, smallFiles)
  again = await print(smallReview, browser, smallFacts, [...smallFiles].reverse())
  await browser.close()
})

async function open(): Promise<OpenPdf> {
  return { bytes: bytes.slice(), document: await PDFDocument.load(bytes, { updateMetadata: false }) }
}

const set = (dict: PDFDict | undefined, name: string, value: PDFName | PDFNumber | PDFString) => { dict!.set(key(name), value) }
const first = (document: PDFDocument, role: string) => elementsOf(document).find((element) => roleOf(element) === role)!
const catalogEntry = (document: PDFDocument, name: string) => dictionary(document.catalog.lookup(key(name)))
const link = (document: PDFDocument) => document.getPages().flatMap(annotationsOf)[0]

/** The first page with its content changed. */
function rewrite(document: PDFDocument, change: (content: string) => string): void {
  const page = document.getPages()[0]
  page.node.set(key('Contents'), document.context.register(document.context.stream(Buffer.from(change(contentOf(page)), 'latin1'), {})))
}

function rewriteMetadata(document: PDFDocument, change: (packet: string) => string): void {
  const packet = change(streamBytes(document.catalog.lookup(key('Metadata')))!.toString('utf8'))
  document.catalog.set(key('Metadata'), document.context.register(document.context.stream(new TextEncoder().encode(packet), {})))
}

/** How to break each rule, in each of its parts that matters most. */
const spoilers: Readonly<Record<keyof typeof rules, readonly ((pdf: OpenPdf) => void)[]>> = {
  header: [(pdf) => { pdf.bytes[7] = 0x39 }, (pdf) => { pdf.bytes[10] = 0x20 }],
  trailer: [({ document }) => { delete document.context.trailerInfo.ID }, ({ document }) => { document.context.trailerInfo.Encrypt = document.context.obj({}) }],
  limits: [
    ({ document }) => { document.catalog.set(key('a'.repeat(130)), PDFNumber.of(1)) }, ({ document }) => { document.catalog.set(key('Long'), PDFString.of('a'.repeat(40000))) },
    ({ document }) => { rewrite(document, (content) => `${'q '.repeat(30)}${content}${' Q'.repeat(30)}`) },
  ],
  streams: [({ document }) => { set(document.catalog, 'Filter', key('LZWDecode')) }, ({ document }) => { set(document.catalog, 'FFilter', key('FlateDecode')) }],
  outputIntent: [
    ({ document }) => { document.catalog.delete(key('OutputIntents')) },
    ({ document }) => { set(dictionary(document.catalog.lookup(key('OutputIntents'), PDFArray).lookup(0)), 'DestOutputProfile', PDFNumber.of(1)) },
  ],
  colours: [({ document }) => { rewrite(document, (content) => `0 0 0 1 k\n${content}`) }],
  transparency: [({ document }) => { for (const page of document.getPages()) page.node.delete(key('Group')) }],
  fonts: [
    ({ document }) => { for (const font of ofType(document, 'FontDescriptor')) font.delete(key('FontFile2')) },
    ({ document }) => { for (const font of ofType(document, 'Font')) font.delete(key('CIDToGIDMap')) },
  ],
  annotations: [({ document }) => { link(document).delete(key('F')) }, ({ document }) => { set(link(document), 'F', PDFNumber.of(6)) }, ({ document }) => { set(link(document), 'Subtype', key('Movie')) }],
  actions: [({ document }) => { document.catalog.set(key('OpenAction'), document.context.obj({ S: 'JavaScript', JS: PDFString.of('1') })) }, ({ document }) => { document.catalog.set(key('AA'), document.context.obj({})) }],
  metadata: [
    ({ document }) => { document.catalog.delete(key('Metadata')) }, ({ document }) => { document.setTitle('Another') }, ({ document }) => { document.setCreationDate(new Date(0)) },
    ({ document }) => { rewriteMetadata(document, (packet) => packet.replace('<pdfaid:part>3', '<pdfaid:part>2')) },
  ],
  attachments: [
    ...['AFRelationship', 'F', 'Desc'].map((name) => ({ document }: OpenPdf) => { ofType(document, 'Filespec')[0].delete(key(name)) }),
    ...['Subtype', 'Params'].map((name) => ({ document }: OpenPdf) => { ofType(document, 'EmbeddedFile')[0].delete(key(name)) }),
    ({ document }) => { document.catalog.delete(key('AF')) }, ({ document }) => { document.catalog.delete(key('Names')) },
    ({ document }) => {
      const names = catalogEntry(document, 'Names')!.lookup(key('EmbeddedFiles'), PDFDict).lookup(key('Names'), PDFArray)
      names.set(0, PDFString.of('zz'))
    },
  ],
  declared: [
    ...['MarkInfo', 'ViewerPreferences', 'Lang'].map((name) => ({ document }: OpenPdf) => { document.catalog.delete(key(name)) }),
  ],
  content: [
    ({ document }) => { rewrite(document, (content) => content.replace('/Artifact BMC', '')) }, ({ document }) => { rewrite(document, (content) => content.replace(/MCID (\d)/, 'MCID 9$1')) },
    ({ document }) => { rewrite(document, (content) => `${content}\nBT <0001> Tj ET`) }, ({ document }) => { for (const element of elementsOf(document)) element.delete(key('Pg')) },
  ],
  roles: [({ document }) => { catalogEntry(document, 'StructTreeRoot')!.delete(key('RoleMap')) }, ({ document }) => { catalogEntry(document, 'StructTreeRoot')!.set(key('RoleMap'), document.context.obj({ Strong: 'Span', Em: 'Span', P: 'Div' })) }],
  figures: [({ document }) => { first(document, 'Figure').delete(key('Alt')) }],
  headings: [({ document }) => { set(first(document, 'H2'), 'S', key('H3')) }, ({ document }) => { set(first(document, 'H1'), 'S', key('P')) }],
  tables: [({ document }) => { first(document, 'TH').delete(key('A')) }, ({ document }) => { set(first(document, 'TR'), 'S', key('P')) }, ({ document }) => { set(first(document, 'TD'), 'S', key('P')) }, ({ document }) => { first(document, 'TR').delete(key('K')) }],
  lists: [({ document }) => { set(first(document, 'LBody'), 'S', key('P')) }, ({ document }) => { set(first(document, 'LI'), 'S', key('P')) }],
  artifacts: [({ document }) => { rewrite(document, (content) => content.replace(/\/Artifact <<[^>]*>>BDC/, '/Artifact BMC')) }],
  links: [({ document }) => { link(document).delete(key('Contents')) }, ({ document }) => { link(document).delete(key('StructParent')) }, ({ document }) => { document.getPages()[0].node.delete(key('Tabs')) }],
  characters: [
    ({ document }) => { for (const font of ofType(document, 'Font')) font.delete(key('ToUnicode')) }, ({ document }) => { rewrite(document, (content) => content.replace(/<[0-9A-F]{4}> Tj/, '<0000> Tj')) },
  ],
  bookmarks: [
    ({ document }) => { document.catalog.delete(key('Outlines')) },
    ({ document }) => { catalogEntry(document, 'Outlines')!.lookup(key('First'), PDFDict).delete(key('Dest')) },
  ],
}

describe.each(Object.entries(rules) as [keyof typeof rules, Rule][])('%s', (name, rule) => {
  test('is kept', async () => { expect(rule.faults(await open()), rule.clause).toEqual([]) })

  test.each(spoilers[name].map((spoil, at) => [at + 1, spoil] as const))('can fail, way %i', async (_at, spoil) => {
    const pdf = await open()
    spoil(pdf)
    expect(rule.faults(pdf)).not.toEqual([])
  })
})

test('attached files open in a viewer’s library and equal what was given; their order is that of their names', async () => {
  const document = await getDocument({ data: bytes.slice(), verbosity: 0 }).promise
  const attachments = await document.getAttachments() as Readonly<Record<string, { readonly filename: string; readonly description: string; readonly content: Uint8Array }>>
  expect(Object.keys(attachments)).toEqual(['findings.json', 'rows.csv'])
  for (const { name, description, bytes: given } of smallFiles) {
    expect(attachments[name]).toMatchObject({ filename: name, description })
    expect(Buffer.from(attachments[name].content).equals(Buffer.from(given))).toBe(true)
  }
  await document.destroy()
})

test('attached files bear the review’s date, their size and their sum', async () => {
  const { document } = await open()
  const [file] = ofType(document, 'EmbeddedFile')
  const parameters = dictionary(file.lookup(key('Params')))!
  expect(parameters.lookup(key('ModDate'), PDFString).decodeDate().toISOString()).toBe('2026-10-31T00:00:00.000Z')
  expect(smallFiles.map((given) => String(given.bytes.length))).toContain(written(parameters, 'Size'))
  expect(parameters.lookup(key('CheckSum'), PDFHexString).asBytes()).toHaveLength(16)
})

test('the same files in another order give the same bytes', () => { expect(Buffer.from(again).equals(Buffer.from(bytes))).toBe(true) })

test('a name that a viewer could not save under is refused', async () => {
  const browser = await openBrowser()
  await expect(print('<!doctype html><html lang="en"><title>t</title><p>t</p></html>', browser, smallFacts, [{ ...smallFiles[0], name: 'tables/rows.csv' }])).rejects.toThrow('tables/rows.csv')
  await browser.close()
})

test('the metadata is XML that a reader understands', async () => {
  const document = await getDocument({ data: bytes.slice(), verbosity: 0 }).promise
  const { metadata } = await document.getMetadata() as { readonly metadata: { get(name: string): unknown } }
  expect([metadata.get('dc:title'), metadata.get('dc:creator'), metadata.get('dc:language')]).toEqual([smallFacts.title, [smallFacts.author], 'en-GB'])
  expect([metadata.get('pdfaid:part'), metadata.get('pdfaid:conformance')]).toEqual(['3', 'B'])
  await document.destroy()
})

describe('structure', () => {
  test('running heads and numbers say which they are', async () => {
    const kinds = (await open()).document.getPages().map((page) => new Set([...contentOf(page).matchAll(/\/Subtype \/(Header|Footer) /g)].map((match) => match[1])))
    for (const kind of kinds) expect([...kind]).toEqual(['Header', 'Footer'])
  })

  test('the head of a table is read once, though it stands on both pages', async () => {
    const { document } = await open()
    expect(document.getPages().length).toBeGreaterThan(1)
    const heads = elementsOf(document).filter((element) => roleOf(element) === 'TH' && /\/Scope \/Column/.test(written(element, 'A')))
    expect(heads).toHaveLength(2)
    for (const head of heads) expect(readNumbers(head)).toBe(1)
    const second = contentOf(document.getPages()[1])
    expect(second.match(/\/Artifact <<\/Type \/Pagination >>BDC/g)).toHaveLength(2)
  })

  test('a link inside says the heading that it leads to, one outside its address', async () => {
    const { document } = await open()
    const said = document.getPages().flatMap(annotationsOf).map((annotation) => textOf(annotation.lookup(key('Contents'))))
    expect(new Set(said)).toEqual(new Set(['Figures', 'https://example.org/method', 'Größe']))
  })

  test('the page of a heading that is not ASCII is found as well', async () => {
    const document = await getDocument({ data: bytes.slice(), verbosity: 0 }).promise
    const { items } = await (await document.getPage(1)).getTextContent()
    const text = items.map((item) => ('str' in item ? item.str : '')).join('').replace(/\s+/g, ' ')
    expect(text).toContain(`the size, page ${document.numPages}.`)
    await document.destroy()
  })

  test('a painted bullet is said', async () => {
    const labels = elementsOf((await open()).document).filter((element) => roleOf(element) === 'Lbl').map((label) => textOf(label.lookup(key('ActualText'))))
    expect(labels).toEqual(['\u2022', '\u2022', undefined])
  })
})

/** How many stretches of content stand below an element. */
function readNumbers(element: PDFDict): number {
  const kids = element.lookup(key('K'))
  const list = kids instanceof PDFArray ? kids.asArray().map((kid) => element.context.lookup(kid)) : [kids]
  return list.reduce((sum, kid) => sum + (kid instanceof PDFNumber || written(dictionary(kid), 'Type') === '/MCR' ? 1 : kid instanceof PDFDict ? readNumbers(kid) : 0), 0)
}

test('the output intent’s profile is stored whole', async () => {
  const { document } = await open()
  const profile = dictionary(document.catalog.lookup(key('OutputIntents'), PDFArray).lookup(0))!.lookup(key('DestOutputProfile'))
  expect(streamBytes(profile)!.equals(Buffer.from(srgbProfile()))).toBe(true)
})

const qpdf = spawnSync('qpdf', ['--version']).status === 0

describe.skipIf(!qpdf)('qpdf (only where it is installed)', () => {
  const check = (pdf: Uint8Array) => {
    const folder = mkdtempSync(join(tmpdir(), 'qpdf-'))
    try {
      writeFileSync(join(folder, 'a.pdf'), pdf)
      return execFileSync('qpdf', ['--check', join(folder, 'a.pdf')], { encoding: 'utf8', stdio: 'pipe' })
    } finally { rmSync(folder, { recursive: true }) }
  }
  test('finds no fault', () => { expect(check(bytes)).toContain('No syntax or stream encoding errors found') })
  test('it can fail: a file cut short', () => { expect(() => check(bytes.slice(0, bytes.length - 200))).toThrow() })
})
