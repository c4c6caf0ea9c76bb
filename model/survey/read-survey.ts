import type { Findings } from '../findings/schema.ts'
import type { AccountEvent, SurveyInput } from '../inputs/small-inputs.ts'
import type { Reading } from '../reading/context.ts'
import { movementOf } from '../reading/movement.ts'
import { createGenerator } from '../random/generator.ts'
import { forecastEstimate, limitsOf, type Limits } from './forecast-estimate.ts'
import { quantiles } from '../statistics/quantile.ts'
import { candidatesOf } from './candidates.ts'
import { correlateCandidate, lagsBetween } from './correlations.ts'
import { readDepartures } from './departures.ts'
import { evaluateForecasts, type ForecastWave } from './evaluate-forecasts.ts'
import { headlineWaves, type HeadlineWave } from './headline.ts'
import { lagWeightsOf } from './lag-models.ts'
import { surrogatesOf } from './persistence.ts'
import { forecastWaves, type Refit, type WaveForecast } from './rolling-forecast.ts'
import { readTracker } from './tracker.ts'
import { pairsNeeded, verdictOf } from './verdict.ts'

/*
 *   survey ──▶ tracker (its own figures)
 *     └─▶ headline waves ──▶ correlations per candidate and lag ──────────────┬─▶ verdict
 *           └─▶ forecasts, each from a refit of what was known before ──▶ scores ┘
 *                 └─▶ next wave, lag weights, departures
 */

type Survey = NonNullable<Findings['survey']>

/** The first of the streams of the seed that the surrogates use, one a candidate. */
const surrogateStream = 8_000_000

export interface SurveySpec {
  readonly interval: number
  readonly seed: number
}

/** What the survey says, whether opinion in the posts agrees with it, and whether it comes first (model.md 5). The survey is held out: no fit knows it. */
export async function readSurvey(reading: Reading, survey: SurveyInput, events: readonly AccountEvent[], refit: Refit, { interval, seed }: SurveySpec): Promise<Survey> {
  const { tables, fitted } = reading
  const waves = headlineWaves(survey)
  const lags = lagsBetween(survey.lags)
  const metrics = readTracker(survey, interval)
  const { name, label, kind } = survey.metrics[survey.headline]
  const limits = limitsOf(kind)
  const draw = surrogatesOf(waves.map(({ value }) => value), waves.map(({ standardError }) => standardError))
  const candidates = candidatesOf(reading).map((candidate, i) => correlateCandidate(candidate, waves, lags, draw, interval, createGenerator(seed, surrogateStream + i)))

  const forecasts = await forecastWaves(fitted, waves, [...waves, ...(survey.next === null ? [] : [survey.next])], lags, refit, seed)
  const scored = waves.flatMap((wave, w): ForecastWave[] => {
    const forecast = forecasts[w]
    return forecast === null ? [] : [{ wave, forecast }]
  })
  const forecast = evaluateForecasts(scored, interval, limits)
  const next = survey.next === null ? null : forecasts[waves.length]
  const [adjusted] = candidates
  return {
    metric: name, label, kind,
    waves: metrics.find(({ metric, segment }) => metric === name && segment === null)?.waves ?? [],
    metrics: [...metrics], segments: [...survey.segments],
    later_waves: [...survey.later], overlapping_waves: overlapping(waves),
    lags: { from: survey.lags[0], to: survey.lags[1] }, looks: candidates.reduce((sum, candidate) => sum + candidate.lags.length, 0),
    sampling_error: waves.length === 0 ? null : quantiles(waves.map(({ standardError }) => standardError), [0.5])[0],
    candidates,
    pairs: adjusted.best?.pairs ?? Math.max(0, ...adjusted.lags.map(({ pairs }) => pairs)), pairs_needed: pairsNeeded,
    forecast,
    lag_weights: lagWeightsOf((next ?? scored.at(-1)?.forecast)?.models ?? []),
    next_wave: next === null ? null : nextWave(survey.next, waves, next, interval, limits),
    ...readDepartures(scored, events, tables.timeline.stepDays, limits),
    verdict: verdictOf(adjusted, forecast),
  }
}

/** Names of the waves whose fieldwork begins before that of the wave before has ended. */
function overlapping(waves: readonly HeadlineWave[]): string[] {
  return waves.filter((wave, w) => w > 0 && wave.start <= waves[w - 1].end).map((wave) => wave.name)
}

function nextWave(window: SurveyInput['next'], waves: readonly HeadlineWave[], { components }: WaveForecast, interval: number, limits: Limits): Survey['next_wave'] {
  const last = waves.at(-1)
  if (window === null || last === undefined) return null
  const forecast = forecastEstimate(components, interval, limits)
  const difference = { mean: forecast.mean - last.value, low: forecast.low - last.value, high: forecast.high - last.value, sd: forecast.sd }
  return { field_start: window.start, field_end: window.end, dates: window.dates, forecast, last: last.value, difference, movement: movementOf(difference) }
}
