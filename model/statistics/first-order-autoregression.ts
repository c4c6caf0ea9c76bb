import { ModelError } from '../model-error.ts'
import type { Generator } from '../random/generator.ts'
import { autocorrelations } from './autocorrelation.ts'
import type { Decidable } from './decidable.ts'

export type AutoregressionReason = 'too-few-values' | 'no-variation'

/** Nearer to 1 a short series can't tell an autoregression from a random walk, which has no mean to return to. */
const mostPersistent = 0.97

/**
 * Coefficient of a first-order autoregression from a short series: the lag-one autocorrelation r, whose expectation is
 * rho - (1 + 4 rho) / n where the mean is estimated too, turned around: (n r + 1) / (n - 4), then held inside [0, 0.97].
 * (With n / (n - 1) r in the place of r, the same correction is the better known rho - (1 + 3 rho) / (n - 1).)
 *
 * @param values - shape (n), finite, in order of time
 * @returns in [0, 0.97]; undecided with fewer than 5 values, or where they do not vary
 * @throws {ModelError} `values-not-finite` (names the index)
 * @see Kendall (1954), Biometrika 41:403-404; Marriott and Pope (1954), Biometrika 41:390-402; Shaman and Stine (1988),
 *   JASA 83:842-848, for the two definitions of r
 * @example autoregressionCoefficient([1, 2, 3, 4, 5, 4]) // => { value: 0.97 }
 */
export function autoregressionCoefficient(values: ArrayLike<number>): Decidable<AutoregressionReason> {
  const n = values.length
  if (n < 5) return { value: null, reason: 'too-few-values' }
  const lagOne = autocorrelations(values, 1)
  if (lagOne === null) return { value: null, reason: 'no-variation' }
  return { value: Math.min(mostPersistent, Math.max(0, (n * lagOne[0] + 1) / (n - 4))) }
}

/** A stationary first-order autoregression: mean and standard deviation are those of every value. */
export interface Autoregression {
  readonly mean: number
  /** >= 0 */
  readonly sd: number
  /** In (-1, 1): correlation of neighbours. */
  readonly coefficient: number
}

/**
 * Overwrite a series with a draw from the autoregression, the first value from its stationary distribution.
 *
 * @param target - shape (n), overwritten; takes n normal draws from the generator
 * @throws {ModelError} `autoregression-invalid`
 */
export function fillAutoregression(target: Float64Array, { mean, sd, coefficient }: Autoregression, generator: Generator): void {
  if (!(sd >= 0 && Math.abs(coefficient) < 1 && Number.isFinite(mean + sd))) {
    throw new ModelError('autoregression-invalid', `Unexpected autoregression (mean ${mean}, sd ${sd}, coefficient ${coefficient}), expected finite numbers, sd >= 0, coefficient in (-1, 1)`)
  }
  const innovation = Math.sqrt((1 - coefficient) * (1 + coefficient))
  generator.fillNormal(target)
  let deviation = target.length > 0 ? target[0] : 0
  for (let t = 0; t < target.length; t += 1) {
    if (t > 0) deviation = coefficient * deviation + innovation * target[t]
    target[t] = mean + sd * deviation
  }
}
