import type { PDFDocument } from '@cantoo/pdf-lib'
import type { Browser, Page } from 'puppeteer'
import type { Attachment } from './attach-files.ts'
import { finishPdf, type PdfFacts, readPdf } from './finish-pdf.ts'
import { isolatedPage } from './isolate-page.ts'
import { fillPageNumbers, namesOfTargets, pagesOfTargets } from './page-numbers.ts'

/**
 * Print a review for keeping: PDF/A-3b, A4, tagged, bookmarked, with page numbers in its contents and files attached.
 * The same HTML, facts and files give the same bytes from the same browser.
 *
 * @param html - one self-contained file, as `render` makes it
 * @param browser - from `openBrowser`; a fresh context is used and closed
 * @param facts - what the file says of itself; the date comes from the review, never from the clock
 * @param attachments - in any order
 */
export async function print(html: string, browser: Browser, facts: PdfFacts, attachments: readonly Attachment[]): Promise<Uint8Array> {
  const { page, refused } = await isolatedPage(browser)
  try {
    await page.setContent(html, { waitUntil: 'load' })
    // also faces that only paper asks for: one that came in while it prints would change the bytes
    await page.evaluate('Promise.all([...document.fonts].map((face) => face.load())).then(() => document.fonts.ready).then(() => undefined)')
    const names = await namesOfTargets(page)
    const pdf = await printSettled(page)
    if (refused.length > 0) throw new Error(`Unexpected requests by the review, expected none: ${refused.join(', ')}`)
    return await finishPdf(pdf, { html, facts, attachments, names })
  } finally {
    await page.browserContext().close()
  }
}

/**
 * Print until the numbers in the contents are those of the print: a plain first pass to learn them, the real one, and a look that it settled.
 * The places of the numbers have a fixed width, so one pass settles it; the bound is there to fail loudly instead of looping.
 */
async function printSettled(page: Page): Promise<PDFDocument> {
  const hasNumbers = await page.$('[data-page-of]') !== null
  if (!hasNumbers) return printTagged(page)
  await fillPageNumbers(page, pagesOfTargets(await printPlain(page)))
  for (let pass = 0; pass < 3; pass += 1) {
    const pdf = await printTagged(page)
    if (!await fillPageNumbers(page, pagesOfTargets(pdf))) return pdf
  }
  throw new Error('Unexpected page numbers that never settle, expected the contents to keep its size')
}

/** Without tags and bookmarks: cheaper, and it breaks into pages in the same places. */
async function printPlain(page: Page): Promise<PDFDocument> {
  return readPdf(await page.pdf({ preferCSSPageSize: true, printBackground: true, tagged: false, outline: false }))
}

async function printTagged(page: Page): Promise<PDFDocument> {
  return readPdf(await page.pdf({ preferCSSPageSize: true, printBackground: true, tagged: true, outline: true }))
}
