import { ModelError } from '../model-error.ts'
import type { Generator } from '../random/generator.ts'
import { fillDirichlet } from './dirichlet.ts'
import { dot, sideOf, singularDecomposition, type SingularDecomposition } from './singular-decomposition.ts'

/*
 * A coder calls a post that is truly t by the label k with probability M[t, k]. Shares p of true labels show as shares
 * q = M' p of coded ones, so p = M'^-1 q. For a mean of scores s over true labels that is s' p = w' q with M w = s: a
 * coded label k takes the score w[k], and a post that is truly t then has the score s[t] on average.
 */

/** A mean corrected for the coder by giving each coded label another score. */
export type Rescoring =
  /** Shape (k): the score of each coded label; may lie outside the range of the scores. */
  | { readonly weights: Float64Array; readonly smallestSingularValue: number }
  | { readonly weights: null; readonly reason: 'too-poor'; readonly smallestSingularValue: number }

/** Shares of true labels as far as they can be had from coded ones. */
export interface CorrectedShares {
  /** Shape (k), summing to 1; not clipped. */
  readonly shares: Float64Array
  /** Labels whose share lies below 0 or above 1: coded shares that this matrix cannot bring about, but for chance. */
  readonly impossible: readonly number[]
}

/** Smallest singular value below which a coder is too poor to be corrected: an error of the coded shares would grow fivefold. */
export const poorestInvertible = 0.2
/** Below it a matrix cannot be inverted at all. */
const singular = 1e-12

/**
 * Of each true label, the share that was coded as each.
 *
 * @param counts - shape (k * k), row-major: rows true, columns coded; finite, >= 0, k >= 2
 * @returns shape (k * k), each row summing to 1; a row without a coding is even, the mean of a uniform prior: nothing is known of it
 * @throws {ModelError} `matrix-not-square`, `matrix-not-finite`, `labels-too-few`, `counts-invalid` (names the index)
 * @example [...confusionShares([9, 1, 2, 6])] // => [0.9, 0.1, 0.25, 0.75]
 */
export function confusionShares(counts: ArrayLike<number>): Float64Array {
  const labels = labelsOf(counts)
  requireCounts(counts)
  const shares = new Float64Array(labels * labels)
  for (let row = 0; row < shares.length; row += labels) {
    let sum = 0
    for (let i = row; i < row + labels; i += 1) sum += counts[i]
    for (let i = row; i < row + labels; i += 1) shares[i] = sum > 0 ? counts[i] / sum : 1 / labels
  }
  return shares
}

/**
 * A confusion matrix drawn from its posterior under a uniform prior: each row from Dirichlet(1 + counts).
 *
 * @param counts - shape (k * k), row-major: rows true, columns coded; finite, >= 0, k >= 2
 * @param generator - moved on
 * @returns shape (k * k), each row summing to 1
 * @throws {ModelError} `matrix-not-square`, `matrix-not-finite`, `labels-too-few`, `counts-invalid` (names the index)
 * @example drawConfusion([9, 1, 2, 6], createGenerator(1, 0)).length // => 4
 */
export function drawConfusion(counts: ArrayLike<number>, generator: Generator): Float64Array {
  const labels = labelsOf(counts)
  requireCounts(counts)
  const concentrations = Float64Array.from(counts, (count) => count + 1)
  const matrix = new Float64Array(labels * labels)
  for (let row = 0; row < matrix.length; row += labels) {
    fillDirichlet(matrix.subarray(row, row + labels), concentrations.subarray(row, row + labels), generator)
  }
  return matrix
}

/**
 * Scores for coded labels under which the mean of coded posts is the mean of the true ones: the solution of M w = s.
 *
 * @param matrix - shape (k * k), row-major: rows true, columns coded, each row summing to 1
 * @param scores - shape (k): of the true labels
 * @param least - smallest singular value at which it is still done; for single draws of an audit that passed give 0, or
 *   the poorer half of its posterior would be cut off
 * @returns `too-poor` where the smallest singular value is below `least`
 * @throws {ModelError} `matrix-not-square`, `matrix-not-finite`, `labels-too-few`, `confusion-invalid` (names the row), `labels-differ`
 * @see Rogan and Gladen (1978), American J. of Epidemiology 107:71-76, for two labels; Tenenbein (1972), Technometrics 14:187-202, for more
 * @example rescoring([1, 0, 0, 1], [-1, 1]).weights?.join() // => '-1,1'
 */
export function rescoring(matrix: ArrayLike<number>, scores: ArrayLike<number>, least: number = poorestInvertible): Rescoring {
  const decomposition = decomposed(matrix, scores)
  const smallestSingularValue = smallestOf(decomposition)
  if (smallestSingularValue < Math.max(least, singular)) return { weights: null, reason: 'too-poor', smallestSingularValue }
  const { values, left, right } = decomposition
  return { weights: recombine(right, left, values, scores), smallestSingularValue }
}

/**
 * Shares of true labels: the solution of M' p = q. A share below 0 is returned as it is, and said to be impossible.
 *
 * @param matrix - shape (k * k), row-major: rows true, columns coded, each row summing to 1
 * @param coded - shape (k): shares of the coded labels
 * @returns null where the matrix cannot be inverted
 * @throws {ModelError} as `rescoring`
 * @see Rogan and Gladen (1978), American J. of Epidemiology 107:71-76, for two labels; Tenenbein (1972), Technometrics 14:187-202, for more
 * @example correctedShares([1, 0, 0.5, 0.5], [0.75, 0.25])?.impossible // => []
 */
export function correctedShares(matrix: ArrayLike<number>, coded: ArrayLike<number>): CorrectedShares | null {
  const decomposition = decomposed(matrix, coded)
  if (smallestOf(decomposition) < singular) return null
  const { values, left, right } = decomposition
  const shares = recombine(left, right, values, coded)
  // A share that is 0 may come out as -1e-17.
  const impossible = [...shares.keys()].filter((label) => shares[label] < -1e-12 || shares[label] > 1 + 1e-12)
  return { shares, impossible }
}

/**
 * How well a coder tells labels apart at worst: 1 for one who never errs, 0 for one whose labels cannot be told apart.
 *
 * @param matrix - shape (k * k), row-major
 * @throws {ModelError} `matrix-not-square`, `matrix-not-finite`
 * @example smallestSingularValue([1, 0, 0, 1]) // => 1
 */
export function smallestSingularValue(matrix: ArrayLike<number>): number {
  return smallestOf(singularDecomposition(matrix))
}

const smallestOf = ({ values, side }: SingularDecomposition) => values[side - 1]

/** sum over j of to[j] (from[j] . given) / values[j] */
function recombine(to: readonly Float64Array[], from: readonly Float64Array[], values: Float64Array, given: ArrayLike<number>): Float64Array {
  const solution = new Float64Array(values.length)
  for (let j = 0; j < values.length; j += 1) {
    const part = dot(from[j], given) / values[j]
    for (let i = 0; i < solution.length; i += 1) solution[i] += part * to[j][i]
  }
  return solution
}

function decomposed(matrix: ArrayLike<number>, given: ArrayLike<number>): SingularDecomposition {
  const labels = labelsOf(matrix)
  if (given.length !== labels) throw new ModelError('labels-differ', `Unexpected number of labels ${given.length}, expected ${labels} as the matrix has`)
  for (let row = 0; row < labels; row += 1) {
    let sum = 0
    for (let i = row * labels; i < (row + 1) * labels; i += 1) sum += matrix[i] >= 0 ? matrix[i] : Number.NaN
    if (!(Math.abs(sum - 1) < 1e-9)) throw new ModelError('confusion-invalid', `Unexpected row ${row} of a confusion matrix, sum ${sum}, expected shares that sum to 1`)
  }
  return singularDecomposition(matrix)
}

function labelsOf(matrix: ArrayLike<number>): number {
  const labels = sideOf(matrix)
  if (labels < 2) throw new ModelError('labels-too-few', `Unexpected number of labels ${labels}, expected at least 2`)
  return labels
}

function requireCounts(counts: ArrayLike<number>): void {
  for (let i = 0; i < counts.length; i += 1) {
    if (counts[i] < 0) throw new ModelError('counts-invalid', `Unexpected counts[${i}] ${counts[i]}, expected at least 0`)
  }
}
