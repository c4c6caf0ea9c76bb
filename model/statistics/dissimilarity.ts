import { ModelError } from '../model-error.ts'

/**
 * Index of dissimilarity: the share of one population that would have to change groups for both to be composed alike,
 * half the sum of the absolute differences of shares.
 *
 * @param one - shape (groups), n >= 1; shares or counts, finite, >= 0, any scale
 * @param other - shape (groups), likewise, the same groups in the same order
 * @returns in [0, 1]
 * @throws {ModelError} `groups-differ`, `shares-invalid` (names the index), `shares-empty` (none positive)
 * @see Duncan and Duncan (1955), A methodological analysis of segregation indexes, American Sociological Review 20:210-217
 * @example dissimilarityIndex([1, 1, 2], [2, 1, 1]) // => 0.25
 */
export function dissimilarityIndex(one: ArrayLike<number>, other: ArrayLike<number>): number {
  if (one.length !== other.length) throw new ModelError('groups-differ', `Unexpected number of groups ${other.length}, expected ${one.length}`)
  const [ofOne, ofOther] = [totalOf(one), totalOf(other)]
  let sum = 0
  for (let i = 0; i < one.length; i += 1) sum += Math.abs(one[i] / ofOne - other[i] / ofOther)
  return Math.min(1, sum / 2)
}

function totalOf(shares: ArrayLike<number>): number {
  let total = 0
  for (let i = 0; i < shares.length; i += 1) {
    if (!(shares[i] >= 0 && shares[i] < Infinity)) throw new ModelError('shares-invalid', `Unexpected shares[${i}] ${shares[i]}, expected a finite number of at least 0`)
    total += shares[i]
  }
  if (!(total > 0)) throw new ModelError('shares-empty', `Unexpected shares, none of ${shares.length} positive, expected at least one`)
  return total
}
