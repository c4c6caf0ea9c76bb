import type { Generator } from '../random/generator.ts'
import type { DrawSurrogate } from './persistence.ts'

/** The partners of the waves at one lag. */
export interface LaggedPartners {
  /** Shape (pairs): which waves have a partner. */
  readonly waves: Int32Array
  /** Shape (pairs). */
  readonly partners: Float64Array
}

/** Surrogate surveys drawn: the smallest p-value is one in 2,000. */
const surrogates = 1999

/**
 * How often a survey that has nothing to do with the series would show a correlation as large as the largest found, looked for at as many
 * lags: the largest |r| over the lags, of each of 1,999 surrogates of the survey (Westfall and Young 1993, Resampling-Based Multiple Testing,
 * single-step maxT; surrogates for autocorrelated series: Theiler, Eubank, Longtin, Galdrikian and Farmer 1992, Physica D 58:77).
 *
 * @param largest - the largest |r| found
 * @param lags - the partners at every lag looked at
 * @param draw - writes one surrogate
 * @param waves - number of waves
 * @returns in (0, 1]: (1 + surrogates that reach it) / (1 + surrogates)
 */
export function maxStatisticP(largest: number, lags: readonly LaggedPartners[], draw: DrawSurrogate, waves: number, generator: Generator): number {
  const directions = lags.map(({ waves: which, partners }) => ({ which, direction: unitDeviations(partners) }))
  const surrogate = new Float64Array(waves)
  let reached = 0
  for (let i = 0; i < surrogates; i++) {
    draw(surrogate, generator)
    if (directions.some(({ which, direction }) => Math.abs(correlate(surrogate, which, direction)) >= largest - 1e-12)) reached++
  }
  return (1 + reached) / (1 + surrogates)
}

/** Deviations from the mean, of length 1. */
function unitDeviations(values: Float64Array): Float64Array {
  const centre = values.reduce((a, b) => a + b, 0) / values.length
  const deviations = values.map((value) => value - centre)
  const length = Math.sqrt(deviations.reduce((sum, x) => sum + x * x, 0))
  return deviations.map((x) => (length === 0 ? 0 : x / length))
}

/** Correlation with a series whose deviations are of length 1. */
function correlate(series: Float64Array, which: Int32Array, direction: Float64Array): number {
  let sum = 0
  for (const wave of which) sum += series[wave]
  const centre = sum / which.length
  let [squares, products] = [0, 0]
  for (let i = 0; i < which.length; i++) {
    const deviation = series[which[i]] - centre
    squares += deviation * deviation
    products += deviation * direction[i]
  }
  return squares === 0 ? 0 : products / Math.sqrt(squares)
}
