import { PDFArray, PDFDict, type PDFDocument, PDFName, PDFRef } from '@cantoo/pdf-lib'
import type { Page } from 'puppeteer'

/**
 * The page on which each target of a link inside the document stands.
 *
 * @param document - a print; Chromium writes the target of every `a[href="#id"]` into the catalog's /Dests
 * @returns id -> page, counted from 1
 */
export function pagesOfTargets(document: PDFDocument): ReadonlyMap<string, number> {
  const numbers = new Map(document.getPages().map((page, index) => [page.ref.toString(), index + 1]))
  const targets = document.catalog.lookupMaybe(PDFName.of('Dests'), PDFDict)
  const pages = new Map<string, number>()
  for (const [name, entry] of targets?.entries() ?? []) {
    const target = document.context.lookup(entry)
    const first = target instanceof PDFArray ? target.get(0) : undefined
    const number = first instanceof PDFRef ? numbers.get(first.toString()) : undefined
    if (number !== undefined) pages.set(name.decodeText(), number)
  }
  return pages
}

/** The part of a page's element that is touched here: the function below runs inside the browser. */
interface Place {
  textContent: string | null
  getAttribute(name: string): string | null
}

/**
 * Write page numbers into the contents: into each `[data-page-of="id"]`, whose width is fixed, so that nothing moves by it.
 *
 * @returns true where anything changed, so that the page must be printed (again)
 */
export async function fillPageNumbers(page: Page, pages: ReadonlyMap<string, number>): Promise<boolean> {
  return page.$$eval('[data-page-of]', (places: readonly Place[], known) => {
    const numbers = new Map(known)
    const changed = places.filter((place) => {
      const number = numbers.get(place.getAttribute('data-page-of') ?? '')
      const text = number === undefined ? '' : String(number)
      if (place.textContent === text) return false
      place.textContent = text
      return true
    })
    return changed.length > 0
  }, [...pages])
}
