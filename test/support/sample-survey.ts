import type { Findings } from '../../model/findings/schema.ts'
import { around, average, opinionAt, ripple } from './sample-series.ts'

export type Survey = NonNullable<Findings['survey']>
export type Verdict = Survey['verdict']
type SurveyMetric = Survey['metrics'][number]
type Reading = SurveyMetric['waves'][number]
type Lag = Survey['candidates'][number]['lags'][number]

/** Invented waves of a monthly survey, May 2024 to October 2026, fieldwork from the 10th to the 21st. */
const waveCount = 30
const leadOfPosts = 4
const day = (month: number, date: number) => new Date(Date.UTC(2024, 4 + month, date)).toISOString().slice(0, 10)
const nameOf = (wave: number) => day(wave, 1).slice(0, 7)
const fieldwork = (wave: number) => ({ field_start: day(wave, 10), field_end: day(wave, 21) })
const allWaves = Array.from({ length: waveCount }, (_, wave) => wave)

/** Step that holds the middle of a wave's fieldwork. */
const stepOf = (wave: number) => Math.floor((Date.UTC(2024, 4 + wave, 15) - Date.UTC(2024, 4, 6)) / (7 * 864e5))
const spread = (wave: number, salt: number) => ripple(wave + 1, salt)
const apart = 14
/** It follows opinion, save in one wave. */
const favourabilityAt = (wave: number) => 43 + 1.5 * (opinionAt(Math.max(0, stepOf(wave) - leadOfPosts)) - 21) + 2.4 * spread(wave, 2) - (wave === apart ? 5 : 0)

interface Given { readonly metric: string, readonly label: string, readonly kind: 'share' | 'mean', readonly at: (wave: number) => number, readonly missing: readonly number[] }

const metricsGiven: readonly Given[] = [
  { metric: 'favourability', label: 'Favourability', kind: 'share', at: favourabilityAt, missing: [] },
  { metric: 'consideration', label: 'Consideration', kind: 'share', at: (wave) => 31 + 0.5 * (favourabilityAt(wave) - 43) + 1.8 * spread(wave, 3), missing: [] },
  { metric: 'recommendation', label: 'Recommendation', kind: 'share', at: (wave) => 27 + 0.4 * (favourabilityAt(wave) - 43) + 1.7 * spread(wave, 4), missing: [15] },
  { metric: 'satisfaction', label: 'Satisfaction', kind: 'mean', at: (wave) => 6.8 + 0.03 * (favourabilityAt(wave) - 43) + 0.12 * spread(wave, 5), missing: [] },
]
const segmentsGiven = [
  { segment: 'islander', part: 0.42, shift: 3 },
  { segment: 'visitor', part: 0.18, shift: -4 },
]

const baseAt = (wave: number) => Math.round(400 + 18 * spread(wave, 9))
const shownBy = (base: number) => (base < 30 ? 'hidden' as const : base < 75 ? 'flagged' as const : 'shown' as const)

function errorOf(kind: Given['kind'], value: number, effectiveBase: number): number {
  return kind === 'share' ? Math.sqrt(value * (100 - value) / effectiveBase) : 2 / Math.sqrt(effectiveBase)
}

/** A metric's figures wave by wave: those of everyone, or of a segment. */
function metricOf(given: Given, of: (typeof segmentsGiven)[number] | null): SurveyMetric {
  const asked = allWaves.filter((wave) => !given.missing.includes(wave))
  const readings = asked.map((wave): Reading => {
    // one wave reached few visitors
    const base = of === null ? baseAt(wave) : wave === 9 && of.segment === 'visitor' ? 24 : Math.round(baseAt(wave) * of.part)
    const effective = base * 0.85
    const value = given.at(wave) + (of === null ? 0 : of.shift * (given.kind === 'mean' ? 0.06 : 1) + (given.kind === 'mean' ? 0.1 : 2) * spread(wave, 12))
    const half = 1.645 * errorOf(given.kind, value, effective)
    const shown = shownBy(Math.min(base, effective))
    return { wave: nameOf(wave), ...fieldwork(wave), base, effective_base: effective, shown, change: null, ...(shown === 'hidden' ? { value: null, low: null, high: null } : { value, low: value - half, high: value + half }) }
  })
  return {
    metric: given.metric, label: given.label, kind: given.kind, segment: of?.segment ?? null, missing: given.missing.map(nameOf),
    waves: readings.map((reading, at) => ({ ...reading, change: at === 0 ? null : changeOf(readings[at - 1]!, reading, of === null) })),
  }
}

function changeOf(before: Reading, now: Reading, adjusted: boolean): Reading['change'] {
  if (now.value === null || before.value === null) return null
  const difference = now.value - before.value
  const half = Math.hypot(now.high! - now.value, before.high! - before.value)
  const z = 1.645 * difference / half
  const p = Math.min(1, Math.exp(-0.717 * Math.abs(z) - 0.416 * z * z))
  const adjustedP = Math.min(1, 3 * p)
  return {
    from: before.wave, difference, low: difference - half, high: difference + half, p, adjusted_p: adjusted ? adjustedP : null,
    movement: (adjusted ? adjustedP : p) > 0.1 ? 'not-established' : difference > 0 ? 'up' : 'down',
  }
}

/** A bell of correlations over the lags, as a series that leads by `peak` steps gives one. */
function lagsOf(height: number, peak: number, effective: number): Lag[] {
  return Array.from({ length: 25 }, (_, index) => index - 8).map((lag) => {
    const r = height * Math.exp(-(((lag - peak) / 9) ** 2))
    const half = 1.645 / Math.sqrt(effective - 3)
    return {
      lag, r, low: Math.tanh(Math.atanh(r) - half), high: Math.tanh(Math.atanh(r) + half), pairs: lag > 12 ? waveCount - 1 : waveCount, effective_pairs: effective + 0.05 * lag,
      corrected: Math.abs(r) > 0.9 ? null : r * 1.1,
    }
  })
}

function candidateOf(series: Survey['candidates'][number]['series'], venue: string | null, label: string, height: number, peak: number, adjustedP: number): Survey['candidates'][number] {
  const lags = lagsOf(height, peak, 17.2)
  return { series, venue, label, lags, best_lag: peak, best: lags.find(({ lag }) => lag === peak)!, adjusted_p: adjustedP }
}

function candidates(height: number, adjustedP: number): Survey['candidates'] {
  return [
    candidateOf('adjusted', null, 'adjusted', height, leadOfPosts, adjustedP),
    candidateOf('raw', null, 'raw', 0.22, -6, 0.81),
    candidateOf('venue', 'boards', 'Discussion boards', -0.31, 9, 0.48),
    candidateOf('venue', 'microblogs', 'Microblogs', 0.58, 5, 0.04),
    candidateOf('venue', 'blogs', 'Blogs', 0.4, 3, 0.21),
    candidateOf('venue', 'reviews', 'Review sites', 0.66, 4, 0.012),
    candidateOf('venue', 'video', 'Video comments', 0.29, 2, 0.52),
  ]
}

const rootMeanSquare = (values: readonly number[]) => Math.sqrt(average(values.map((value) => value * value)))

const leadingBlur = 1.9

/** Forecasts from the ninth wave on; `blur` moves them off what was observed. */
function forecast(blur: number): NonNullable<Survey['forecast']> {
  const half = 1.645 * 1.9
  const waves = allWaves.slice(8).map((wave) => {
    const observed = favourabilityAt(wave)
    const mean = observed + blur * spread(wave, 7) + (wave === apart ? 4.5 : 0)
    return {
      wave: nameOf(wave), ...fieldwork(wave), forecast: around(mean, half), observed, carried: favourabilityAt(wave - 1),
      past_mean: average(allWaves.slice(0, wave).map(favourabilityAt)), inside: Math.abs(observed - mean) < half,
    }
  })
  const rmse = rootMeanSquare(waves.map((wave) => wave.forecast.mean - wave.observed))
  const score = (error: number, coverage: number) => ({ rmse: error, crps: 0.57 * error, coverage })
  const rivalOf = (rival: NonNullable<Survey['forecast']>['rivals'][number]['rival'], error: number, dmP: number) => ({ rival, ...score(error, 0.86), rmse_ratio: rmse / error, crps_ratio: rmse / error + 0.02, dm_p: dmP })
  const carried = rivalOf('carry-forward', rootMeanSquare(waves.map((wave) => wave.carried - wave.observed)), 0.041)
  const mean = rivalOf('past-mean', rootMeanSquare(waves.map((wave) => wave.past_mean - wave.observed)), 0.018)
  const alone = rivalOf('waves-alone', 0.8 * mean.rmse, 0.12)
  return { ...score(rmse, waves.filter(({ inside }) => inside).length / waves.length), origins: waves.length, rmse_ratio: carried.rmse_ratio, dm_p: carried.dm_p, rivals: [carried, mean, alone], waves }
}

function lagWeights(): Survey['lag_weights'] {
  const bell = Array.from({ length: 16 }, (_, at) => ({ lag: at + 1, weight: Math.exp(-(((at + 1 - leadOfPosts) / 2) ** 2)) }))
  const total = bell.reduce((sum, { weight }) => sum + weight, 0)
  return bell.map(({ lag, weight }) => ({ lag, weight: weight / total }))
}

/** The survey of the sample: one that follows opinion by four weeks. */
function leadingSurvey(): Survey {
  const everyone = metricsGiven.map((given) => metricOf(given, null))
  const last = favourabilityAt(waveCount - 1)
  return {
    metric: 'favourability', label: 'Favourability', kind: 'share',
    waves: everyone[0]!.waves, metrics: [...everyone, ...segmentsGiven.flatMap((of) => metricsGiven.map((given) => metricOf(given, of)))],
    segments: segmentsGiven.map(({ segment }) => segment), later_waves: [], overlapping_waves: [],
    lags: { from: -8, to: 16 }, looks: 7 * 25, sampling_error: 2.68,
    candidates: candidates(0.84, 0.003), pairs: waveCount, pairs_needed: 8, forecast: forecast(leadingBlur), lag_weights: lagWeights(),
    next_wave: { ...fieldwork(waveCount), dates: 'usual-spacing', forecast: around(last + 2.4, 4.1), last, difference: around(2.4, 4.1), movement: 'not-established' },
    departures: [{
      wave: nameOf(apart), ...fieldwork(apart), observed: favourabilityAt(apart), forecast: forecast(leadingBlur).waves.find(({ wave }) => wave === nameOf(apart))!.forecast, direction: 'below',
      events: [{ date: '2025-06-09', label: 'Timetable cut by a fifth', kind: 'service' }],
    }],
    departures_expected: 1.1, verdict: 'leads',
  }
}

const variants: Readonly<Record<Verdict, (survey: Survey) => Survey>> = {
  leads: (survey) => survey,
  tracks: (survey) => ({ ...survey, verdict: 'tracks', candidates: candidates(0.55, 0.07), forecast: forecast(6) }),
  contradicts: (survey) => ({ ...survey, verdict: 'contradicts', candidates: candidates(-0.62, 0.02), forecast: forecast(8) }),
  'not-established': (survey) => ({ ...survey, verdict: 'not-established', candidates: candidates(0.31, 0.44), forecast: forecast(8) }),
  'too-few-waves': (survey) => shortened(survey, 3),
}

/** The last so many waves, too few to say anything of how they go with the posts. */
function shortened(survey: Survey, waves: number): Survey {
  const metrics = survey.metrics.map((of) => ({ ...of, missing: [], waves: of.waves.slice(-waves).map((reading, at) => (at === 0 ? { ...reading, change: null } : reading)) }))
  return {
    ...survey, verdict: 'too-few-waves', metrics, waves: metrics[0]!.waves, pairs: waves, forecast: null, lag_weights: [], next_wave: null, departures: [], departures_expected: 0,
    candidates: survey.candidates.map((of) => ({ ...of, best_lag: null, best: null, adjusted_p: null, lags: of.lags.map((lag) => ({ ...lag, low: null, high: null, pairs: waves, effective_pairs: waves, corrected: null })) })),
  }
}

/** The sample's survey with each verdict. */
export function sampleSurvey(verdict: Verdict = 'leads'): Survey {
  return variants[verdict](leadingSurvey())
}

/** What the account says happened. */
export function sampleEvents(): NonNullable<Findings['events']> {
  return [
    { date: '2025-06-09', label: 'Timetable cut by a fifth', kind: 'service' },
    { date: '2026-03-02', label: 'New ship in service', kind: 'service' },
    { date: '2026-10-05', label: 'Storm week', kind: '' },
  ]
}

/** Passengers a month beside the regional market. */
export function sampleOutcome(): NonNullable<Findings['outcome']> {
  const lags = [0.9, 2.1, 1.2, 0.3].map((mean, lag) => ({ lag, effect: around(mean, 1.4), p: [0.28, 0.016, 0.15, 0.72][lag]!, adjusted_p: [0.71, 0.06, 0.45, 0.99][lag]!, observations: 28 - lag }))
  return { observations: 28, first: '2024-05-01', last: '2026-09-30', market: true, looks: 4, span_days: 30, error_lags: 3, lags, best_lag: 1, market_effect: around(0.82, 0.21) }
}
