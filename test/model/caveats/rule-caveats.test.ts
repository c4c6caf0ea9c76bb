import { beforeAll, describe, expect, test } from 'vitest'
import { samplingVariance } from '../../../model/cells/sampling-variance.ts'
import { targetMix } from '../../../model/cells/target-mix.ts'
import type { CaveatGrounds } from '../../../model/caveats/rule.ts'
import { ruleCaveats } from '../../../model/caveats/rule-caveats.ts'
import { buildProblem } from '../../../model/fit/build-problem.ts'
import { localExecutor } from '../../../model/fit/executor.ts'
import { samplePosterior } from '../../../model/fit/posterior.ts'
import { createGenerator } from '../../../model/random/generator.ts'
import { createReading } from '../../../model/reading/context.ts'
import type { Accounting } from '../../../model/intake/intake-tables.ts'
import { analyseHere } from '../../support/analyse-reference.ts'
import { sampleSurvey, type Survey } from '../../support/sample-survey.ts'
import { simulateCells } from '../../support/simulate-cells.ts'

const simulated = simulateCells({
  steps: 40, venues: 3, topics: 2, posters: 2, mentionsPerStep: 300,
  sigmas: { mu: 0.01, venueDrift: [0.005, 0.005, 0.005], venue: 0.1, topic: 0.1, poster: 0.1, tau: 0.03 },
}, createGenerator(4, 0)).tables
// a period that is over
const tables = { ...simulated, timeline: { ...simulated.timeline, quietDays: 0 } }

let calm: CaveatGrounds
beforeAll(async () => {
  const sampling = samplingVariance(tables)
  const problem = buildProblem(tables, sampling.variance)
  const posterior = await samplePosterior(problem, localExecutor(problem), { seed: 1, proposals: 2000, draws: 1000 })
  const { caveats, ...findings } = await analyseHere(tables)
  expect(caveats.length).toBeGreaterThan(0)
  calm = { findings, reading: createReading(tables, tables, targetMix(tables), sampling, posterior, 0.9), givenNotUsed: [] }
})

const codesOf = (grounds: CaveatGrounds) => ruleCaveats(grounds).map(({ code }) => code)

/** A survey that gives no ground for a caveat. */
const leading = sampleSurvey('leads')
const calmSurvey: Survey = { ...leading, metrics: leading.metrics.filter(({ segment }) => segment === null) }

type Change = (grounds: CaveatGrounds) => CaveatGrounds

const withFindings = (change: (findings: CaveatGrounds['findings']) => Partial<CaveatGrounds['findings']>): Change => (grounds) => ({ ...grounds, findings: { ...grounds.findings, ...change(grounds.findings) } })
const withAccounting = (change: Partial<Accounting>): Change => (grounds) => ({
  ...grounds, reading: { ...grounds.reading, tables: { ...grounds.reading.tables, accounting: { ...grounds.reading.tables.accounting, ...change } } },
})
const firstVenue = (change: Partial<CaveatGrounds['findings']['venues'][number]>): Change => withFindings(({ venues }) => ({ venues: venues.map((venue, v) => (v === 0 ? { ...venue, ...change } : venue)) }))
const survey = (change: (survey: Survey) => Partial<Survey>): Change => withFindings(() => ({ survey: { ...calmSurvey, ...change(calmSurvey) } }))
const opinion = (change: Partial<CaveatGrounds['findings']['opinion']>): Change => withFindings((findings) => ({ opinion: { ...findings.opinion, ...change } }))
const steps = tables.timeline.steps

const occasions: readonly (readonly [string, Change])[] = [
  ['fit-not-converged', withFindings(({ diagnostics }) => ({ diagnostics: { ...diagnostics, converged: false, passed: false } }))],
  ['model-misfit', withFindings(({ diagnostics }) => ({ diagnostics: { ...diagnostics, passed: false, checks: diagnostics.checks.map((check, i) => ({ ...check, passed: i > 0 })) } }))],
  ['pooled-average-misleads', opinion({ raw_change: -9 })],
  ['concentration', withFindings(({ speaking }) => ({ speaking: { ...speaking, concentration: { ...speaking.concentration, period: { ...speaking.concentration.period!, top_share: 0.4 } } } }))],
  ['mix-moved', firstVenue({ share: 0.5, share_previous: 0.3 })],
  ['sharp-move', withFindings((findings) => ({ opinion: { ...findings.opinion, series: findings.opinion.series.map((step, t) => (t === steps.length - 1 ? { ...step, adjusted: { ...step.adjusted, mean: step.adjusted.mean + 40 } } : step)) } }))],
  ['authors-unknown', withAccounting({ withAuthor: new Float64Array(3) })],
  ['authors-partly-unknown', (grounds) => firstVenue({ authors_known: 0.1 })(withAccounting({ withAuthor: Float64Array.from(tables.accounting.withAuthor, (n, v) => (v === 0 ? n / 10 : n)) })(grounds))],
  ['ready-made-authors', withAccounting({ readyMade: true })],
  ['one-venue', withFindings(({ venues }) => ({ venues: venues.slice(0, 1) }))],
  ['venue-vanished', firstVenue({ last_step: steps[10] })],
  ['venue-appeared', firstVenue({ first_step: steps[steps.length - 3] })],
  ['uneven-history', firstVenue({ first_step: steps[10] })],
  ['uneven-volume', withFindings((findings) => ({ opinion: { ...findings.opinion, periods: findings.opinion.periods.map((period, p) => (p === 3 ? { ...period, mentions: 12_000 } : period)) } }))],
  ['venue-thin', firstVenue({ authors: 12 })],
  ['thin-data', opinion({ mentions: 40 })],
  ['empty-steps', withFindings((findings) => ({ opinion: { ...findings.opinion, series: findings.opinion.series.map((step, t) => (t === 5 ? { ...step, mentions: 0 } : step)) } }))],
  ['level-unseen-in-base', (grounds) => ({ ...grounds, reading: { ...grounds.reading, mix: { ...grounds.reading.mix, shares: grounds.reading.mix.shares.map((shares) => shares.map((share, i) => (i === 0 ? 0 : share))) } } })],
  ['values-unmapped', withAccounting({ unmapped: [{ factor: 'topic', value: 'other', mentions: 3 }] })],
  ['period-unfinished', (grounds) => ({ ...grounds, reading: { ...grounds.reading, tables: { ...grounds.reading.tables, timeline: { ...grounds.reading.tables.timeline, quietDays: 20 } } } })],
  ['many-rejected', withFindings(({ accounting }) => ({ accounting: { ...accounting, rejected: accounting.received / 10 } }))],
  ['clock-times', withAccounting({ reasons: { 'time-doubled': 2 } })],
  ['given-not-used', (grounds) => ({ ...grounds, givenNotUsed: ['events'] })],
  ['no-previous-period', opinion({ previous: null })],
  ['survey-contradicts', survey(() => ({ verdict: 'contradicts' }))],
  ['survey-too-few', survey(() => ({ verdict: 'too-few-waves' }))],
  ['survey-not-established', survey(() => ({ verdict: 'not-established' }))],
  ['survey-departs', survey(({ waves, departures }) => ({ departures: departures.map((departure) => ({ ...departure, wave: waves.at(-1)!.wave })) }))],
  ['survey-waves-overlap', survey(() => ({ overlapping_waves: ['2026-03'] }))],
  ['survey-waves-later', survey(() => ({ later_waves: ['2026-11'] }))],
  ['survey-metric-missing', survey(({ metrics }) => ({ metrics: metrics.map((of, m) => (m === 0 ? { ...of, missing: ['2025-08'] } : of)) }))],
  ['survey-bases-small', survey(() => ({ metrics: leading.metrics }))],
  ['opinion-drift-entangled', (grounds) => {
    const { columns } = grounds.reading
    // drifts that mirror opinion draw by draw: the posts can't tell one from the other
    return { ...grounds, reading: { ...grounds.reading, columns: { ...columns, drift: columns.drift.map(() => columns.mu.map((mu) => mu.map((x) => -x))) } } }
  }],
]

describe('every rule has an occasion, and keeps silent without it', () => {
  test.each(occasions)('%s', (code, change) => {
    expect(codesOf(calm)).not.toContain(code)
    expect(codesOf(change(calm))).toContain(code)
  })
})

test.each(['no-sampling-error', 'level-conventional', 'coder-unaudited', 'survey-absent', 'benchmark-absent'])('%s stands in every review that lacks the input', (code) => {
  expect(codesOf(calm)).toContain(code)
})

describe('the survey', () => {
  const ofSurvey = (change: (survey: Survey) => Partial<Survey>) => ruleCaveats(survey(change)(calm)).filter(({ code }) => code.startsWith('survey'))
  test('one that leaves nothing to say has no caveat of its own; without one, its absence is told', () => {
    expect(ofSurvey(() => ({}))).toEqual([])
    expect(codesOf(calm).filter((code) => code.startsWith('survey'))).toEqual(['survey-absent'])
  })
  test('only a contradiction is serious', () => {
    expect(ofSurvey(() => sampleSurvey('contradicts')).map(({ code, severity }) => [code, severity])).toEqual([['survey-contradicts', 'serious'], ['survey-bases-small', 'note']])
    expect(ofSurvey(() => sampleSurvey('too-few-waves'))).toContainEqual({ code: 'survey-too-few', severity: 'caution', figures: { pairs: 3, needed: 8 } })
  })
  test('a departure before the latest wave is not the latest', () => {
    expect(calmSurvey.departures).toHaveLength(1)
    expect(ofSurvey(() => ({})).map(({ code }) => code)).not.toContain('survey-departs')
  })
  test('a base counts once, however many metrics rest on it', () => {
    const bases = ofSurvey(() => ({ metrics: leading.metrics }))[0]
    const visitors = leading.metrics.find(({ segment }) => segment === 'visitor')!
    const islanders = leading.metrics.find(({ segment }) => segment === 'islander')!
    expect(islanders.waves.every(({ shown }) => shown === 'shown')).toBe(true)
    expect(bases?.figures).toEqual({ hidden: 1, flagged: visitors.waves.filter(({ shown }) => shown === 'flagged').length })
  })
  test('many waves are counted, the first few named', () => {
    const [later] = ofSurvey(() => ({ later_waves: ['a', 'b', 'c', 'd', 'e', 'f', 'g'] }))
    expect(later?.figures).toEqual({ waves: 7, names: 'a, b, c, d, e, …' })
  })
})

test('serious caveats come first', () => {
  const severities = ruleCaveats(occasions.reduce((grounds, [, change]) => change(grounds), calm)).map(({ severity }) => severity)
  expect(severities).toEqual([...severities].sort((a, b) => ['serious', 'caution', 'note'].indexOf(a) - ['serious', 'caution', 'note'].indexOf(b)))
  expect(severities[0]).toBe('serious')
})
