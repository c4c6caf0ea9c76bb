import { fileURLToPath } from 'node:url'
import { inflateSync } from 'node:zlib'
import { PDFDict, PDFDocument, PDFHexString, PDFName, PDFRawStream, PDFString } from '@cantoo/pdf-lib'
import { getDocument } from 'pdfjs-dist/legacy/build/pdf.mjs'
import type { Browser } from 'puppeteer'
import { afterAll, beforeAll, describe, expect, test } from 'vitest'
import { operationsOf } from '../../../generator/print/content-stream.ts'
import { openBrowser } from '../../../generator/print/open-browser.ts'
import { print } from '../../../generator/print/print.ts'
import { render } from '../../../generator/render/render.ts'
import { chartNames, sampleDocument, sampleRendering } from '../render/sample-document.ts'
import { accessRules } from './access-rules.ts'
import { archiveRules } from './archive-rules.ts'
import { cutInTwo, readStructure, type Tagged, withRole } from './read-structure.ts'

const facts = { title: 'Skerrow Ferries: brand health review, October 2026', author: 'The analyst', date: '2026-10-31', language: 'en-GB' }
let browser: Browser
let html: string
let pdf: Uint8Array
let structure: Tagged

beforeAll(async () => {
  browser = await openBrowser()
  html = await render(sampleDocument(), await sampleRendering())
  pdf = await print(html, browser, facts, [])
  structure = await readStructure(pdf)
})
afterAll(async () => { await browser.close() })

/** The head of a table stands on each of its pages, as it should. */
function isRepeatedHead(row: Tagged): boolean {
  return row.role === 'TR' && withRole(row, 'TD').length === 0
}

async function pageTexts(bytes: Uint8Array): Promise<readonly string[]> {
  const document = await getDocument({ data: bytes.slice(), verbosity: 0 }).promise
  const texts = []
  for (let page = 1; page <= document.numPages; page += 1) {
    const { items } = await (await document.getPage(page)).getTextContent()
    texts.push(items.map((item) => ('str' in item ? item.str : '')).join(' ').replace(/\s+/g, ' '))
  }
  await document.destroy()
  return texts
}

test('two prints of the same HTML are byte-identical; another title is not', async () => {
  expect(Buffer.from(await print(html, browser, facts, [])).equals(Buffer.from(pdf))).toBe(true)
  expect(Buffer.from(await print(html, browser, { ...facts, title: 'Another' }, [])).equals(Buffer.from(pdf))).toBe(false)
})

test('says of itself what the review says, not what the clock says', async () => {
  const document = await PDFDocument.load(pdf, { updateMetadata: false })
  expect([document.getTitle(), document.getAuthor()]).toEqual([facts.title, facts.author])
  expect(document.getCreationDate()?.toISOString()).toBe('2026-10-31T00:00:00.000Z')
  expect(document.getModificationDate()?.toISOString()).toBe('2026-10-31T00:00:00.000Z')
  expect(document.catalog.lookup(PDFName.of('Lang'), PDFString, PDFHexString).decodeText()).toBe('en-GB')
  expect(document.catalog.lookup(PDFName.of('ViewerPreferences'), PDFDict).get(PDFName.of('DisplayDocTitle'))?.toString()).toBe('true')
  expect(document.catalog.lookup(PDFName.of('MarkInfo'), PDFDict).get(PDFName.of('Marked'))?.toString()).toBe('true')
})

test('has bookmarks', async () => {
  const document = await getDocument({ data: pdf.slice(), verbosity: 0 }).promise
  const outline = await document.getOutline()
  expect(outline.flatMap((entry) => [entry.title, ...entry.items.map((item: { readonly title: string }) => item.title)])).toContain('What chart venues shows')
  await document.destroy()
})

test('embeds the house font and nothing else', async () => {
  const document = await PDFDocument.load(pdf, { updateMetadata: false })
  const fonts = document.context.enumerateIndirectObjects().flatMap(([, object]) => (
    object instanceof PDFDict && object.get(PDFName.of('Type')) === PDFName.of('Font') ? [object] : []))
  const names = fonts.map((font) => font.get(PDFName.of('BaseFont'))?.toString() ?? 'none')
  expect(names.length).toBeGreaterThan(0)
  for (const name of names) expect(name).toMatch(/^\/[A-Z]{6}\+SourceSans3/)
  expect(fonts.map((font) => font.get(PDFName.of('Subtype'))?.toString())).not.toContain('/Type3')
  const descriptors = document.context.enumerateIndirectObjects().flatMap(([, object]) => (
    object instanceof PDFDict && object.get(PDFName.of('Type')) === PDFName.of('FontDescriptor') ? [object] : []))
  for (const descriptor of descriptors) expect(descriptor.has(PDFName.of('FontFile2'))).toBe(true)
})

test.each(Object.entries({ ...archiveRules, ...accessRules }))('keeps the rule on %s in all that the house prints', async (_name, { clause, faults }) => {
  expect(faults({ bytes: pdf, document: await PDFDocument.load(pdf, { updateMetadata: false }) }), clause).toEqual([])
})

describe('structure', () => {
  test('headings, tables with header cells', () => {
    expect(withRole(structure, 'H1')).toHaveLength(1)
    expect(withRole(structure, 'Table')).toHaveLength(2)
    expect(withRole(structure, 'TH').length).toBeGreaterThan(100)
  })

  test('every picture has its text alternative, once', () => {
    expect(withRole(structure, 'Figure').map((figure) => figure.alt)).toEqual([
      'Text alternative of "opinion", first', ...chartNames.map((name) => `Text alternative of "${name}", again`),
    ])
  })

  test('no row and no chart is cut in two', () => {
    expect(withRole(structure, 'TR').length).toBeGreaterThan(130)
    expect(cutInTwo(structure, ['TR', 'Figure']).filter((element) => !isRepeatedHead(element))).toEqual([])
  })

  test('it can fail: a row longer than a page is found out', async () => {
    const long = `<!doctype html><html lang="en"><title>t</title><table><tr><th scope="col">A</th><th scope="col">B</th></tr><tr><td>${'line<br>'.repeat(200)}</td><td>b</td></tr></table></html>`
    expect(cutInTwo(await readStructure(await print(long, browser, facts, [])), ['TR'])).toHaveLength(1)
  })
})

test('the contents name the page on which each heading stands', async () => {
  const texts = await pageTexts(pdf)
  // as many charts fill more than one page of contents
  const contents = texts.slice(0, 2).join(' ')
  for (const name of chartNames) {
    const stated = new RegExp(`What chart ${name} shows (\\d+)(?: |$)`).exec(contents)
    const page = Number(stated?.[1])
    expect(texts[page - 1], name).toContain(`What chart ${name} shows As the`)
  }
})

test('a link in the text names its page too', async () => {
  const texts = await pageTexts(pdf)
  const stated = texts.map((text) => /Where tables stand ?, page (\d+)/.exec(text)?.[1]).find((page) => page !== undefined)
  expect(texts[Number(stated) - 1]).toContain('Figures of opinion')
})

test('running head from the second page on, page x of y on every page', async () => {
  const texts = await pageTexts(pdf)
  texts.forEach((text, index) => { expect(text).toContain(`Page ${index + 1} of ${texts.length}`) })
  expect(texts[0]).not.toContain('brand health review')
  for (const text of texts.slice(1)) expect(text).toContain('brand health review')
})

test('every page paints inside marked content: running heads are artifacts, and no part of the text that is read aloud', async () => {
  const document = await PDFDocument.load(pdf, { updateMetadata: false })
  for (const page of document.getPages()) {
    const stream = page.node.lookup(PDFName.of('Contents'))
    if (!(stream instanceof PDFRawStream)) throw new Error('expected one stream a page')
    const source = inflateSync(stream.getContents()).toString('latin1')
    expect(source).toContain('/Artifact BMC')
    let depth = 0
    for (const { operator } of operationsOf(source)) {
      if (operator === 'BDC' || operator === 'BMC') depth += 1
      if (operator === 'EMC') depth -= 1
      if (operator === 'Tj' || operator === 'TJ' || operator === 'f' || operator === 'S') expect(depth).toBe(1)
    }
    expect(depth).toBe(0)
  }
})

test('every link says where it leads', async () => {
  const document = await PDFDocument.load(pdf, { updateMetadata: false })
  const links = document.context.enumerateIndirectObjects().flatMap(([, object]) => (
    object instanceof PDFDict && object.get(PDFName.of('Subtype')) === PDFName.of('Link') ? [object] : []))
  const said = links.map((link) => link.lookup(PDFName.of('Contents'), PDFHexString).decodeText())
  expect(said).toContain('https://example.org/method')
  expect(said).toContain('What chart venues shows')
})

test('a wide table lies on a landscape page of its own', async () => {
  const document = await PDFDocument.load(pdf, { updateMetadata: false })
  const landscape = document.getPages().map((page) => page.getWidth() > page.getHeight())
  expect(landscape.filter(Boolean)).toHaveLength(1)
  expect((await pageTexts(pdf))[landscape.indexOf(true)]).toContain('Figures of venues')
})

test.each([
  ['a picture', '<img src="http://127.0.0.1:9/a.png">'],
  ['a style sheet', '<link rel="stylesheet" href="https://example.org/a.css">'],
])('%s from outside is refused and named', async (_what, element) => {
  await expect(print(`<!doctype html><html lang="en"><title>t</title><body>${element}</body></html>`, browser, facts, [])).rejects.toThrow('expected none')
})

test('a frame shows no file of this machine', async () => {
  const secret = fileURLToPath(import.meta.url)
  const bytes = await print(`<!doctype html><html lang="en"><title>t</title><body><p>before</p><iframe src="file://${secret}"></iframe></body></html>`, browser, facts, [])
  expect((await pageTexts(bytes)).join(' ')).not.toContain('secret')
})

test('a script does not run', async () => {
  const page = '<!doctype html><html lang="en"><title>t</title><body><p id="p">as written</p><script>document.getElementById("p").textContent = "changed"</script></body></html>'
  expect((await pageTexts(await print(page, browser, facts, [])))[0]).toBe('as written')
})
