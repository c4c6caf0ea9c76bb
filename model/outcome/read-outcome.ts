import type { Estimate, Findings } from '../findings/schema.ts'
import type { OutcomeInput } from '../inputs/small-inputs.ts'
import type { Reading } from '../reading/context.ts'
import { holmAdjusted } from '../statistics/holm.ts'
import { neweyWest, neweyWestLags } from '../statistics/newey-west.ts'
import { mixtureQuantile } from '../statistics/mixture-forecast.ts'
import { quantiles } from '../statistics/quantile.ts'
import { studentCdf } from '../statistics/student-t.ts'
import { candidatesOf } from '../survey/candidates.ts'
import { partnerOf } from '../survey/windows.ts'

type Outcome = NonNullable<Findings['outcome']>

/** Spans with growth below which no regression is made. */
const leastObservations = 12
/** Spans longer than so many usual ones are not compared: some of their rows are missing. */
const longestSpan = 1.5
/** Residual variation below this part of growth's own is rounding: growth is then the market's, exactly. */
const exactFit = 1e-9
/** Lags looked at reach about this far back, in days. */
const farthestDays = 91
/** The effect is told for a rise of opinion by so many points. */
const rise = 10
const percent = 100

/**
 * The client's own series beside opinion: its growth, in percent, on the market's growth and on the movement of mix-adjusted opinion so many spans
 * before, by least squares with the errors of Newey and West (1987), scaled by n / (n - k) and set against Student's t. (With few observations
 * they are still too small: of 4,000 simulated series of 23 spans the 90 % interval held the truth in 84 %.) Movement, not level: growth has a mean to come back to and a level that
 * walks has none, so that the two would seem related by chance alone (Granger and Newbold 1974, J. Econometrics 2:111). Supporting evidence only.
 */
export function readOutcome(reading: Reading, { spans }: OutcomeInput, interval: number): Outcome {
  const { stepDays } = reading.tables.timeline
  const [adjusted] = candidatesOf(reading)
  const opinion = spans.map((span) => partnerOf(adjusted, span, 0))
  const spanDays = quantiles(spans.map(lengthOf), [0.5])[0]
  const market = spans.some((span) => span.market !== null) && !still(Float64Array.from(spans.flatMap((span) => span.market ?? [])))
  const lags = Array.from({ length: 1 + Math.min(Math.max(1, Math.round(farthestDays / Math.max(spanDays, stepDays))), 13) }, (_, lag) => lag)
  const fits = lags.flatMap((lag) => {
    const fit = regressGrowth(spans, opinion, market, spanDays, lag, interval)
    return fit === null ? [] : [fit]
  })
  const adjustedP = holmAdjusted(fits.map(({ p }) => p))
  const best = fits.reduce<(typeof fits)[number] | null>((most, fit) => (most === null || fit.p < most.p ? fit : most), null)
  return {
    observations: Math.max(0, ...fits.map(({ observations }) => observations)), first: spans[0].start, last: spans[spans.length - 1].end,
    market, looks: fits.length, span_days: spanDays, error_lags: best === null ? 0 : neweyWestLags(best.observations),
    lags: fits.map(({ lag, effect, p, observations }, i) => ({ lag, effect, p, adjusted_p: adjustedP[i], observations })),
    best_lag: best?.lag ?? null, market_effect: best?.marketEffect ?? null,
  }
}

function regressGrowth(spans: OutcomeInput['spans'], opinion: readonly (number | null)[], market: boolean, spanDays: number, lag: number, interval: number) {
  const rows = spans.flatMap((span, i) => {
    const [now, before] = [opinion[i - lag], opinion[i - lag - 1]]
    if (i - lag < 1 || now === null || before === null) return []
    const markets = [span.market, spans[i - 1].market]
    // a span whose market is not known can't be set against it; one far longer than usual holds several steps of growth
    if (market && markets.includes(null)) return []
    if (Math.max(lengthOf(span), lengthOf(spans[i - 1])) > longestSpan * spanDays) return []
    return [{ growth: growthOf(span.value, spans[i - 1].value), market: growthOf(markets[0] ?? 1, markets[1] ?? 1), moved: now - before }]
  })
  const moved = Float64Array.from(rows, (row) => row.moved)
  const grown = Float64Array.from(rows, (row) => row.market)
  if (rows.length < leastObservations || still(moved) || (market && still(grown))) return null
  const growth = Float64Array.from(rows, (row) => row.growth)
  if (still(growth)) return null
  const design = [new Float64Array(rows.length).fill(1), moved, ...(market ? [grown] : [])]
  const { coefficients, standardErrors: errors, freedom } = neweyWest(design, growth, neweyWestLags(rows.length), { smallSample: true })
  if (!(errors[1] > exactFit * Math.max(...growth.map(Math.abs)))) return null
  const reach = mixtureQuantile((1 + interval) / 2, [{ weight: 1, centre: 0, scale: 1, freedom }])
  return {
    lag, observations: rows.length, p: 2 * studentCdf(-Math.abs(coefficients[1] / errors[1]), freedom),
    effect: estimateOf(rise * coefficients[1], rise * errors[1], reach),
    marketEffect: market ? estimateOf(coefficients[2], errors[2], reach) : null,
  }
}

/** In days. */
function lengthOf({ days }: OutcomeInput['spans'][number]): number {
  return days.reduce((sum, count) => sum + count, 0)
}

function growthOf(now: number, before: number): number {
  return percent * (Math.log(now) - Math.log(before))
}

/** Whether values differ by no more than rounding. */
function still(values: Float64Array): boolean {
  const [least, most] = [Math.min(...values), Math.max(...values)]
  return most - least <= 1e-9 * Math.max(1, Math.abs(least), Math.abs(most))
}

function estimateOf(mean: number, sd: number, reach: number): Estimate {
  return { mean, low: mean - reach * sd, high: mean + reach * sd, sd }
}
