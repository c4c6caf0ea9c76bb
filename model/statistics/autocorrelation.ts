import { ModelError } from '../model-error.ts'
import { mean } from './moments.ts'

/**
 * Autocorrelations at lags 1, 2, ...: products of deviations from the mean of the whole series, over the sum of all squares.
 *
 * @param values - shape (n), finite, in order of time
 * @param lags - how many, whole, in [1, n - 1]
 * @returns shape (lags), each in [-1, 1]; null where the series does not vary
 * @throws {ModelError} `lags-invalid`, `values-not-finite` (names the index)
 * @see Box and Jenkins (1976), Time Series Analysis, section 2.1.5
 * @example [...autocorrelations([1, 2, 3, 4, 5], 2)] // => [0.4, -0.1]
 */
export function autocorrelations(values: ArrayLike<number>, lags: number): Float64Array | null {
  const n = values.length
  if (!(Number.isInteger(lags) && lags >= 1 && lags < n)) {
    throw new ModelError('lags-invalid', `Unexpected number of lags ${lags}, expected a whole number from 1 to one below the ${n} values`)
  }
  const centre = mean(values)
  const deviations = Float64Array.from(values, (value) => value - centre)
  const largest = deviations.reduce((most, deviation) => Math.max(most, Math.abs(deviation)), 0)
  if (largest === 0) return null
  for (let t = 0; t < n; t += 1) deviations[t] /= largest
  const squares = laggedSum(deviations, 0)
  return Float64Array.from({ length: lags }, (_, i) => laggedSum(deviations, i + 1) / squares)
}

/** Sum of the products of a series with itself, moved by a lag. */
export function laggedSum(values: Float64Array, lag: number): number {
  let sum = 0
  for (let t = lag; t < values.length; t += 1) sum += values[t] * values[t - lag]
  return sum
}
