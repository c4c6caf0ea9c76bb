import { ModelError } from '../model-error.ts'

/** Refuse values that are not finite, naming the first; `values-not-finite`. */
export function requireFinite(values: ArrayLike<number>, what: string): void {
  for (let i = 0; i < values.length; i += 1) {
    if (!Number.isFinite(values[i])) throw new ModelError('values-not-finite', `Unexpected ${what}[${i}] ${values[i]}, expected a finite number`)
  }
}

/**
 * Arithmetic mean, its rounding corrected by the mean of the residuals.
 *
 * @param values - shape (n), n >= 1, finite
 * @throws {ModelError} `values-too-few`, `values-not-finite` (names the index)
 * @example mean([1, 2, 6]) // => 3
 */
export function mean(values: ArrayLike<number>): number {
  requireAtLeast(values, 1)
  let sum = 0
  for (let i = 0; i < values.length; i += 1) sum += values[i]
  if (!Number.isFinite(sum)) requireFinite(values, 'values')
  const first = sum / values.length
  let residual = 0
  for (let i = 0; i < values.length; i += 1) residual += values[i] - first
  return first + residual / values.length
}

/**
 * Sample variance, divisor n - 1, by two passes with correction (Chan, Golub and LeVeque 1983, American Statistician 37:242-247).
 *
 * @param values - shape (n), n >= 2, finite
 * @param centre - their mean, if it is known already
 * @throws {ModelError} `values-too-few`, `values-not-finite` (names the index)
 * @example sampleVariance([1, 2, 6]) // => 7
 */
export function sampleVariance(values: ArrayLike<number>, centre: number = mean(values)): number {
  requireAtLeast(values, 2)
  let squares = 0
  let residual = 0
  for (let i = 0; i < values.length; i += 1) {
    const deviation = values[i] - centre
    squares += deviation * deviation
    residual += deviation
  }
  if (!Number.isFinite(squares)) requireFinite(values, 'values')
  return Math.max(0, squares - (residual * residual) / values.length) / (values.length - 1)
}

/**
 * Square root of the sample variance.
 *
 * @param values - shape (n), n >= 2, finite
 * @throws {ModelError} `values-too-few`, `values-not-finite` (names the index)
 * @example standardDeviation([1, 1, 1]) // => 0
 */
export function standardDeviation(values: ArrayLike<number>, centre: number = mean(values)): number {
  return Math.sqrt(sampleVariance(values, centre))
}

function requireAtLeast(values: ArrayLike<number>, least: number): void {
  if (values.length < least) throw new ModelError('values-too-few', `Unexpected number of values ${values.length}, expected at least ${least}`)
}
