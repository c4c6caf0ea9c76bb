import { afterAll, beforeAll, expect, test } from 'vitest'
import { periodsOf, type ListedPeriod } from '../../../generator/archive-page/order-reviews.ts'
import type { PageFigures } from '../../../generator/archive-page/page-figures.ts'
import { extremesOf, figuresByPeriod, opinionPicture, stepsPicture, stepsScale } from '../../../generator/archive-page/pictures.ts'
import { readReviews, type ListedReview } from '../../../generator/archive-page/read-reviews.ts'
import { houseWords } from '../../support/house-words.ts'
import { fivePeriods, inventedArchive } from './invented-archive.ts'

const words = await houseWords()
let reviews: readonly ListedReview[]
let periods: readonly ListedPeriod[]
let remove: () => Promise<void>
beforeAll(async () => {
  const made = await inventedArchive(fivePeriods)
  remove = made.remove;
  ({ reviews } = await readReviews(made.folder))
  periods = periodsOf(reviews)
})
afterAll(() => remove())

const figuresOfLast = (): PageFigures => reviews[reviews.length - 1].figures as PageFigures

test('each period has the figure that stands, and the first one only where it is another', () => {
  expect(figuresByPeriod(periods, words).map(({ period, now, first }) => [period, now.opinion.period.mean, first?.mean ?? null])).toEqual([
    ['2026-06', 18.2, null], ['2026-07', 19.4, null], ['2026-08', 18, 17.1], ['2026-09', 20.3, null], ['2026-10', 21.9, null],
  ])
})

test('a figure that is written alike is no other one', () => {
  const [, , august] = periods
  const now = august[0].figures as PageFigures
  const moved = (by: number): ListedReview => ({ ...august[2], figures: { ...now, opinion: { ...now.opinion, period: { ...now.opinion.period, mean: now.opinion.period.mean + by } } } })
  expect(figuresByPeriod([[august[0], moved(0.02)]], words)[0].first).toBeNull()
  expect(figuresByPeriod([[august[0], moved(0.08)]], words)[0].first).not.toBeNull()
})

test('a period whose standing review cannot be read is not drawn, nor is the one before it put in its place', () => {
  const [, , august] = periods
  expect(figuresByPeriod([[{ ...august[0], figures: 'changed' }, august[1], august[2]]], words)).toEqual([])
})

test('the picture over all periods holds the sealed figures, and says them', () => {
  const figures = figuresByPeriod(periods, words)
  const { table, alt } = opinionPicture({ name: 'opinion' }, figures, 'Skerrow Ferries', words)
  expect(table.rows.map(({ start, opinion, opinion_low: low, opinion_high: high, first }) => [start, opinion, low, high, first])).toEqual([
    ['2026-06-01', 18.2, 16.2, 20.2, null], ['2026-07-01', 19.4, 17.4, 21.4, null], ['2026-08-01', 18, 16, 20, 17.1], ['2026-09-01', 20.3, 18.3, 22.3, null], ['2026-10-01', 21.9, 19.9, 23.9, null],
  ])
  expect(alt).toBe('Mix-adjusted opinion of Skerrow Ferries as it was sealed last, with its interval, 5 periods, June 2026 to October 2026. Lowest: 18.0 points (August 2026); highest: 21.9 (October 2026); '
    + 'last: 21.9 (October 2026, interval 19.9 to 23.9). In one period the figure that was first sealed is another.')
  expect([extremesOf(figures).lowest.period, extremesOf(figures).highest.period]).toEqual(['2026-08', '2026-10'])
})

test('a small picture holds the last thirteen steps up to the end of its period, on the scale of all', () => {
  const figures = figuresOfLast()
  const scale = stepsScale(reviews) ?? { low: 0, high: 0 }
  const { table, spec } = stepsPicture({ name: 'steps', params: [] }, reviews[reviews.length - 1], figures, scale, words)
  const expected = figures.opinion.series.filter(({ step }) => step <= '2026-10-31').slice(-13)
  expect(table.rows.map(({ step, opinion }) => [step, opinion])).toEqual(expected.map(({ step, adjusted }) => [step, adjusted.mean]))
  expect(table.rows).toHaveLength(13)
  expect(spec['params']).toEqual([{ name: 'lowest', value: scale.low }, { name: 'highest', value: scale.high }])
  const all = reviews.flatMap((review) => (review.figures as PageFigures).opinion.series.slice(-13))
  expect(scale).toEqual({ low: Math.min(...all.map(({ adjusted }) => adjusted.low)), high: Math.max(...all.map(({ adjusted }) => adjusted.high)) })
})

test('steps after the end of the period are not shown, and fewer than thirteen are no fault', () => {
  const figures = figuresOfLast()
  const early = { ...figures, period: { start: '2024-05-06', end: '2024-05-20' } }
  const { table, alt } = stepsPicture({ name: 'steps' }, reviews[0], early, { low: 0, high: 1 }, words)
  expect(table.rows.map(({ step }) => step)).toEqual(['2024-05-06', '2024-05-13', '2024-05-20'])
  expect(alt).toMatch(/^Opinion in the 3 weeks up to 20 May 2024: /)
})

test('without figures there is no scale', () => {
  expect(stepsScale(reviews.map((review) => ({ ...review, figures: 'missing' as const })))).toBeNull()
})
