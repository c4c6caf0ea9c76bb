import { ModelError } from '../model-error.ts'
import type { Decidable } from './decidable.ts'
import { mean, requireFinite, sampleVariance } from './moments.ts'

export type AttenuationReason = 'too-few-values' | 'no-variation' | 'all-sampling-error' | 'beyond-one'

/**
 * Share of the variance of measured values that is not sampling error: 1 - mean of the squared standard errors / variance.
 *
 * @param values - shape (n), finite
 * @param standardErrors - shape (n), each finite and >= 0, their errors independent of the truth
 * @returns in (0, 1]; undecided with fewer than two values, where they do not vary, or where their variance is not above that
 *   of the sampling errors
 * @throws {ModelError} `pairs-differ`, `standard-error-invalid` (names the index), `values-not-finite` (names the index)
 * @see Spearman (1904), American J. of Psychology 15:72-101
 * @example reliability([1, 3, 5], [1, 1, 1]) // => { value: 0.75 }
 */
export function reliability(values: ArrayLike<number>, standardErrors: ArrayLike<number>): Decidable<AttenuationReason> {
  if (standardErrors.length !== values.length) {
    throw new ModelError('pairs-differ', `Unexpected number of standard errors ${standardErrors.length}, expected ${values.length}`)
  }
  requireFinite(values, 'values')
  const squares = Float64Array.from(standardErrors, (error, i) => squaredError(error, i))
  if (values.length < 2) return { value: null, reason: 'too-few-values' }
  const variance = sampleVariance(values)
  if (variance === 0) return { value: null, reason: 'no-variation' }
  const share = 1 - mean(squares) / variance
  return share > 0 ? { value: share } : { value: null, reason: 'all-sampling-error' }
}

/**
 * The correlation there would be had the values no sampling error: r / sqrt(reliability). Sampling error weakens a correlation, so
 * that the corrected one is never nearer to 0.
 *
 * @param r - correlation of something known exactly with the values, in [-1, 1]
 * @param values - shape (n), finite
 * @param standardErrors - shape (n), each finite and >= 0
 * @returns in [-1, 1]; undecided where the reliability is, and where the correction leads beyond 1: the standard errors then
 *   take away more than r leaves room for, and no correlation is their answer
 * @throws {ModelError} `correlation-range`, and those of `reliability`
 * @see Spearman (1904), American J. of Psychology 15:72-101
 * @example correctedCorrelation(0.75, [1, 3, 5, 7], [1, 1, 1, 1]).value > 0.75 // => true
 */
export function correctedCorrelation(r: number, values: ArrayLike<number>, standardErrors: ArrayLike<number>): Decidable<AttenuationReason> {
  if (!(Math.abs(r) <= 1)) throw new ModelError('correlation-range', `Unexpected correlation ${r}, expected one in [-1, 1]`)
  const share = reliability(values, standardErrors)
  if (share.value === null) return share
  const corrected = r / Math.sqrt(share.value)
  return Math.abs(corrected) <= 1 ? { value: corrected } : { value: null, reason: 'beyond-one' }
}

function squaredError(error: number, i: number): number {
  if (!(error >= 0 && error < Infinity)) throw new ModelError('standard-error-invalid', `Unexpected standardErrors[${i}] ${error}, expected a finite number of at least 0`)
  return error * error
}
