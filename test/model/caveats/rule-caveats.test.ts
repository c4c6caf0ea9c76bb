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
import { houseWords } from '../../support/house-words.ts'
import { oneCompetitor, untoldCompetitors } from '../../support/sample-competitors.ts'
import { sampleRevisions } from '../../support/sample-past.ts'
import { sampleBenchmark, sampleCoder, sampleImportance, sampleStaying } from '../../support/sample-listening.ts'
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
  const { caveats, ...found } = await analyseHere(tables)
  // by chance alone one venue in twenty widens
  const findings = { ...found, speaking: { ...found.speaking, spread: found.speaking.spread.map((of) => ({ ...of, movement: 'not-established' as const })) } }
  expect(caveats.length).toBeGreaterThan(0)
  calm = { findings, reading: createReading(tables, tables, targetMix(tables), sampling, posterior, 0.9) }
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
const speaking = (change: (speaking: CaveatGrounds['findings']['speaking']) => Partial<CaveatGrounds['findings']['speaking']>): Change => withFindings((findings) => ({ speaking: { ...findings.speaking, ...change(findings.speaking) } }))
const coder = (change: Partial<CaveatGrounds['findings']['coder']>): Change => withFindings((findings) => ({ coder: { ...findings.coder, ...change } }))
const venuesNamed = [{ venue: 'boards', label: 'Boards' }, { venue: 'microblogs', label: 'Microblogs' }]
const ofSample = sampleStaying(venuesNamed)
/** A sample benchmark like the posts: no level is missing. */
const alike = { ...sampleBenchmark(), margins: sampleBenchmark().margins.map((margin) => ({ ...margin, dissimilarity: 0.04 })), unreachable: [] }
const benchmark = (dissimilarity: number | null, unreachable: readonly number[] = []): Change => withFindings(() => ({
  benchmark: { ...alike, margins: alike.margins.slice(0, 1).map((margin) => ({ ...margin, dissimilarity })), unreachable: unreachable.map((customers) => ({ margin: 'segment', level: 'freight', customers })) },
}))

/** One competitor, compared at the whole mix by a fit that converged. */
const calmCompetitors = oneCompetitor(3)
const competitors = (given: ReturnType<typeof oneCompetitor>): Change => withFindings(() => ({ competitors: given }))

/** Figures that were sealed and have moved within what was told; nothing came late. */
const calmRevisions: ReturnType<typeof sampleRevisions> = { ...sampleRevisions(), late: 0, gone: 0, breaks: [] }
const revisions = (change: Partial<typeof calmRevisions> = {}): Change => withFindings(() => ({ revisions: { ...calmRevisions, ...change } }))
const typical = (change: Partial<NonNullable<typeof calmRevisions.typical>>) => revisions({ typical: { ...calmRevisions.typical!, ...change } })
const redefinition = (before: string) => revisions({ breaks: [{ after: '2024-08', before, parts: ['venues', 'base'], bridged: true }] })

/** Other volumes of the periods. */
function opinionPeriods(of: (mentions: number, last: boolean) => number): Change {
  return withFindings(({ opinion: found }) => ({ opinion: { ...found, periods: found.periods.map((period, p) => ({ ...period, mentions: Math.round(of(period.mentions, p === found.periods.length - 1)) })) } }))
}

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
  ['no-previous-period', opinion({ previous: null })],
  ['survey-contradicts', survey(() => ({ verdict: 'contradicts' }))],
  ['survey-too-few', survey(() => ({ verdict: 'too-few-waves' }))],
  ['survey-not-established', survey(() => ({ verdict: 'not-established' }))],
  ['survey-departs', survey(({ waves, departures }) => ({ departures: departures.map((departure) => ({ ...departure, wave: waves.at(-1)!.wave })) }))],
  ['survey-waves-overlap', survey(() => ({ overlapping_waves: ['2026-03'] }))],
  ['survey-waves-later', survey(() => ({ later_waves: ['2026-11'] }))],
  ['survey-metric-missing', survey(({ metrics }) => ({ metrics: metrics.map((of, m) => (m === 0 ? { ...of, missing: ['2025-08'] } : of)) }))],
  ['survey-bases-small', survey(() => ({ metrics: leading.metrics }))],
  ['coverage-break', opinionPeriods((mentions, last) => (last ? 4 * mentions : mentions))],
  ['moderates-leaving', speaking(() => ({ staying: ofSample.staying }))],
  ['spread-widening', speaking(() => ({ spread: ofSample.spread }))],
  ['conversation-pull', speaking(() => ({ pull: ofSample.pull }))],
  ['benchmark-mismatch', benchmark(0.12)],
  ['audit-refused', coder({ status: 'refused', reason: 'too-few' })],
  ['coder-biased', withFindings(() => ({ coder: sampleCoder('applied', venuesNamed) }))],
  ['talk-unlike-importance', withFindings(() => ({ importance: sampleImportance([]) }))],
  ['prior-matters', withFindings(() => ({ sensitivity: { scales: [], shift: 0.4, reliable: true } }))],
  ['competitors-unread', competitors(untoldCompetitors('unread'))],
  ['competitors-in-some-sources', competitors({ ...calmCompetitors, told: 'some' })],
  ['competitor-absent', competitors(untoldCompetitors('absent'))],
  ['competitor-thin', competitors(untoldCompetitors('thin'))],
  ['competitor-other-mix', competitors(untoldCompetitors('apart'))],
  ['competitor-not-converged', competitors({ ...calmCompetitors, brands: calmCompetitors.brands.map((brand) => ({ ...brand, converged: false })) })],
  ['competitors-those-who-post', competitors(calmCompetitors)],
  ['revisions-large', typical({ change: 0.8, change_half_width: 1.5 })],
  ['definition-break', (grounds) => redefinition(grounds.findings.period.name)(grounds)],
  ['late-posts', revisions({ late: 12 })],
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

describe('pooled-average-misleads asks what chance does', () => {
  const parted = (gap: number, chanceSd: number): Change => withFindings((findings) => ({
    opinion: { ...findings.opinion, raw_change: findings.opinion.change!.mean + gap }, decomposition: { ...findings.decomposition!, chance_sd: chanceSd },
  }))
  const found = (change: Change) => codesOf(change(calm)).includes('pooled-average-misleads')
  test('a gap of seven points is told on much data, not where sampling alone moves the average by eight', () => {
    expect(found(parted(7.2, 0.9))).toBe(true)
    expect(found(parted(7.2, 7.7))).toBe(false)
    expect(found(parted(-7.2, 7.7))).toBe(false)
  })
  test('the bound is the interval’s: 1.645 standard errors at 90 %', () => {
    expect(found(parted(1.66 * 4, 4))).toBe(true)
    expect(found(parted(1.63 * 4, 4))).toBe(false)
  })
  test('nothing is told where the raw average lies inside opinion’s interval, or is withheld', () => {
    expect(found(parted(0, 0))).toBe(false)
    expect(found((grounds) => withFindings(() => ({ decomposition: null }))(parted(7.2, 0.9)(grounds)))).toBe(false)
  })
})

/** What stands in every review of posts that lacks an input, and when it must not. */
const standing: readonly (readonly [string, Change])[] = [
  ['no-sampling-error', withFindings(({ accounting }) => ({ accounting: { ...accounting, modelled: 0 } }))],
  ['level-conventional', withFindings(({ method }) => ({ method: { ...method, target_source: { venue: 'account', topic: 'account', poster: 'account' } } }))],
  ['coder-unaudited', coder({ status: 'refused', reason: 'ranges' })],
  ['survey-absent', survey(() => ({}))],
  ['benchmark-absent', benchmark(0.04)],
]

test.each(standing)('%s stands, save where it does not apply', (code, change) => {
  expect(codesOf(calm)).toContain(code)
  expect(codesOf(change(calm))).not.toContain(code)
})

test('every caveat that the catalogue words has an occasion here', async () => {
  const worded = (await houseWords()).keys.flatMap((key) => /^caveat-(.+)-evidence$/.exec(key)?.[1] ?? [])
  expect([...occasions, ...standing].map(([code]) => code).sort()).toEqual(worded.sort())
})

describe('thresholds', () => {
  const found = (change: Change, code: string) => ruleCaveats(change(calm)).filter((caveat) => caveat.code === code)
  test('a comparison is told to cover a part where that is less than nine tenths of the mix', () => {
    const covering = (covered: number) => found(competitors({ ...calmCompetitors, brands: calmCompetitors.brands.map((brand) => ({ ...brand, covered })) }), 'competitor-other-mix')
    expect(covering(0.89)).toMatchObject([{ figures: { brand: 'Tarrin Line', share: 0.89 } }])
    expect(covering(0.91)).toEqual([])
  })
  test('volume: both ways, in all and by venue, not for an ordinary month, and not on a short history', () => {
    expect(found(opinionPeriods((mentions, last) => (last ? mentions / 4 : mentions)), 'coverage-break').map(({ figures }) => figures.scope)).toEqual(['all'])
    expect(found(opinionPeriods((mentions, last) => (last ? 1.3 * mentions : mentions)), 'coverage-break')).toEqual([])
    const short: Change = (grounds) => withFindings(({ opinion: of }) => ({ opinion: { ...of, periods: of.periods.slice(-6) } }))(opinionPeriods((mentions, last) => (last ? 4 * mentions : mentions))(grounds))
    expect(found(short, 'coverage-break')).toEqual([])
    // the same jump in a history that jumps as much
    const restless = withFindings(({ opinion: of }) => ({ opinion: { ...of, periods: of.periods.map((period, p) => ({ ...period, mentions: period.mentions * (p === of.periods.length - 1 ? 4 : [1, 2, 4][p % 3]) })) } }))
    expect(found(restless, 'coverage-break')).toEqual([])
    const inVenue = speaking(({ mix }) => ({ mix: mix.map((row) => (row.factor === 'venue' && row.level === calm.findings.venues[1]!.venue && row.period === calm.findings.period.name ? { ...row, mentions: 9 * row.mentions } : row)) }))
    expect(found(inVenue, 'coverage-break').map(({ figures }) => [figures.scope, figures.venue])).toEqual([['venue', calm.findings.venues[1]!.label]])
  })
  test('the usual volume told is that of the history', () => {
    const [jump] = found(opinionPeriods((mentions, last) => (last ? 4 * mentions : mentions)), 'coverage-break')
    const inPeriod = calm.findings.opinion.periods.at(-1)!.mentions
    expect(Number(jump?.figures.usual) / inPeriod).toBeCloseTo(1, 1)
    expect(jump?.figures.mentions).toBe(4 * inPeriod)
  })
  test.each<[string, Change, string | undefined]>([
    ['a little unlike', benchmark(0.09), undefined], ['unlike', benchmark(0.1), 'caution'], ['very unlike', benchmark(0.25), 'serious'],
    ['alike, but many customers unheard', benchmark(0.05, [0.05]), 'serious'], ['alike, but few customers unheard', benchmark(0.04, [0.04]), undefined],
    ['not known, many unheard', benchmark(null, [0.2]), 'serious'], ['not known', benchmark(null), undefined],
  ])('customers: %s', (_name, change, severity) => {
    expect(found(change, 'benchmark-mismatch').map((caveat) => caveat.severity)).toEqual(severity === undefined ? [] : [severity])
  })
  test('an audit that is applied, but not in every venue, is told of those left as coded', () => {
    const venue = { venue: 'boards', label: 'Boards', codings: 22, agreement: 0.8, smallest_singular_value: 0.5, correction: null }
    expect(found(coder({ status: 'applied', venues: [{ ...venue, refused: 'too-few' }, { ...venue, refused: null }] }), 'audit-refused'))
      .toEqual([{ code: 'audit-refused', severity: 'note', figures: { scope: 'venue', venue: 'Boards', reason: 'too-few' } }])
    expect(found(coder({ status: 'absent', venues: [{ ...venue, refused: 'too-few' }] }), 'audit-refused')).toEqual([])
  })
  test('a coder off by less than a point, or not shown to be off, is not called biased', () => {
    const bias = (mean: number, movement: 'up' | 'down' | 'not-established') => found(coder({ status: 'applied', correction: { mean, low: mean - 1, high: mean + 1, sd: 0.6 }, movement }), 'coder-biased')
    expect(bias(1.2, 'up')).toHaveLength(1)
    expect(bias(-0.9, 'down')).toEqual([])
    expect(bias(1.2, 'not-established')).toEqual([])
  })
  test('a pull counts for all classes together, shown, and of some size', () => {
    const pulling = (change: Partial<CaveatGrounds['findings']['speaking']['pull'][number]>) => found(speaking(() => ({ pull: ofSample.pull.slice(0, 1).map((of) => ({ ...of, ...change })) })), 'conversation-pull')
    expect(pulling({}).map(({ figures }) => figures.lean)).toEqual(['towards'])
    expect(pulling({ slope: { mean: -0.2, low: -0.3, high: -0.1, sd: 0.06 }, movement: 'down' }).map(({ figures }) => figures.lean)).toEqual(['away'])
    expect(pulling({ poster: 'regular' })).toEqual([])
    expect(pulling({ movement: 'not-established' })).toEqual([])
    expect(pulling({ slope: { mean: 0.09, low: 0.05, high: 0.13, sd: 0.02 } })).toEqual([])
  })
  test('no ground: the middle stays as it did, spread narrows, talk is like importance, the prior can’t be judged', () => {
    const staying = ofSample.staying!
    expect(found(speaking(() => ({ staying: { ...staying, middle_gap_change: { ...staying.middle_gap_change!, movement: 'not-established' } } })), 'moderates-leaving')).toEqual([])
    expect(found(speaking(() => ({ staying: { ...staying, middle_gap_change: null } })), 'moderates-leaving')).toEqual([])
    expect(found(speaking(() => ({ spread: ofSample.spread.map((of) => ({ ...of, movement: 'down' as const })) })), 'spread-widening')).toEqual([])
    expect(found(withFindings(() => ({ importance: { ...sampleImportance([]), dissimilarity: 0.14 } })), 'talk-unlike-importance')).toEqual([])
    expect(found(withFindings(() => ({ sensitivity: { scales: [], shift: 0.9, reliable: false } })), 'prior-matters')).toEqual([])
  })
})

describe('what the archive shows', () => {
  const found = (change: Change) => ruleCaveats(change(calm)).filter(({ code }) => ['revisions-large', 'definition-break', 'late-posts'].includes(code))
  test('figures that moved within half of half their interval are no matter, nor are two past periods', () => {
    expect(found(revisions())).toEqual([])
    expect(found(typical({ level: 2.0, half_width: 4.1, change: 0.74, change_half_width: 1.5 }))).toEqual([])
    expect(found(typical({ periods: 2, level: 9 }))).toEqual([])
  })
  test('the change is looked at before the level', () => {
    expect(found(typical({ level: 3, half_width: 4 }))).toEqual([{ code: 'revisions-large', severity: 'caution', figures: { of: 'level', typical: 3, half: 4 } }])
    expect(found(typical({ level: 3, half_width: 4, change: 2, change_half_width: 1 })).map(({ figures }) => figures.of)).toEqual(['change'])
    expect(found(typical({ change: null, change_half_width: null, level: 3, half_width: 4 })).map(({ figures }) => figures.of)).toEqual(['level'])
  })
  test('each part of a new definition is told, once: in the review that begins with it', () => {
    expect(found(redefinition(calm.findings.period.name)).map(({ figures }) => [figures.part, figures.bridged])).toEqual([['venues', 'yes'], ['base', 'yes']])
    expect(found(redefinition('2024-09'))).toEqual([])
  })
  test('posts that are gone are told as well as late ones', () => {
    expect(found(revisions({ gone: 3 }))).toMatchObject([{ code: 'late-posts', severity: 'note', figures: { late: 0, gone: 3 } }])
  })
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
