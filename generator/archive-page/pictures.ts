import { estimateCells, makeTable } from '../tables/make-table.ts'
import type { Table } from '../tables/table.ts'
import type { ChartSpec } from '../render/charts/chart-spec.ts'
import { date, period } from '../words/dates.ts'
import { interval, points } from '../words/numbers.ts'
import type { Words } from '../words/words.ts'
import { figuresOf, type ListedPeriod } from './order-reviews.ts'
import type { PageEstimate, PageFigures } from './page-figures.ts'
import type { ListedReview } from './read-reviews.ts'

/** How many steps up to a period's end a small picture shows: of weeks, a quarter of a year. */
const stepsShown = 13

/** A picture of the page: what render draws it from, and what it says to those who do not see it. */
export interface Picture {
  readonly spec: ChartSpec
  readonly table: Table
  readonly alt: string
}

/** A period that has figures: as they stand, and as they were first sealed where that is another figure. */
export interface PeriodFigures {
  readonly period: string
  readonly now: PageFigures
  readonly first: PageEstimate | null
}

/** Of the periods whose figures can be read, oldest first. */
export function figuresByPeriod(periods: readonly ListedPeriod[], words: Words): readonly PeriodFigures[] {
  return periods.toReversed().flatMap((those) => {
    const [now, first] = [figuresOf(those[0]), figuresOf(those[those.length - 1])]
    if (now === null) return []
    return [{ period: those[0].manifest.period, now, first: first === null || shownAlike(first.opinion.period, now.opinion.period, words) ? null : first.opinion.period }]
  })
}

function shownAlike(one: PageEstimate, other: PageEstimate, { locale }: Words): boolean {
  return (['mean', 'low', 'high'] as const).every((part) => points(one[part], locale) === points(other[part], locale))
}

/** Opinion over all periods as it was sealed, each with its interval. @param figures - oldest first, at least one */
export function opinionPicture(spec: ChartSpec, figures: readonly PeriodFigures[], brand: string, words: Words): Picture {
  const [oldest, newest] = [figures[0], figures[figures.length - 1]]
  const { lowest, highest } = extremesOf(figures)
  return {
    spec: { ...spec, name: 'opinion', data: { name: 'archive-periods' } },
    table: makeTable('archive-periods', {
      start: 'date', opinion: 'points', opinion_low: 'points', opinion_high: 'points', first: 'points', first_low: 'points', first_high: 'points',
    }, figures.map(({ now, first }) => ({ start: now.period.start, ...estimateCells('opinion', now.opinion.period), ...estimateCells('first', first) }))),
    alt: words.say('archive-page-opinion-alt', {
      brand, periods: figures.length, from: period(oldest.period, words), to: period(newest.period, words),
      ...told('lowest', lowest, words), ...told('highest', highest, words), ...told('last', newest, words), intervals: interval(newest.now.opinion.period, points, words),
      revised: figures.filter(({ first }) => first !== null).length,
    }),
  }
}

/** @returns the periods in which opinion stood lowest and highest */
export function extremesOf(figures: readonly PeriodFigures[]): { readonly lowest: PeriodFigures; readonly highest: PeriodFigures } {
  const sorted = figures.toSorted((a, b) => a.now.opinion.period.mean - b.now.opinion.period.mean)
  return { lowest: sorted[0], highest: sorted[sorted.length - 1] }
}

/** The figure and the period as arguments of a message: `lowest`, `lowest_period`. */
export function told<K extends string>(name: K, { period: of, now }: PeriodFigures, words: Words): Record<K | `${K}_period`, string> {
  return { [name]: points(now.opinion.period.mean, words.locale), [`${name}_period`]: period(of, words) } as Record<K | `${K}_period`, string>
}

export interface Scale { readonly low: number; readonly high: number }

/** From the lowest bound to the highest of all small pictures: on one scale they can be held against each other. */
export function stepsScale(reviews: readonly ListedReview[]): Scale | null {
  const shown = reviews.flatMap((review) => lastSteps(figuresOf(review))).map(({ adjusted }) => adjusted)
  return shown.length === 0 ? null : { low: Math.min(...shown.map(({ low }) => low)), high: Math.max(...shown.map(({ high }) => high)) }
}

/** Opinion in the last steps up to the end of a review's period, small. */
export function stepsPicture(spec: ChartSpec, { manifest: { sequence } }: ListedReview, figures: PageFigures, scale: Scale, words: Words): Picture {
  const steps = lastSteps(figures)
  const [levels, name] = [steps.map(({ adjusted }) => adjusted.mean), `steps-${sequence}`]
  const write = (value: number): string => points(value, words.locale)
  return {
    spec: { ...spec, name, data: { name }, params: [{ name: 'lowest', value: scale.low }, { name: 'highest', value: scale.high }] },
    table: makeTable(name, { step: 'date', opinion: 'points', opinion_low: 'points', opinion_high: 'points' }, steps.map(({ step, adjusted }) => ({ step, ...estimateCells('opinion', adjusted) }))),
    alt: words.say('archive-page-steps-alt', {
      steps: steps.length, grid: figures.grid, end: date(figures.period.end, words.locale),
      first: write(levels[0]), last: write(levels[levels.length - 1]), lowest: write(Math.min(...levels)), highest: write(Math.max(...levels)),
    }),
  }
}

function lastSteps(figures: PageFigures | null): PageFigures['opinion']['series'] {
  return figures?.opinion.series.filter(({ step }) => step <= figures.period.end).slice(-stepsShown) ?? []
}
