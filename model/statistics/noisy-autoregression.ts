import { ModelError } from '../model-error.ts'
import type { Generator } from '../random/generator.ts'

/** A series that remembers: each value is the coefficient times the one before, plus an innovation. A coefficient of 1 is a random walk. */
export interface Memory {
  /** In [0, 1]. */
  readonly coefficient: number
  /** Standard deviation of the innovations, > 0. */
  readonly innovation: number
}

/**
 * Restricted log-likelihood of a first-order autoregression, or a random walk, that was observed with known errors; its mean is
 * integrated out under a flat prior, which is what takes the small-sample bias away. Constants are left out: less (n - 1) / 2 log 2 pi
 * it is the diffuse log-likelihood. By the Kalman filter, run on the observations and on a column of ones at once.
 *
 * @param values - shape (n), n >= 2
 * @param errorVariances - shape (n), >= 0; the first > 0 where the coefficient is 1
 * @throws {ModelError} `memory-invalid`
 * @see Harville (1974), Biometrika 61:383, for the restricted likelihood; Durbin and Koopman (2012), Time Series Analysis by State Space Methods,
 *   2nd ed., sections 2.2, 2.10 and 6.2.3 (the augmented filter), for the recursions; Cheang and Reinsel (2000), JASA 95:1173, for the bias
 */
export function restrictedLogLikelihood(values: ArrayLike<number>, errorVariances: ArrayLike<number>, { coefficient, innovation }: Memory): number {
  requireMemory({ coefficient, innovation })
  // the walk starts at the unknown level itself
  let variance = coefficient === 1 ? 0 : innovation ** 2 / (1 - coefficient ** 2)
  let [state, ones] = [0, 0]
  let [logs, squares, products, information] = [0, 0, 0, 0]
  // taking the first value off all costs nothing under a flat mean and keeps digits
  const origin = values[0]
  for (let t = 0; t < values.length; t++) {
    const total = variance + errorVariances[t]
    const surprise = values[t] - origin - state
    const rest = 1 - ones
    logs += Math.log(total)
    squares += surprise * surprise / total
    products += surprise * rest / total
    information += rest * rest / total
    const gain = variance / total
    state = coefficient * (state + gain * surprise)
    ones = coefficient * (ones + gain * rest)
    variance = coefficient ** 2 * (1 - gain) * variance + innovation ** 2
  }
  return -0.5 * (logs + Math.log(information) + squares - products * products / information)
}

/**
 * Overwrite a series with a draw about 0: an autoregression begins in its stationary distribution, a walk at 0.
 *
 * @param target - shape (n), overwritten; takes n normal draws from the generator
 * @throws {ModelError} `memory-invalid`
 */
export function fillMemory(target: Float64Array, memory: Memory, generator: Generator): void {
  requireMemory(memory)
  const { coefficient, innovation } = memory
  generator.fillNormal(target)
  let at = coefficient === 1 || target.length === 0 ? 0 : innovation / Math.sqrt(1 - coefficient ** 2) * target[0]
  for (let t = 0; t < target.length; t++) {
    if (t > 0) at = coefficient * at + innovation * target[t]
    target[t] = at
  }
}

function requireMemory({ coefficient, innovation }: Memory): void {
  if (!(coefficient >= 0 && coefficient <= 1 && innovation > 0 && Number.isFinite(innovation))) {
    throw new ModelError('memory-invalid', `Unexpected memory (coefficient ${coefficient}, innovation ${innovation}), expected a coefficient in [0, 1] and an innovation above 0`)
  }
}
