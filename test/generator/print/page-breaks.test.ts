import { readFile } from 'node:fs/promises'
import { getDocument } from 'pdfjs-dist/legacy/build/pdf.mjs'
import type { Browser } from 'puppeteer'
import { afterAll, beforeAll, expect, test } from 'vitest'
import { openBrowser } from '../../../generator/print/open-browser.ts'
import { print } from '../../../generator/print/print.ts'
import { templates } from '../render/sample-document.ts'

let browser: Browser
let styles: string

beforeAll(async () => {
  browser = await openBrowser()
  styles = (await Promise.all(['page', 'figures', 'tables', 'paper'].map((name) => readFile(`${templates}theme/${name}.css`, 'utf8')))).join('\n')
})
afterAll(async () => { await browser.close() })

/** Sections that end in a table of two rows, each followed by one of a heading, a lead and a figure, after gaps of all sizes: some figure meets the foot of a page. */
function review(more = ''): string {
  const table = `<div class="table few-rows"><table><caption>Rows</caption><thead><tr><th scope="col">Name</th></tr></thead><tbody><tr><td>one</td></tr><tr><td>two</td></tr></tbody></table></div>`
  const figure = (at: number) => `<h2>Heading</h2><div class="lead"><p>A lead.</p></div><figure><figcaption><strong class="finding">Title${at}</strong> <span class="reading">Note${at}</span></figcaption><div class="drawing"><svg viewBox="0 0 660 330" width="660" height="330"><text x="20" y="40">Drawn${at}</text></svg></div></figure>`
  const sections = Array.from({ length: 12 }, (_, at) => `<section class="section" style="padding-top:${430 + 25 * at}px">${table}</section><section class="section">${figure(at)}</section><div style="break-after:page"></div>`)
  return `<!doctype html><html lang="en-GB"><head><title>x</title><style>${styles} @page { size: A4; margin: 18mm }${more}</style></head><body><main>${sections.join('')}</main></body></html>`
}

/** Figures of which title, note and drawing do not stand on one page. */
async function brokenFigures(html: string): Promise<readonly string[]> {
  const document = await getDocument({ data: await print(html, browser, { title: 'x', author: 'y', date: '2026-10-31', language: 'en-GB' }, []), verbosity: 0 }).promise
  const pages: string[] = []
  for (let page = 1; page <= document.numPages; page += 1) {
    const { items } = await (await document.getPage(page)).getTextContent()
    pages.push(items.map((item) => ('str' in item ? item.str : '')).join(' '))
  }
  await document.destroy()
  const pageOf = (word: string) => pages.findIndex((text) => new RegExp(`\\b${word}\\b`).test(text))
  return Array.from({ length: 12 }, (_, at) => String(at)).filter((at) => new Set([`Title${at}`, `Note${at}`, `Drawn${at}`].map(pageOf)).size > 1)
}

test('a figure is whole, wherever the foot of the page is', async () => {
  expect(await brokenFigures(review())).toEqual([])
})

test('it can fail: where the last row of a table is bound to what follows, a figure after it is broken', async () => {
  expect((await brokenFigures(review('@media print { tbody tr:last-child { break-after: avoid !important; } tbody tr:first-child { break-before: avoid !important; } }'))).length).toBeGreaterThan(0)
})
