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
    if (number !== undefined) pages.set(plainName(name.decodeText()), number)
  }
  return pages
}

/** The name of a target: Chromium writes what is not ASCII in percent. */
export function plainName(name: string): string {
  try {
    return decodeURIComponent(name)
  } catch {
    return name
  }
}

/** The part of a page's element that is touched here: the function below runs inside the browser. */
interface Place {
  textContent: string | null
  getAttribute(name: string): string | null
}

/** A place, and what may stand in it. */
interface Target extends Place {
  readonly tagName: string
  readonly ownerDocument: { getElementById(id: string): Target | null }
  querySelector(selector: string): Target | null
}

/**
 * What the targets of links inside the document are called: by their heading, or how they begin.
 *
 * @returns id -> name; the target of a link to nowhere is missing
 */
export async function namesOfTargets(page: Page): Promise<ReadonlyMap<string, string>> {
  const written = await page.$$eval('a[href^="#"]', (links: readonly Place[]) => links.map((link) => (link.getAttribute('href') ?? '').slice(1)))
  const ids = [...new Set(written.map(plainName))]
  return new Map(await page.$eval('body', (body: Target, wanted) => wanted.flatMap((id): (readonly [string, string])[] => {
    const target = body.ownerDocument.getElementById(id)
    if (target === null) return []
    const heading = /^H[1-6]$/.test(target.tagName) ? target : target.querySelector('h1, h2, h3, h4, h5, h6, caption, dt') ?? target
    return [[id, (heading.textContent ?? '').replace(/\s+/g, ' ').trim().slice(0, 120)]]
  }), ids))
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
