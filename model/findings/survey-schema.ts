import { z } from 'zod'
import { count, days, effectiveCount, isoDate, metricEstimate, metricValue, movement, percentEstimate, plain, pValue, share, steps } from './parts-schema.ts'

/**
 * The survey in the findings. A share is in percent and the sampling error of a share in percentage points; a mean is in the
 * metric's own units. Correlations are plain numbers; lags are steps of the grid, above 0 where the posts come first.
 */

/** Common practice, no source: a base under 30 is not shown, one under 75 is flagged. */
const baseShown = z.enum(['shown', 'flagged', 'hidden'])

const waveChange = z.strictObject({
  /** The wave compared with: the last one before whose fieldwork does not overlap and which has the metric. */
  from: z.string(),
  difference: metricValue, low: metricValue, high: metricValue,
  /** Two-sided, on effective bases; for everyone adjusted over the metrics of the wave (Holm 1979), null for a segment. */
  p: pValue, adjusted_p: pValue.nullable(),
  /** For everyone by the adjusted p, against 1 less the account's interval; for a segment by the interval. */
  movement,
})

const reading = z.strictObject({
  wave: z.string(), field_start: isoDate, field_end: isoDate,
  base: count, effective_base: effectiveCount, shown: baseShown,
  /** null where the base is too small to show, or where the metric was not asked. */
  value: metricValue.nullable(), low: metricValue.nullable(), high: metricValue.nullable(),
  change: waveChange.nullable(),
})

const metric = z.strictObject({
  metric: z.string(), label: z.string(), kind: z.enum(['share', 'mean']),
  /** null for everyone. */
  segment: z.string().nullable(),
  /** Waves that lack it. */
  missing: z.array(z.string()),
  waves: z.array(reading),
})

const lagFinding = z.strictObject({
  lag: steps,
  /** null where fewer than three waves have a partner, or one of the two does not vary. */
  r: plain.nullable(), low: plain.nullable(), high: plain.nullable(),
  pairs: count, effective_pairs: effectiveCount.nullable(),
  /** r had the waves no sampling error (Spearman 1904); null where that can't be told. */
  corrected: plain.nullable(),
})

const candidate = z.strictObject({
  /** `adjusted`, `raw` or `venue`. */
  series: z.enum(['adjusted', 'raw', 'venue']),
  venue: z.string().nullable(), label: z.string(),
  lags: z.array(lagFinding),
  /** The lag of the largest |r|, of those with enough pairs; null where none has. */
  best_lag: steps.nullable(),
  best: lagFinding.nullable(),
  /** Of the best lag, for having looked at all of them: by the largest |r| over surrogates of the survey. */
  adjusted_p: pValue.nullable(),
})

const forecastScore = z.strictObject({
  rmse: metricValue.min(0), crps: metricValue.min(0),
  /** Share of waves inside the central interval. */
  coverage: share,
})

const rival = forecastScore.extend({
  /** `waves-alone`: the model of the forecast without opinion, so that what the posts add is seen by itself. */
  rival: z.enum(['carry-forward', 'past-mean', 'waves-alone']),
  /** Of the forecast from the posts over the rival's: below 1 the posts do better. */
  rmse_ratio: plain.min(0).nullable(), crps_ratio: plain.min(0).nullable(),
  /** Two-sided (Diebold and Mariano 1995, corrected by Harvey, Leybourne and Newbold 1997); null where losses do not vary. */
  dm_p: pValue.nullable(),
})

const forecastWave = z.strictObject({
  wave: z.string(), field_start: isoDate, field_end: isoDate,
  forecast: metricEstimate, observed: metricValue,
  carried: metricValue, past_mean: metricValue,
  inside: z.boolean(),
})

const forecast = forecastScore.extend({
  /** Waves forecast: those with eight waves known before them and posts, of more than 150 the last 150. */
  origins: count,
  /** Against the last wave carried forward. */
  rmse_ratio: plain.min(0).nullable(), dm_p: pValue.nullable(),
  rivals: z.array(rival),
  waves: z.array(forecastWave),
})

const verdicts = ['too-few-waves', 'contradicts', 'leads', 'tracks', 'not-established'] as const

export const survey = z.strictObject({
  /** The metric compared with opinion. */
  metric: z.string(), label: z.string(), kind: z.enum(['share', 'mean']),
  /** Waves that have it for everyone, shown or not, oldest first. */
  waves: z.array(reading),
  /** Every metric for everyone, then every metric of every segment. */
  metrics: z.array(metric),
  segments: z.array(z.string()),
  /** Waves left out: their fieldwork ended after the period under review. */
  later_waves: z.array(z.string()),
  /** Waves whose fieldwork overlaps that of the wave before. */
  overlapping_waves: z.array(z.string()),
  lags: z.strictObject({ from: steps, to: steps }),
  /** Correlations looked at: candidates times lags. */
  looks: count,
  /** Median over waves of the standard error of the value, in its own unit. */
  sampling_error: metricValue.min(0).nullable(),
  candidates: z.array(candidate),
  pairs: count, pairs_needed: count,
  forecast: forecast.nullable(),
  /** Posterior weights of the lags in the forecast of the next wave (of the last one where there is none), 1 standing for the last step before the fieldwork; they sum to 1. */
  lag_weights: z.array(z.strictObject({ lag: steps.min(1), weight: share })),
  next_wave: z.strictObject({
    field_start: isoDate, field_end: isoDate, dates: z.enum(['given', 'usual-spacing']),
    forecast: metricEstimate,
    /** The last wave, and how much the forecast lies above it. */
    last: metricValue, difference: metricEstimate, movement,
  }).nullable(),
  /** Waves outside the 95 % interval of their forecast, with the events that began in the three months before their fieldwork ended. */
  departures: z.array(z.strictObject({
    wave: z.string(), field_start: isoDate, field_end: isoDate, observed: metricValue, forecast: metricEstimate,
    direction: z.enum(['above', 'below']),
    events: z.array(z.strictObject({ date: isoDate, label: z.string(), kind: z.string() })),
  })),
  /** Departures that chance alone would bring. */
  departures_expected: z.number().min(0),
  verdict: z.enum(verdicts),
})

export const outcome = z.strictObject({
  observations: count, first: isoDate, last: isoDate,
  /** Whether growth was set against a market's. */
  market: z.boolean(),
  /** Lags looked at, in spans of the outcome. */
  looks: count,
  /** Length of a span in days: the median. */
  span_days: days,
  /** Lags of the errors' autocorrelation allowed for (Newey and West 1987). */
  error_lags: count,
  lags: z.array(z.strictObject({
    lag: z.number().int().min(0),
    /** Growth, in percent, that goes with a rise of opinion by 10 points. */
    effect: percentEstimate, p: pValue, adjusted_p: pValue, observations: count,
  })),
  best_lag: z.number().int().min(0).nullable(),
  /** Growth, in percent, that goes with market growth of 1 percent, at the best lag. */
  market_effect: percentEstimate.nullable(),
})

export const event = z.strictObject({ date: isoDate, label: z.string(), kind: z.string() })
