import type { Estimate, Findings } from '../findings/schema.ts'
import { dieboldMariano } from '../statistics/diebold-mariano.ts'
import type { MixtureComponent } from '../statistics/mixture-forecast.ts'
import { mixtureCrps } from '../statistics/mixture-crps.ts'
import { forecastEstimate, type Limits } from './forecast-estimate.ts'
import type { HeadlineWave } from './headline.ts'
import type { WaveForecast } from './rolling-forecast.ts'

type Forecast = NonNullable<NonNullable<Findings['survey']>['forecast']>

/** A wave that has reported, and its forecast from before. */
export interface ForecastWave {
  readonly wave: HeadlineWave
  readonly forecast: WaveForecast
}

/** The forecasts of one method for all waves. */
interface Method {
  readonly forecasts: readonly (readonly MixtureComponent[])[]
  readonly estimates: readonly Estimate[]
}

/**
 * How the forecasts did against what the waves said, and against rivals that read no post: the last wave carried forward, the mean of
 * past waves, and the same model of the waves without opinion. Scores are in the metric's unit.
 *
 * @param interval - probability inside the intervals whose coverage is told
 * @returns null where no wave could be forecast
 */
export function evaluateForecasts(waves: readonly ForecastWave[], interval: number, limits: Limits): Forecast | null {
  if (waves.length === 0) return null
  const observed = waves.map(({ wave }) => wave.value)
  const posts = methodOf(waves.map(({ forecast }) => forecast.components), interval, limits)
  const carried = methodOf(waves.map(({ forecast }) => [carryForward(valuesOf(forecast.known))]), interval, limits)
  const alone = methodOf(waves.map(({ forecast }) => forecast.wavesAlone), interval, limits)
  const past = methodOf(waves.map(({ forecast }) => [pastMean(valuesOf(forecast.known))]), interval, limits)
  const own = scoreOf(posts, observed)
  const errors = errorsOf(posts, observed)
  // a forecast made while earlier waves are not known looks further than one ahead, and its errors go with theirs
  const horizon = Math.max(1, Math.min(waves.length - 1, 1 + Math.max(...waves.map(({ forecast }) => forecast.pending))))
  const rivalOf = (rival: Forecast['rivals'][number]['rival'], method: Method): Forecast['rivals'][number] => {
    const score = scoreOf(method, observed)
    return {
      rival, ...score, rmse_ratio: ratio(own.rmse, score.rmse), crps_ratio: ratio(own.crps, score.crps),
      dm_p: waves.length < 2 ? null : dieboldMariano(errors, errorsOf(method, observed), horizon).p.value,
    }
  }
  const rivals = [rivalOf('carry-forward', carried), rivalOf('past-mean', past), rivalOf('waves-alone', alone)]
  return {
    origins: waves.length, ...own, rmse_ratio: rivals[0].rmse_ratio, dm_p: rivals[0].dm_p, rivals,
    waves: waves.map(({ wave }, i) => {
      const estimate = posts.estimates[i]
      return {
        wave: wave.name, field_start: wave.start, field_end: wave.end, forecast: estimate, observed: wave.value,
        carried: carried.estimates[i].mean, past_mean: past.estimates[i].mean, inside: wave.value >= estimate.low && wave.value <= estimate.high,
      }
    }),
  }
}

function valuesOf(waves: readonly HeadlineWave[]): readonly number[] {
  return waves.map(({ value }) => value)
}

/** The next wave is the last one, give or take what waves have moved: Student's t on as many degrees of freedom as there were moves. */
function carryForward(values: readonly number[]): MixtureComponent {
  const moves = values.slice(1).map((value, i) => value - values[i])
  return { weight: 1, centre: values[values.length - 1], scale: Math.sqrt(sumOfSquares(moves) / moves.length), freedom: moves.length }
}

/** The next wave is like any other before it. */
function pastMean(values: readonly number[]): MixtureComponent {
  const n = values.length
  const centre = values.reduce((sum, value) => sum + value, 0) / n
  return { weight: 1, centre, scale: Math.sqrt(sumOfSquares(values.map((value) => value - centre)) / (n - 1) * (1 + 1 / n)), freedom: n - 1 }
}

function methodOf(forecasts: Method['forecasts'], interval: number, limits: Limits): Method {
  return { forecasts, estimates: forecasts.map((components) => forecastEstimate(components, interval, limits)) }
}

function scoreOf({ forecasts, estimates }: Method, observed: readonly number[]) {
  const mean = (values: readonly number[]) => values.reduce((sum, value) => sum + value, 0) / values.length
  return {
    rmse: Math.sqrt(mean(observed.map((value, i) => (value - estimates[i].mean) ** 2))),
    crps: mean(observed.map((value, i) => mixtureCrps(value, forecasts[i]))),
    coverage: mean(observed.map((value, i) => (value >= estimates[i].low && value <= estimates[i].high ? 1 : 0))),
  }
}

function errorsOf({ estimates }: Method, observed: readonly number[]): Float64Array {
  return Float64Array.from(observed, (value, i) => value - estimates[i].mean)
}

function ratio(own: number, rival: number): number | null {
  return rival > 0 ? own / rival : null
}

function sumOfSquares(values: readonly number[]): number {
  return values.reduce((sum, value) => sum + value * value, 0)
}
