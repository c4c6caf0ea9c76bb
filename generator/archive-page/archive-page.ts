import type { ElementContent, Root } from 'hast'
import { h } from 'hastscript'
import { render } from '../render/render.ts'
import type { Charts } from '../render/load-charts.ts'
import type { Theme } from '../theme/theme.ts'
import { period } from '../words/dates.ts'
import { points, share } from '../words/numbers.ts'
import type { Words } from '../words/words.ts'
import { figuresOf, periodsOf, type ListedPeriod } from './order-reviews.ts'
import { extremesOf, figuresByPeriod, opinionPicture, stepsPicture, stepsScale, told, type PeriodFigures, type Picture, type Scale } from './pictures.ts'
import type { ListedArchive, ListedReview } from './read-reviews.ts'
import { reviewTable } from './review-table.ts'

/** How the page looks and speaks: as the reviews of the account do. */
export interface PageLooks {
  readonly brand: string
  readonly words: Words
  readonly theme: Theme
  /** The page's own charts and style sheet: templates/archive. */
  readonly charts: Charts
  readonly css: string
}

/**
 * The page of an archive: every period and revision with its headline figures, as one self-contained HTML file.
 *
 *     sealed reviews ─by period─▶ pictures, table ─▶ tree ─rendered as a review is─▶ HTML
 *
 * Figures are chosen and formatted; the only one computed is how far a revision moved opinion. The page can't vouch for itself, so it says how to check
 * the archive and nothing of whether it is sound. The same archive, looks and program give the same bytes.
 */
export function archivePage(archive: ListedArchive, looks: PageLooks): Promise<string> {
  const { brand, words, theme } = looks
  const periods = periodsOf(archive.reviews)
  const [figures, scale] = [figuresByPeriod(periods, words), stepsScale(archive.reviews)]
  const opinion = figures.length === 0 ? null : opinionPicture(chartOf(looks, 'opinion'), figures, brand, words)
  const steps = new Map(archive.reviews.flatMap((review) => {
    const own = figuresOf(review)
    return own === null || scale === null ? [] : [[review.name, stepsPicture(chartOf(looks, 'steps'), review, own, scale, words)] as const]
  }))
  const levels = [...new Set(figures.map(({ now }) => share(now.interval, words)))]
  const tree: Root = { type: 'root', children: [
    h('div.overline', [h('p', words.say('archive-page-overline'))]), h('h1', brand),
    ...paragraphs([leadText(archive.reviews, periods, brand, words), scaleText(levels, words)]),
    ...(opinion === null ? [] : [h('h2', words.say('archive-page-opinion-heading')), opinionFigure(opinion, figures, words)]),
    h('h2', words.say('archive-page-reviews-heading')),
    ...paragraphs([words.say('archive-page-reviews'), ...(scale === null ? [] : [stepsText(scale, words)])]),
    reviewTable(periods, steps, levels.length > 1, words),
    ...(archive.unreadable.length === 0 ? [] : paragraphs([words.say('archive-page-unreadable', { names: new Intl.ListFormat(words.locale).format(archive.unreadable) })])),
    h('h2', words.say('archive-page-check-heading')),
    ...checkTexts(archive.reviews, words),
  ] }
  const pictures = [...(opinion === null ? [] : [opinion]), ...steps.values()]
  return render({ tree, title: words.say('archive-page-title', { brand }), lang: words.locale, headings: [] }, {
    tables: pictures.map(({ table }) => table), charts: new Map(pictures.map(({ spec }) => [spec.name, spec])), words, skip: 'archive-page-skip',
    theme: { ...theme, css: `${theme.css}\n${looks.css}`, cover: false },
    imprint: { brand, period: words.say('archive-page-overline'), preparedBy: null, reviewedBy: null },
  })
}

function chartOf({ charts }: PageLooks, name: string) {
  const spec = charts.get(name)
  if (spec === undefined) throw new Error(`Unexpected absence of the chart ${name}, expected it in templates/archive`)
  return spec
}

function paragraphs(texts: readonly string[]): readonly ElementContent[] {
  return texts.map((text) => h('p', text))
}

function leadText(reviews: readonly ListedReview[], periods: readonly ListedPeriod[], brand: string, words: Words): string {
  const name = (of: ListedPeriod | undefined): string => (of === undefined ? '' : period(of[0].manifest.period, words))
  return words.say('archive-page-lead', { brand, reviews: reviews.length, periods: periods.length, from: name(periods.at(-1)), to: name(periods[0]) })
}

function scaleText(levels: readonly string[], words: Words): string {
  return words.say('archive-page-scale', { levels: levels.length, interval: levels[0] ?? '' })
}

function stepsText({ low, high }: Scale, words: Words): string {
  return words.say('archive-page-steps', { low: points(low, words.locale), high: points(high, words.locale) })
}

function opinionFigure({ spec, alt }: Picture, figures: readonly PeriodFigures[], words: Words): ElementContent {
  const { lowest, highest } = extremesOf(figures)
  const title = words.say('archive-page-opinion-title', { periods: figures.length, ...told('lowest', lowest, words), ...told('highest', highest, words) })
  const note = words.say('archive-page-opinion-note', { revised: figures.filter(({ first }) => first !== null).length })
  return h('figure.chart', { dataChart: spec.name, dataAlt: alt }, [h('figcaption', [h('strong.finding', title), ' ', h('span.reading', note)])])
}

function checkTexts(reviews: readonly ListedReview[], words: Words): readonly ElementContent[] {
  const last = reviews.at(-1)
  return [
    ...paragraphs([words.say('archive-page-check', { command: 'tareline verify' })]),
    ...(last === undefined ? [] : [h('p', [words.say('archive-page-last', { sequence: last.manifest.sequence }), ' ', h('code', last.hash)])]),
  ]
}
