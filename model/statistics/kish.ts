import { ModelError } from '../model-error.ts'

/**
 * How many equally weighted respondents a weighted sample is worth: (sum w)^2 / sum w^2.
 *
 * @param weights - shape (n), one per respondent, n >= 1; finite, >= 0, any scale
 * @param counts - shape (n), >= 0: respondents of each weight; one each if left out
 * @returns respondents, in [1, n] up to rounding; n when all weights agree
 * @throws {ModelError} `weights-invalid` (names the index), `weights-empty` (none positive), `counts-invalid` (names the index)
 * @see Kish (1965), Survey Sampling, section 11.7
 * @example kishEffectiveSize([1, 1, 2]) // => 2.6666666666666665
 */
export function kishEffectiveSize(weights: ArrayLike<number>, counts?: ArrayLike<number>): number {
  const largest = largestWeight(weights)
  let sum = 0
  let squares = 0
  for (let i = 0; i < weights.length; i += 1) {
    const weight = weights[i] / largest
    const count = counts === undefined ? 1 : counts[i]
    if (!(count >= 0 && count < Infinity)) throw new ModelError('counts-invalid', `Unexpected counts[${i}] ${count}, expected a finite number of at least 0`)
    sum += count * weight
    squares += count * weight * weight
  }
  return (sum * sum) / squares
}

/**
 * Factor by which unequal weights inflate the variance of a mean: 1 + relative variance of the weights (divisor n).
 *
 * @param weights - shape (n), n >= 1; finite, >= 0, any scale
 * @returns in [1, n] up to rounding
 * @throws {ModelError} `weights-invalid` (names the index) or `weights-empty` (none positive)
 * @see Kish (1992), Weighting for unequal Pi, J. Official Statistics 8:183-200
 * @example kishDesignEffect([1, 1, 2, 4]) // => 1.375
 */
export function kishDesignEffect(weights: ArrayLike<number>): number {
  return weights.length / kishEffectiveSize(weights)
}

/**
 * Factor by which clustering inflates the variance of a mean: 1 + (b - 1) rho.
 *
 * @param size - b, mean cluster size as met by a member, >= 1
 * @param intraclass - rho, in [-1, 1]
 * @returns >= 0
 * @throws {ModelError} `cluster-size`, `intraclass-range` (also where rho is below -1 / (b - 1), which no population can have)
 * @see Kish (1965), Survey Sampling, section 5.4
 * @example clusterDesignEffect(5, 0.25) // => 2
 */
export function clusterDesignEffect(size: number, intraclass: number): number {
  if (!(size >= 1 && size < Infinity)) throw new ModelError('cluster-size', `Unexpected cluster size ${size}, expected a finite number of at least 1`)
  const effect = 1 + (size - 1) * intraclass
  if (!(Math.abs(intraclass) <= 1 && effect >= 0)) {
    throw new ModelError('intraclass-range', `Unexpected intraclass correlation ${intraclass} with clusters of ${size}, expected one in [-1 / (size - 1), 1]`)
  }
  return effect
}

function largestWeight(weights: ArrayLike<number>): number {
  let largest = 0
  for (let i = 0; i < weights.length; i += 1) {
    const weight = weights[i]
    if (!(weight >= 0 && weight < Infinity)) {
      throw new ModelError('weights-invalid', `Unexpected weights[${i}] ${weight}, expected a finite number of at least 0`)
    }
    if (weight > largest) largest = weight
  }
  if (largest === 0) throw new ModelError('weights-empty', `Unexpected weights, none of ${weights.length} positive, expected at least one`)
  return largest
}
