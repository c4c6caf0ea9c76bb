import { ModelError } from '../model-error.ts'
import { normalCdf, normalDensity } from './normal.ts'

/**
 * Continuous ranked probability score of a normal forecast: the absolute error a forecast without spread would have made.
 *
 * @param observed - finite
 * @param centre - finite
 * @param sd - >= 0; at 0 the score is the absolute error
 * @returns >= 0, in the unit of the observation; smaller is better
 * @throws {ModelError} `forecast-invalid`
 * @see Gneiting and Raftery (2007), JASA 102:359-378, eq. 21 with the sign turned
 * @example normalCrps(2, 5, 0) // => 3
 */
export function normalCrps(observed: number, centre: number, sd: number): number {
  requireForecast(sd >= 0 && Number.isFinite(observed + centre + sd), `observed ${observed}, centre ${centre}, sd ${sd}`)
  if (sd === 0) return Math.abs(observed - centre)
  const z = (observed - centre) / sd
  return sd * (z * (2 * normalCdf(z) - 1) + 2 * normalDensity(z) - 1 / Math.sqrt(Math.PI))
}

/**
 * Score of a central interval: its width, and a fine of 2 / alpha per unit that the observation lies outside.
 *
 * @param alpha - probability outside the interval, in (0, 1)
 * @throws {ModelError} `forecast-invalid`
 * @see Gneiting and Raftery (2007), eq. 43
 * @example intervalScore(2, -1, 1, 0.5) // => 6
 */
export function intervalScore(observed: number, low: number, high: number, alpha: number): number {
  requireForecast(low <= high && alpha > 0 && alpha < 1 && Number.isFinite(observed + low + high), `observed ${observed}, interval ${low} to ${high}, alpha ${alpha}`)
  return high - low + (2 / alpha) * Math.max(0, low - observed, observed - high)
}

/**
 * Loss of a quantile forecast.
 *
 * @param quantile - the forecast
 * @param p - which quantile, in (0, 1)
 * @throws {ModelError} `forecast-invalid`
 * @see Koenker and Bassett (1978), Econometrica 46:33-50
 * @example quantileLoss(3, 1, 0.75) // => 1.5
 */
export function quantileLoss(observed: number, quantile: number, p: number): number {
  requireForecast(p > 0 && p < 1 && Number.isFinite(observed + quantile), `observed ${observed}, quantile ${quantile}, p ${p}`)
  return observed >= quantile ? p * (observed - quantile) : (1 - p) * (quantile - observed)
}

function requireForecast(valid: boolean, what: string): void {
  if (!valid) throw new ModelError('forecast-invalid', `Unexpected forecast (${what}), expected finite numbers, in order, probabilities in (0, 1)`)
}
