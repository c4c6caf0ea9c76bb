import { describe, expect, test } from 'vitest'
import type { Account } from '../../../generator/account/account.ts'
import { dayNumber, isoDate } from '../../../generator/calendar/days.ts'
import type { Grid } from '../../../generator/calendar/grid.ts'
import { periodNamed } from '../../../generator/calendar/periods.ts'
import { timeline } from '../../../generator/calendar/timeline.ts'
import { firstForecast, placeInputs } from '../../../generator/inputs/place-inputs.ts'
import type { RawInputs, RawSurvey, RawWave } from '../../../generator/inputs/raw-inputs.ts'
import type { SurveyReading } from '../../../model/inputs/small-inputs.ts'

const reading = (metric: number, segment = -1): SurveyReading => ({ metric, segment, base: 400, effectiveBase: 340, value: 0.43, sd: null })
const wave = (name: string, start: string, end: string, readings: readonly SurveyReading[] = [reading(0)]): RawWave => ({ name, start, end, readings })
const metric = (name: string) => ({ name, label: name, kind: 'share' as const })
const surveyOf = (waves: readonly RawWave[]): RawSurvey => ({ headline: 0, metrics: [metric('favourability'), metric('trust')], segments: ['islander', 'visitor'], waves })
const rawOf = (parts: Partial<RawInputs>): RawInputs => ({ survey: null, events: null, outcome: null, benchmark: null, audit: null, importance: null, files: [], ...parts })

/** Mentions from 5 January to 28 March 2026 under review of March: on a grid of weeks, steps from Monday 5 January on. */
function axis(grid: Grid = 'week', review = '2026-03') {
  return timeline({ grid, reporting: 'month', base: null, firstDay: dayNumber('2026-01-05'), lastDay: dayNumber('2026-03-28'), review: periodNamed('month', review)! })
}

const accountWith = (nextFieldwork: { from: string; to: string } | null = null) =>
  ({ customers: null, survey: { pattern: '', files: [], headline: null, lags: [-8, 16], labels: {}, nextFieldwork } }) as unknown as Account

const place = (parts: Partial<RawInputs>, nextFieldwork: { from: string; to: string } | null = null, on = axis()) => placeInputs(rawOf(parts), accountWith(nextFieldwork), on)
const days = (window: { days: Float64Array }) => [...window.days]

/** Fieldwork of twelve days from the 10th of each month on, from December 2025. */
const monthly = (count: number) => Array.from({ length: count }, (_, month) => {
  const start = dayNumber(isoDate(Date.UTC(2025, 11 + month, 10) / 864e5))
  return wave(`w${month + 1}`, isoDate(start), isoDate(start + 11))
})

describe('the survey on the time axis', () => {
  test('fieldwork is placed by its days, also before the grid begins', () => {
    const survey = place({ survey: surveyOf([wave('w1', '2025-12-29', '2026-01-06'), wave('w2', '2026-02-27', '2026-03-02')]) }).survey!
    expect(survey.waves.map((each) => [each.name, each.start, each.end, each.startStep, days(each)])).toEqual([
      ['w1', '2025-12-29', '2026-01-06', -1, [7, 2]], ['w2', '2026-02-27', '2026-03-02', 7, [3, 1]],
    ])
    expect(survey.lags).toEqual([-8, 16])
  })

  test('a wave counts whose fieldwork ends on the last day under review, and not one that runs on past it', () => {
    const waves = [wave('w1', '2026-02-02', '2026-02-13'), wave('w2', '2026-03-20', '2026-03-31'), wave('w3', '2026-03-21', '2026-04-01'), wave('w4', '2026-04-20', '2026-05-01')]
    const survey = place({ survey: surveyOf(waves) }).survey!
    expect([survey.waves.map(({ name }) => name), survey.later]).toEqual([['w1', 'w2'], ['w3', 'w4']])
  })

  test('metrics and segments that only later waves name are left out, but never the headline', () => {
    const early = wave('w1', '2026-02-02', '2026-02-13', [reading(1), reading(1, 1)])
    const survey = place({ survey: { ...surveyOf([early, wave('w2', '2026-04-02', '2026-04-13', [reading(0), reading(0, 0)])]), headline: 0 } }).survey!
    expect([survey.metrics.map(({ name }) => name), survey.segments, survey.headline]).toEqual([['favourability', 'trust'], ['visitor'], 0])
    expect(survey.waves[0]!.readings.map(({ metric: of, segment }) => [of, segment])).toEqual([[1, -1], [1, 0]])
    const other = place({ survey: { ...surveyOf([wave('w1', '2026-02-02', '2026-02-13', [reading(1)]), wave('w2', '2026-04-02', '2026-04-13', [reading(0)])]), headline: 1 } }).survey!
    expect([other.metrics.map(({ name }) => name), other.headline, other.waves[0]!.readings[0]!.metric]).toEqual([['trust'], 0, 0])
  })

  test('a survey whose waves are all to come has none', () => {
    const survey = place({ survey: surveyOf([wave('w1', '2026-05-02', '2026-05-13'), wave('w2', '2026-06-02', '2026-06-13')]) }).survey!
    expect([survey.waves, survey.later, survey.next, survey.metrics.map(({ name }) => name)]).toEqual([[], ['w1', 'w2'], null, ['favourability']])
  })
})

describe('the wave to come', () => {
  test('is expected a usual spacing after the last, for as long as usual', () => {
    const { next } = place({ survey: surveyOf(monthly(4)) }).survey!
    // first days 31, 31 and 28 days apart
    expect(next).toMatchObject({ start: '2026-04-10', end: '2026-04-21', dates: 'usual-spacing', startStep: 13 })
    expect(days(next!)).toEqual([3, 7, 2])
  })

  test('is where the account says', () => {
    const { next } = place({ survey: surveyOf(monthly(4)) }, { from: '2026-04-13', to: '2026-04-19' }).survey!
    expect(next).toMatchObject({ start: '2026-04-13', end: '2026-04-19', dates: 'given', startStep: 14 })
  })

  test('is not where the account says when there is a wave between', () => {
    const { next, later } = place({ survey: surveyOf(monthly(5)) }, { from: '2026-05-13', to: '2026-05-19' }).survey!
    expect([later, next]).toMatchObject([['w5'], { start: '2026-04-10', dates: 'usual-spacing' }])
  })

  test('goes by the waves that have the headline for everyone', () => {
    const [first, second, third, fourth] = monthly(4)
    const { next } = place({ survey: surveyOf([first!, { ...second!, readings: [reading(0, 1)] }, third!, { ...fourth!, readings: [reading(1)] }]) }).survey!
    // 62 days after 10 February
    expect(next!.start).toBe('2026-04-13')
  })

  test('is not known from fewer than two waves', () => {
    expect(place({ survey: surveyOf(monthly(1)) }).survey!.next).toBeNull()
    expect(place({ survey: surveyOf(monthly(1)) }, { from: '2026-04-13', to: '2026-04-19' }).survey!.next).toBeNull()
  })
})

describe('the first wave to be forecast', () => {
  test('is the ninth that has the headline for everyone', () => {
    const waves = monthly(10)
    expect(firstForecast(rawOf({ survey: surveyOf(waves) }))).toBe('2026-08-10')
    expect(firstForecast(rawOf({ survey: surveyOf(waves.map((each, index) => (index === 3 ? { ...each, readings: [reading(1)] } : each))) }))).toBe('2026-09-10')
  })

  test('is none with fewer, or without a survey', () => {
    expect([firstForecast(rawOf({ survey: surveyOf(monthly(8)) })), firstForecast(rawOf({}))]).toEqual([null, null])
  })
})

describe('events and the outcome on the time axis', () => {
  const dated = (...dates: readonly string[]) => dates.map((date) => ({ date, label: date, kind: '' }))
  const values = (...dates: readonly string[]) => dates.map((date, index) => ({ date, value: index + 1, market: null }))

  test('events have the step that holds them, and none is of a day after the period', () => {
    expect(place({ events: dated('2025-12-31', '2026-01-05', '2026-03-31', '2026-04-01') }).events!.map(({ date, step }) => [date, step]))
      .toEqual([['2025-12-31', -1], ['2026-01-05', 0], ['2026-03-31', 12]])
    expect(place({ events: dated('2026-03-31') }, null, axis('month')).events![0]!.step).toBe(2)
  })

  test('a value is of the days up to the next one; the last month is whole, and no later one is told', () => {
    const { spans } = place({ outcome: values('2026-01-01', '2026-02-01', '2026-03-01', '2026-04-01') }, null, axis('month')).outcome!
    expect(spans.map(({ start, end, startStep, days: each, value }) => [start, end, startStep, [...each], value])).toEqual([
      ['2026-01-01', '2026-01-31', 0, [31], 1], ['2026-02-01', '2026-02-28', 1, [28], 2], ['2026-03-01', '2026-03-31', 2, [31], 3],
    ])
  })

  test('what the account does not give is null', () => {
    expect(place({})).toEqual({ survey: null, events: null, outcome: null, benchmark: null, audit: null, importance: null, customers: null })
  })
})

test('what has no date is as it was read', () => {
  const benchmark = [{ margin: 'segment', levels: [{ level: 'islander', share: 1 }] }]
  const audit = [{ venue: 'boards', trueLabel: 'neutral', codedLabel: 'negative', count: 7 }]
  const input = { kind: 'stated', topics: [{ topic: 'staff', weight: 1 }] } as const
  const raw = rawOf({ benchmark, audit, importance: { input, incomplete: 3 } })
  expect(placeInputs(raw, { ...accountWith(), customers: 310_000 }, axis())).toMatchObject({ benchmark, audit, importance: input, customers: 310_000 })
})
