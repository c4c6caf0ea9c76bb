import type { ElementContent } from 'hast'
import { h } from 'hastscript'
import { caveatArguments } from '../words/caveats.ts'
import { period, shortDate } from '../words/dates.ts'
import { change, count, interval, points, probabilityFigure, share } from '../words/numbers.ts'
import type { Words } from '../words/words.ts'
import { figuresOf, type ListedPeriod } from './order-reviews.ts'
import type { PageEstimate, PageFigures } from './page-figures.ts'
import type { ListedReview } from './read-reviews.ts'

/** So many characters of a fingerprint tell two manifests apart; the whole one is the text's title. */
const fingerprintShown = 12

/** What the cells of a review are made with: its period, all reviews of which stand on the page, and whether intervals differ in their level. */
export interface CellContext {
  readonly those: ListedPeriod
  readonly severalIntervals: boolean
  readonly words: Words
}

/** Of a cell. */
export type Content = readonly (ElementContent | string)[]

/** The period with the way to the review; of one that was replaced its revision stands for the period. */
export function periodCell({ name, manifest: { revision, files, period: of } }: ListedReview, { those, words }: CellContext): Content {
  const said = period(of, words)
  const named = those.length === 1 ? said : words.say('archive-page-named', { period: said, revision })
  const link = (file: string, text: string, what = text): Content => (
    files.some(({ path }) => path === file) ? [h('a', { href: `${encodeURIComponent(name)}/${file}`, ...(text !== named && { ariaLabel: `${what}, ${named}` }) }, text)] : []
  )
  const review = link('review.html', named)
  const others = [...link('review.pdf', words.say('archive-page-pdf')), ...link('findings.json', words.say('archive-page-findings'))]
  return [h('strong', review.length === 0 ? named : [...review]), h('span.files', others.flatMap((one, i) => (i === 0 ? [one] : [' ', one])))]
}

/** Opinion with its interval. */
export function opinionCell(figures: PageFigures, context: CellContext): Content {
  return estimated(figures.opinion.period, points, figures, context)
}

export function changeCell(figures: PageFigures, context: CellContext): Content {
  return figures.opinion.change === null ? [context.words.say('cell-empty')] : estimated(figures.opinion.change, change, figures, context)
}

function estimated(estimate: PageEstimate, write: (value: number, locale: string) => string, { interval: level }: PageFigures, { severalIntervals, words }: CellContext): Content {
  const bounds = interval(estimate, write, words)
  return [h('span', write(estimate.mean, words.locale)), ' ', h('span.bounds', severalIntervals ? words.say('archive-page-bounds', { bounds, level: share(level, words) }) : bounds)]
}

export function probabilityCell({ opinion: { probability_up: probability } }: PageFigures, { words }: CellContext): Content {
  return [probability === null ? words.say('cell-empty') : probabilityFigure(probability, words)]
}

/** How many serious caveats, and which. */
export function seriousCell({ caveats }: PageFigures, { words }: CellContext): Content {
  const serious = caveats.filter(({ severity }) => severity === 'serious')
  return [h('span', count(serious.length, words.locale)), ...(serious.length === 0 ? [] : [h('ul', serious.map((caveat) => h('li', titleOf(caveat, words))))])]
}

/** The title, or of a caveat of another version, which this one's catalogue has no words for, what was said of it then. */
function titleOf({ code, figures, evidence }: PageFigures['caveats'][number], words: Words): string {
  const title = `caveat-${code}-title`
  if (!words.has(title)) return evidence
  const given = caveatArguments(figures, words)
  return words.argumentsOf(title).every((name) => name in given) ? words.say(title, given) : evidence
}

/** Its number, why it was made, and how far it moved opinion from the one before, and from the first where that is another. */
export function revisionCell(review: ListedReview, { those, words }: CellContext): Content {
  const { revision, reason } = review.manifest
  const at = those.indexOf(review)
  const [before, first] = [those[at + 1], those[those.length - 1]]
  const moved = before === undefined ? [] : [before, ...(first === before ? [] : [first])].map((since) => movedSince(review, since, words))
  return [
    h('span', words.say('archive-page-revision', { revision, replaced: at === 0 ? 'no' : 'yes' })),
    ...(reason === null ? [] : [h('span.reason', reason)]), ...moved.map((text) => h('span.moved', text)),
  ]
}

function movedSince(review: ListedReview, since: ListedReview, words: Words): string {
  const [now, then] = [figuresOf(review), figuresOf(since)]
  const moved = now === null || then === null ? words.say('not-known') : change(now.opinion.period.mean - then.opinion.period.mean, words.locale)
  return words.say('archive-page-moved', { revision: since.manifest.revision, change: moved })
}

/** When, by whom, and the fingerprint of the manifest. */
export function sealedCell({ manifest: { sealed_at, prepared_by: prepared, reviewed_by: reviewed }, hash }: ListedReview, { words }: CellContext): Content {
  return [
    h('span', shortDate(sealed_at.slice(0, 10), words.locale)), ' ', h('span.people', words.say('cover-people', { preparing: 'given', prepared, reviewing: 'given', reviewed })),
    ' ', h('code', { title: hash }, hash.slice(0, fingerprintShown)),
  ]
}

/** In place of the figures that cannot be read. */
export function unreadText(figures: Exclude<ListedReview['figures'], PageFigures>, words: Words): string {
  return words.say('archive-page-unread', { why: figures })
}
