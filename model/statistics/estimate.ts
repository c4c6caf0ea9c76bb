import type { Estimate } from '../findings/schema.ts'
import { ModelError } from '../model-error.ts'
import { mean, standardDeviation } from './moments.ts'
import { selectQuantile } from './quantile.ts'

/**
 * Summary of posterior draws: mean, bounds of the central interval (quantiles by definition 7), standard deviation (n - 1).
 *
 * @param draws - shape (n), n >= 2, finite, equally weighted; left as they are
 * @param interval - probability inside the interval, in (0, 1)
 * @param scratch - shape (n), overwritten; given once it saves a copy per summary where there are many
 * @throws {ModelError} `values-too-few`, `values-not-finite` (names the index), `interval-range`, `scratch-length`
 * @example estimateOf(Float64Array.of(1, 2, 3, 4, 5), 0.5) // => { mean: 3, low: 2, high: 4, sd: 1.5811388300841898 }
 */
export function estimateOf(draws: Float64Array, interval: number, scratch: Float64Array = new Float64Array(draws.length)): Estimate {
  if (!(interval > 0 && interval < 1)) throw new ModelError('interval-range', `Unexpected interval ${interval}, expected one in (0, 1)`)
  if (scratch.length !== draws.length) {
    throw new ModelError('scratch-length', `Unexpected length of scratch ${scratch.length}, expected that of the draws, ${draws.length}`)
  }
  const centre = mean(draws)
  const sd = standardDeviation(draws, centre)
  scratch.set(draws)
  const low = selectQuantile(scratch, (1 - interval) / 2)
  const high = selectQuantile(scratch, (1 + interval) / 2, low.below)
  return { mean: centre, low: low.value, high: high.value, sd }
}
