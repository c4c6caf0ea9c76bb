import type { Element, Root } from 'hast'
import { toString } from 'hast-util-to-string'
import { h } from 'hastscript'
import { afterAll, beforeAll, expect, test } from 'vitest'
import { periodsOf, type ListedPeriod } from '../../../generator/archive-page/order-reviews.ts'
import type { PageFigures } from '../../../generator/archive-page/page-figures.ts'
import { readReviews, type ListedReview } from '../../../generator/archive-page/read-reviews.ts'
import { opinionCell, periodCell, revisionCell, sealedCell, seriousCell, type CellContext, type Content } from '../../../generator/archive-page/review-cells.ts'
import { houseWords } from '../../support/house-words.ts'
import { fivePeriods, inventedArchive } from './invented-archive.ts'

const words = await houseWords()
let periods: readonly ListedPeriod[]
let remove: () => Promise<void>
beforeAll(async () => {
  const made = await inventedArchive(fivePeriods)
  remove = made.remove
  periods = periodsOf((await readReviews(made.folder)).reviews)
})
afterAll(() => remove())

const context = (those: ListedPeriod, severalIntervals = false): CellContext => ({ those, severalIntervals, words })
const texts = (content: Content): readonly string[] => h('td', [...content]).children.map((child) => toString(child as Element)).filter((text) => text !== ' ')
const linksIn = (content: Content): readonly (readonly unknown[])[] => {
  const found: unknown[][] = []
  const walk = (node: Root | Element): void => {
    for (const child of node.children) {
      if (child.type !== 'element') continue
      if (child.tagName === 'a') found.push([child.properties['href'], toString(child), child.properties['ariaLabel']])
      walk(child)
    }
  }
  walk(h('td', [...content]))
  return found
}

test('links lead to the files of that very seal, and say of which they are', () => {
  const [october, , august] = periods
  expect(linksIn(periodCell(october[0], context(october)))).toEqual([
    ['2026-10/review.html', 'October 2026', undefined], ['2026-10/review.pdf', 'PDF file', 'PDF file, October 2026'], ['2026-10/findings.json', 'All figures', 'All figures, October 2026'],
  ])
  expect(linksIn(periodCell(august[1], context(august)))[0]).toEqual(['2026-08.r2/review.html', 'August 2026, revision\u00a02', undefined])
})

test('no link to a file that was not sealed', () => {
  const [october] = periods
  const bare: ListedReview = { ...october[0], manifest: { ...october[0].manifest, files: [] } }
  expect(linksIn(periodCell(bare, context([bare])))).toEqual([])
  expect(texts(periodCell(bare, context([bare])))[0]).toBe('October 2026')
})

test('a folder’s name cannot lead elsewhere', () => {
  const [october] = periods
  const named = (name: string) => linksIn(periodCell({ ...october[0], name }, context(october)))[0][0]
  expect(named('javascript:alert(1)')).toBe('javascript%3Aalert(1)/review.html')
  expect(named('..\\"><')).toBe('..%5C%22%3E%3C/review.html')
})

test('a revision says why, and how far it moved opinion from the one before and from the first', () => {
  const [, , august] = periods
  const cells = august.map((review) => texts(revisionCell(review, context(august))))
  expect(cells).toEqual([
    ['Revision 3', 'Coding audit of August repeated with 400 posts a venue', 'Opinion against revision 2: +0.4', 'Opinion against the first review: +0.9'],
    ['Revision 2, replaced since', 'Late posts of two boards', 'Opinion against the first review: +0.5'],
    ['First review, replaced since'],
  ])
})

test('what cannot be read is not said to have moved', () => {
  const [, , [third, second, first]] = periods
  const spoilt: ListedPeriod = [third, { ...second, figures: 'changed' }, first]
  expect(texts(revisionCell(third, context(spoilt))).slice(2)).toEqual(['Opinion against revision 2: not known', 'Opinion against the first review: +0.9'])
})

test('the level of an interval stands with it where reviews differ in it', () => {
  const [october] = periods
  const figures = october[0].figures as PageFigures
  expect(texts(opinionCell(figures, context(october)))).toEqual(['21.9', '19.9 to 23.9'])
  expect(texts(opinionCell({ ...figures, interval: 0.8 }, context(october, true)))).toEqual(['21.9', '19.9 to 23.9 (at 80%)'])
})

test('serious caveats are counted and named; one of another version by what was said of it', () => {
  const [october] = periods
  const caveat = (code: string, severity: string, figures = {}) => ({ code, severity, figures, evidence: `evidence of ${code}` })
  const figures = { ...october[0].figures as PageFigures, caveats: [
    caveat('thin-data', 'serious'), caveat('one-venue', 'caution'), caveat('of-the-future', 'serious'), caveat('venue-thin', 'serious', { venue: 'Blogs' }), caveat('venue-thin', 'serious'),
  ] }
  expect(texts(seriousCell(figures, context(october)))).toEqual(['4', 'Few mentionsevidence of of-the-futureFew authors: Blogsevidence of venue-thin'])
  expect(texts(seriousCell({ ...figures, caveats: [] }, context(october)))).toEqual(['0'])
})

test('the seal is dated, signed by two people, and its fingerprint is short in the text and whole in the title', () => {
  const [october] = periods
  const cell = h('td', [...sealedCell(october[0], context(october))])
  expect(toString(cell)).toBe(`7 Dec 2026 Prepared by Ana Reis. Reviewed by Bo Lund. ${october[0].hash.slice(0, 12)}`)
  expect(JSON.stringify(cell)).toContain(`"title":"${october[0].hash}"`)
})
