import { readFileSync } from 'node:fs'
import { join } from 'node:path'
import { describe, expect, test } from 'vitest'
import { readAccount } from '../../generator/account/read-account.ts'
import { dayWindow } from '../../generator/calendar/day-window.ts'
import { dayNumber, isoDate } from '../../generator/calendar/days.ts'
import { outcomeSpans } from '../../generator/inputs/outcome-spans.ts'
import { firstForecast } from '../../generator/inputs/place-inputs.ts'
import { readSmallInputs } from '../../generator/inputs/read-small-inputs.ts'
import { correlation } from '../../model/statistics/correlation.ts'
import { neweyWest, neweyWestLags } from '../../model/statistics/newey-west.ts'
import { partnerOf, type StepSeries } from '../../model/survey/windows.ts'
import { makeDemo } from '../../sample-data/make-skerrow-ferries.ts'
import { brand } from '../../sample-data/making/posts.ts'
import { seededDraws } from '../../sample-data/making/seeded-draws.ts'
import { surveyLines } from '../../sample-data/making/survey.ts'

const folder = join(import.meta.dirname, '../../sample-data/skerrow-ferries')
const raw = await readSmallInputs(await readAccount(folder))
const survey = raw.survey!
const { story, rows } = makeDemo()

const grid = story.map((week) => dayNumber(week.monday))
const levels = (values: readonly number[]): StepSeries => ({ value: Float64Array.from(values), weight: new Float64Array(values.length).fill(1) })
const opinion = levels(story.map((week) => 100 * week.opinion))
const posts = rows.filter(({ flaw, post }) => flaw === 'none' && post.brand === brand).map(({ post }) => post)
const rawAverage = weeklyAverage()

function weeklyAverage(): StepSeries {
  const [sum, weight] = [new Float64Array(story.length), new Float64Array(story.length)]
  for (const { week, score } of posts) { sum[week] += 100 * score; weight[week] += 1 }
  return { value: sum.map((total, week) => total / weight[week]), weight }
}

interface Wave { readonly start: string, readonly end: string, readonly value: number }

/** Correlation of waves with a series so many weeks before, of the waves that have a partner. */
function correlationAt(series: StepSeries, waves: readonly Wave[], lag: number): number {
  const pairs = waves.flatMap(({ start, end, value }) => {
    const partner = partnerOf(series, dayWindow('week', grid[0], start, end), lag)
    return partner === null ? [] : [[partner, value] as const]
  })
  return correlation(pairs.map(([partner]) => partner), pairs.map(([, value]) => value))!
}

const lags = Array.from({ length: 25 }, (_, i) => i - 8)
const largest = (series: StepSeries, waves: readonly Wave[]) => Math.max(...lags.map((lag) => Math.abs(correlationAt(series, waves, lag))))

/** Favourability among everyone, as the program that makes the demo writes it. */
function favourability(seed: number): readonly Wave[] {
  return surveyLines(story, seededDraws(seed)).map((line) => line.split(',')).filter((fields) => fields[3] === 'favourability' && fields[4] === '')
    .map((fields) => ({ start: fields[1], end: fields[2], value: Number(fields[7]) }))
}

const readingsOf = (segment: number, metric: string) => survey.waves.flatMap(({ name, readings }) =>
  readings.filter((reading) => reading.segment === segment && survey.metrics[reading.metric].name === metric).map((reading) => ({ wave: name, ...reading })))
const headline: readonly Wave[] = survey.waves.map(({ start, end, readings }) => ({ start, end, value: readings.find(({ metric, segment }) => metric === survey.headline && segment === -1)!.value }))

describe('the waves', () => {
  test('are thirty, within the time of the posts, one of them across the end of a month', () => {
    expect([survey.waves.length, survey.segments, survey.metrics.map(({ name, kind }) => `${name} ${kind}`)])
      .toEqual([30, ['islander', 'visitor'], ['favourability share', 'consideration share', 'recommendation share', 'satisfaction mean']])
    expect(survey.metrics[survey.headline].name).toBe('favourability')
    expect(survey.waves.at(-1)!.end < '2026-10-31').toBe(true)
    expect(survey.waves.filter(({ start, end }) => start.slice(0, 7) !== end.slice(0, 7)).map(({ name }) => name)).toEqual(['2025-09'])
    for (const { start, end } of survey.waves) expect([10, 11, 12, 13, 14]).toContain(dayNumber(end) - dayNumber(start) + 1)
    expect(firstForecast(raw)).toBe(survey.waves[8].start)
  })

  test('have bases and effective bases as a telephone survey of 400 has', () => {
    for (const { base, effectiveBase } of readingsOf(-1, 'favourability')) {
      expect(base).toBeGreaterThanOrEqual(380)
      expect(base).toBeLessThanOrEqual(420)
      expect(effectiveBase / base).toBeGreaterThan(0.79)
      expect(effectiveBase / base).toBeLessThan(0.91)
    }
    const visitors = readingsOf(1, 'favourability')
    expect(visitors.filter(({ base }) => base < 30).map(({ wave, base }) => [wave, base])).toEqual([['2025-02', 24]])
    expect(visitors.filter(({ base }) => base < 75).length).toBeGreaterThan(5)
    expect(visitors.filter(({ base }) => base >= 75).length).toBeGreaterThan(15)
  })

  test('lack one metric once', () => {
    const asked = readingsOf(-1, 'recommendation').map(({ wave }) => wave)
    expect(survey.waves.map(({ name }) => name).filter((name) => !asked.includes(name))).toEqual(['2025-08'])
    for (const metric of ['favourability', 'consideration', 'satisfaction']) expect(readingsOf(-1, metric)).toHaveLength(30)
  })
})

describe('what is true of the survey', () => {
  const told = readFileSync(join(folder, 'TRUTH.md'), 'utf8').replace(/\s+/g, ' ')

  test('it follows opinion four weeks late, and the raw average hardly at all', () => {
    const best = lags.reduce((most, lag) => (correlationAt(opinion, headline, lag) > correlationAt(opinion, headline, most) ? lag : most))
    expect(best).toBe(4)
    expect(correlationAt(opinion, headline, 4)).toBeGreaterThan(0.8)
    expect(largest(rawAverage, headline)).toBeLessThan(0.35)
  })

  test('its figures are those that TRUTH.md tells', () => {
    expect(told).toContain(`correlates with true opinion at ${correlationAt(opinion, headline, 4).toFixed(2)} four weeks before`)
    expect(told).toContain(`with the raw weekly average at no more than ${largest(rawAverage, headline).toFixed(2)},`)
  })

  test('its seed is the first that makes it so, as TRUTH.md says', () => {
    const makesItSo = (seed: number) => correlationAt(opinion, favourability(seed), 4) > 0.8 && largest(rawAverage, favourability(seed)) < 0.35
    expect([1, 2, 3, 4, 5, 6, 7].filter(makesItSo)).toEqual([7])
    expect(favourability(7).map(({ value }) => value)).toEqual(headline.map(({ value }) => value))
  })
})

test('passengers grow with the market and, a month later, with a rise of opinion', () => {
  const outcome = raw.outcome!
  const spans = outcomeSpans(outcome.map(({ date }) => dayNumber(date)))
  expect([outcome.length, outcome.every(({ market }) => market !== null)]).toEqual([30, true])
  const moved = spans.map(({ first, last }) => {
    const partner = partnerOf(opinion, dayWindow('week', grid[0], isoDate(first), isoDate(last)), 0)
    return partner ?? Number.NaN
  })
  const growth = (of: (month: number) => number) => Float64Array.from({ length: 28 }, (_, i) => 100 * Math.log(of(i + 2) / of(i + 1)))
  const lagged = Float64Array.from({ length: 28 }, (_, i) => moved[i + 1] - moved[i])
  const { coefficients, standardErrors } = neweyWest(
    [new Float64Array(28).fill(1), growth((i) => outcome[i].market!), lagged], growth((i) => outcome[i].value), neweyWestLags(28))
  expect(Math.abs(coefficients[1] - 0.9)).toBeLessThan(2 * standardErrors[1])
  expect(Math.abs(coefficients[2] - 0.6)).toBeLessThan(2 * standardErrors[2])
  expect(coefficients[2] / standardErrors[2]).toBeGreaterThan(3)
})
