import { describe, expect, test } from 'vitest'
import type { Findings } from '../../../model/findings/schema.ts'
import { tablesOf } from '../../../generator/tables/tables-of.ts'
import type { Row } from '../../../generator/tables/table.ts'
import { middleOf, movedMiddle } from '../../../generator/tables/wave-dates.ts'
import { houseWords } from '../../support/house-words.ts'
import { postsAlone, sampleFindings } from '../../support/sample-findings.ts'
import { sampleSurvey, type Survey } from '../../support/sample-survey.ts'

const words = await houseWords()
const findings = sampleFindings()
const survey = findings.survey!
const rowsOf = (of: Findings, name: string): readonly Row[] => tablesOf(of).find((table) => table.name === name)?.rows ?? []
const withSurvey = (change: Partial<Survey>): Findings => ({ ...findings, survey: { ...sampleSurvey(), ...change } })
const ofSurvey = ['tracker', 'survey-waves', 'agreement', 'survey-lags', 'survey-candidates', 'survey-forecasts', 'next-wave', 'survey-rivals', 'lag-weights', 'departures', 'outcome-lags', 'events']

test('without survey, outcome and events their tables are there and empty', () => {
  for (const name of ofSurvey) expect(rowsOf(postsAlone(), name), name).toEqual([])
  for (const name of ofSurvey) expect(rowsOf(findings, name).length, name).toBeGreaterThan(0)
})

test('every column has its words; the bounds of an interval share theirs', () => {
  for (const { name, columns } of tablesOf(findings).filter((table) => ofSurvey.includes(table.name))) {
    for (const { key } of columns) if (!/(^|_)(low|high)$/.test(key)) expect(words.has(`column-${key}`), `${name}: ${key}`).toBe(true)
  }
})

describe('the tracker', () => {
  test('has a row for each metric, segment and wave, each metric\u2019s segments beside each other', () => {
    const rows = rowsOf(findings, 'tracker')
    expect(rows).toHaveLength(survey.metrics.reduce((sum, { waves }) => sum + waves.length, 0))
    expect([...new Set(rows.map(({ metric, segment }) => `${metric} ${segment}`))].slice(0, 4)).toEqual(['favourability null', 'favourability islander', 'favourability visitor', 'consideration null'])
    expect(rows.filter(({ latest }) => latest)).toHaveLength(12)
    expect(rows[5]).toMatchObject({ value: survey.metrics[0]!.waves[5]!.value, change: survey.metrics[0]!.waves[5]!.change!.difference, adjusted_p: survey.metrics[0]!.waves[5]!.change!.adjusted_p })
  })
  test('withholds every figure of a base under 30, also from the file, and keeps the base', () => {
    const reading = { ...survey.metrics[0]!.waves[7]!, base: 12, shown: 'hidden' as const }
    expect(reading.value).not.toBeNull()
    const of = withSurvey({ waves: [reading], metrics: [{ ...survey.metrics[0]!, waves: [reading] }] })
    for (const name of ['tracker', 'survey-waves']) {
      expect(rowsOf(of, name)).toHaveLength(1)
      expect(rowsOf(of, name)[0]).toMatchObject({ base: 12, shown: 'hidden', value: null, low: null, high: null, change: null, change_low: null, change_p: null, movement: null })
    }
    expect(rowsOf(of, 'agreement').at(-1)).toMatchObject({ series: 'survey', value: null, low: null, high: null })
  })
})

describe('both series on one axis of time', () => {
  const rows = rowsOf(findings, 'agreement')
  test('opinion is moved by the lag and stands at the middle of its steps, waves stand at the middle of fieldwork', () => {
    const opinion = findings.opinion.series[0]!
    expect(opinion.step).toBe('2024-05-06')
    // 6 May is a Monday: its week's middle is Thursday, four weeks later 6 June
    expect(rows[0]).toMatchObject({ series: 'adjusted', date: '2024-06-06', moved_by: 4, value: opinion.adjusted.mean })
    expect(rows.find(({ series }) => series === 'survey')).toMatchObject({ date: '2024-05-15', moved_by: 0, value: survey.waves[0]!.value })
    expect(rows).toHaveLength(findings.opinion.series.length + survey.waves.length)
  })
  test('where there is no best lag nothing is moved', () => {
    const none = withSurvey({ candidates: survey.candidates.map((of) => ({ ...of, best: null, best_lag: null })) })
    expect(rowsOf(none, 'agreement')[0]).toMatchObject({ date: '2024-05-09', moved_by: 0 })
  })
  test('on every grid, across the ends of months and years', () => {
    expect(movedMiddle('2026-12-28', 1, 'week')).toBe('2027-01-07')
    expect(movedMiddle('2026-12-28', -1, 'week')).toBe('2026-12-24')
    expect(movedMiddle('2026-12-31', 1, 'day')).toBe('2027-01-01')
    expect(movedMiddle('2026-11-01', 2, 'month')).toBe('2027-01-16')
    expect(movedMiddle('2024-03-01', -1, 'month')).toBe('2024-02-15')
    expect([middleOf('2026-10-10', '2026-10-21'), middleOf('2026-10-10', '2026-10-10'), middleOf('2026-12-28', '2027-01-05')]).toEqual(['2026-10-15', '2026-10-10', '2027-01-01'])
  })
})

describe('lags', () => {
  test('one lag of each series is the best; opinion comes first, then the raw average, then venues in the order of the document', () => {
    const shuffled = withSurvey({ candidates: [...survey.candidates].reverse() })
    const order = rowsOf(shuffled, 'survey-candidates').map(({ label }) => label)
    expect(order.slice(0, 2)).toEqual(['adjusted', 'raw'])
    expect(order.slice(2)).toEqual(rowsOf(findings, 'venues').map(({ label }) => label))
    const lags = rowsOf(shuffled, 'survey-lags')
    expect(lags).toHaveLength(7 * 25)
    expect(lags.filter(({ best }) => best).map(({ lag }) => lag)).toEqual(rowsOf(shuffled, 'survey-candidates').map(({ lag }) => lag))
  })
  test('weights: the largest is marked', () => {
    expect(rowsOf(findings, 'lag-weights').filter(({ largest }) => largest).map(({ lag }) => lag)).toEqual([4])
  })
})

test('forecasts: four rows of scores, the posts\u2019 own first and without a ratio', () => {
  const rows = rowsOf(findings, 'survey-rivals')
  expect(rows.map(({ rival }) => rival)).toEqual(['posts', 'carry-forward', 'past-mean', 'waves-alone'])
  expect(rows[0]).toMatchObject({ rmse: survey.forecast!.rmse, rmse_ratio: null, crps_ratio: null, dm_p: null })
  expect(rows[2]).toMatchObject({ rmse_ratio: survey.forecast!.rivals[1]!.rmse_ratio })
  expect(rowsOf(findings, 'survey-forecasts')).toHaveLength(22)
})

test('the next wave is a row by itself, none where there is none', () => {
  expect(rowsOf(findings, 'next-wave')).toEqual([expect.objectContaining({ middle: '2026-11-15', forecast: survey.next_wave!.forecast.mean, low: survey.next_wave!.forecast.low, last: survey.next_wave!.last })])
  expect(rowsOf(withSurvey({ next_wave: null }), 'next-wave')).toEqual([])
})

test('the outcome is told for a rise of 1 point, a tenth of what the findings hold', () => {
  const of = findings.outcome!.lags[1]!.effect
  expect(rowsOf(findings, 'outcome-lags')[1]).toMatchObject({ span_lag: '1', effect: of.mean / 10, low: of.low / 10, high: of.high / 10 })
})

test('a departure has a row for each event beside it, and one where there is none', () => {
  const [departure] = survey.departures
  const events = [{ date: '2025-06-09', label: 'One', kind: '' }, { date: '2025-07-01', label: 'Two', kind: '' }]
  expect(rowsOf(withSurvey({ departures: [{ ...departure!, events }, { ...departure!, events: [] }] }), 'departures').map(({ event, event_date: date }) => [event, date]))
    .toEqual([['One', '2025-06-09'], ['Two', '2025-07-01'], [null, null]])
})
