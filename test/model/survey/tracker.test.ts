import { describe, expect, test } from 'vitest'
import type { SurveyInput, SurveyReading } from '../../../model/inputs/small-inputs.ts'
import { readTracker } from '../../../model/survey/tracker.ts'

const share = (metric: number, value: number, base: number, more: Partial<SurveyReading> = {}): SurveyReading => ({ metric, segment: -1, base, effectiveBase: base, value, sd: null, ...more })
const wave = (name: string, start: string, end: string, ...readings: readonly SurveyReading[]) => ({ name, start, end, startStep: 0, days: Float64Array.of(7), readings })
const survey = (...waves: SurveyInput['waves']): SurveyInput => ({
  headline: 0, lags: [-1, 1], segments: ['islanders'], later: [], next: null, waves,
  metrics: [{ name: 'favourability', label: 'Favourability', kind: 'share' }, { name: 'satisfaction', label: 'Satisfaction', kind: 'mean' }],
})
const figures = (input: SurveyInput) => readTracker(input, 0.95)

describe('wave on wave', () => {
  // 56 % against 52 % of 1,000 each, and of effective bases of 640: the pooled z test, computed in R 4.2.2
  const at = (effectiveBase: number) => figures(survey(
    wave('1', '2026-01-01', '2026-01-10', share(0, 0.52, 1000, { effectiveBase })),
    wave('2', '2026-02-01', '2026-02-10', share(0, 0.56, 1000, { effectiveBase })),
  ))[0].waves[1].change!
  test('a change is in percentage points and tested on the effective base', () => {
    expect(at(1000).difference).toBeCloseTo(4, 12)
    expect(at(1000).p).toBeCloseTo(0.0727164422797564, 10)
    expect(at(640).p).toBeCloseTo(0.15109197486901, 10)
    expect(at(640).high - at(640).low).toBeGreaterThan(at(1000).high - at(1000).low)
    expect(at(1000)).toMatchObject({ from: '1', movement: 'not-established' })
  })
  test('p-values are adjusted over the metrics of the wave', () => {
    const [favourability, satisfaction] = figures(survey(
      wave('1', '2026-01-01', '2026-01-10', share(0, 0.50, 400), { ...share(1, 7, 400), sd: 2 }),
      wave('2', '2026-02-01', '2026-02-10', share(0, 0.58, 400), { ...share(1, 7.2, 400), sd: 2 }),
    ))
    const [small, large] = [favourability.waves[1].change!, satisfaction.waves[1].change!]
    expect(small.p).toBeLessThan(large.p)
    expect(small.adjusted_p).toBeCloseTo(2 * small.p, 12)
    expect(large.adjusted_p).toBeCloseTo(large.p, 12)
  })
  test('a change that its own interval supports is not established if it is one of several looked at', () => {
    const both = (satisfaction: readonly SurveyReading[]) => figures(survey(
      wave('1', '2026-01-01', '2026-01-10', share(0, 0.50, 400), ...satisfaction),
      wave('2', '2026-02-01', '2026-02-10', share(0, 0.572, 400), ...satisfaction),
    ))[0].waves[1].change!
    expect(both([])).toMatchObject({ movement: 'up' })
    expect(both([{ ...share(1, 7, 400), sd: 2 }])).toMatchObject({ movement: 'not-established' })
    expect(both([{ ...share(1, 7, 400), sd: 2 }]).low).toBeGreaterThan(0)
  })
  test('the wave compared with shares no day of fieldwork and has the metric', () => {
    const [favourability, satisfaction] = figures(survey(
      wave('1', '2026-01-01', '2026-01-10', share(0, 0.5, 400), { ...share(1, 7, 400), sd: 2 }),
      wave('2', '2026-01-08', '2026-01-17', share(0, 0.5, 400)),
      wave('3', '2026-01-15', '2026-01-24', share(0, 0.6, 400), { ...share(1, 7, 400), sd: 2 }),
    ))
    expect(favourability.waves.map(({ change }) => change?.from ?? null)).toEqual([null, null, '1'])
    expect(satisfaction.missing).toEqual(['2'])
    expect(satisfaction.waves.map(({ wave: name }) => name)).toEqual(['1', '3'])
  })
})

describe('small bases', () => {
  const shown = (base: number, effectiveBase = base) => figures(survey(
    wave('1', '2026-01-01', '2026-01-10', share(0, 0.5, 400)),
    wave('2', '2026-02-01', '2026-02-10', share(0, 0.7, base, { effectiveBase })),
  ))[0].waves[1]
  test.each([[29, 'hidden'], [30, 'flagged'], [74, 'flagged'], [75, 'shown']])('%i interviews: %s', (base, how) => {
    expect(shown(base).shown).toBe(how)
  })
  test('a hidden figure is nowhere in the findings, nor a change that would give it away', () => {
    expect(shown(29)).toMatchObject({ value: null, low: null, high: null, change: null, base: 29 })
  })
  test('the effective base decides', () => {
    expect(shown(400, 29).shown).toBe('hidden')
  })
  test('nor does the wave after it tell of it', () => {
    const [favourability] = figures(survey(
      wave('1', '2026-01-01', '2026-01-10', share(0, 0.5, 20)),
      wave('2', '2026-02-01', '2026-02-10', share(0, 0.7, 400)),
    ))
    expect(favourability.waves[1].change).toBeNull()
  })
})

test('segments follow everyone, their changes tested without adjustment', () => {
  const found = figures(survey(
    wave('1', '2026-01-01', '2026-01-10', share(0, 0.5, 400), share(0, 0.4, 100, { segment: 0 })),
    wave('2', '2026-02-01', '2026-02-10', share(0, 0.5, 400), share(0, 0.6, 100, { segment: 0 })),
  ))
  expect(found.map(({ metric, segment }) => [metric, segment])).toEqual([['favourability', null], ['favourability', 'islanders']])
  expect(found[1].waves[1].change).toMatchObject({ movement: 'up', adjusted_p: null })
})

test('thousands of waves of many metrics take a pass each', () => {
  const waves = Array.from({ length: 1500 }, (_, w) => {
    const day = new Date(Date.UTC(2000, 0, 1 + w)).toISOString().slice(0, 10)
    return wave(`${w}`, day, day, ...Array.from({ length: 30 }, (_unused, metric) => share(metric, 0.5 + (w * metric % 7) / 50, 400)))
  })
  const metrics = Array.from({ length: 30 }, (_, metric) => ({ name: `m${metric}`, label: `m${metric}`, kind: 'share' as const }))
  const began = performance.now()
  const found = figures({ ...survey(...waves), metrics })
  expect(found.map(({ waves: readings }) => readings.length)).toEqual(Array(30).fill(1500))
  // it took 20 s and more when every reading looked through all others
  expect(performance.now() - began).toBeLessThan(4000)
})
