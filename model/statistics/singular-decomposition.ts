import { ModelError } from '../model-error.ts'

/** M = U diag(values) V', for a small square matrix. */
export interface SingularDecomposition {
  /** n */
  readonly side: number
  /** Shape (n), descending, >= 0. */
  readonly values: Float64Array
  /** Shape (n)(n): left singular vectors; all 0 where the value is 0. */
  readonly left: readonly Float64Array[]
  /** Shape (n)(n): right singular vectors. */
  readonly right: readonly Float64Array[]
}

/** Cosine between two columns, and length of one in parts of the whole matrix, below which there is only rounding left. */
const orthogonal = 1e-15
const negligible = 1e-16
const sweeps = 60

/**
 * Singular values and vectors by one-sided Jacobi: columns are turned against each other until all are orthogonal. Small
 * singular values come out as precisely as large ones. Of a symmetric positive semi-definite matrix they are eigenvalues and eigenvectors.
 *
 * @param matrix - shape (n * n), row-major, n >= 1, finite
 * @throws {ModelError} `matrix-not-square`, `matrix-not-finite` (names the index)
 * @see Hestenes (1958), J. SIAM 6:51-90 (from memory); Golub and Van Loan (2013), Matrix Computations, 4th ed., section 8.6
 * @example singularDecomposition([0, 2, 3, 0]).values.join() // => '3,2'
 */
export function singularDecomposition(matrix: ArrayLike<number>): SingularDecomposition {
  const side = sideOf(matrix)
  const columns = Array.from({ length: side }, (_, j) => Float64Array.from({ length: side }, (_, i) => matrix[i * side + j]))
  const right = Array.from({ length: side }, (_, j) => Float64Array.from({ length: side }, (_, i) => (i === j ? 1 : 0)))
  const least = negligible * Math.sqrt(columns.reduce((sum, column) => sum + dot(column, column), 0))
  for (let sweep = 0, turned = true; turned && sweep < sweeps; sweep += 1) {
    turned = false
    for (let p = 0; p < side; p += 1) {
      for (let q = p + 1; q < side; q += 1) turned = orthogonalise(columns, right, p, q, least) || turned
    }
  }
  const lengths = columns.map((column) => Math.sqrt(dot(column, column)))
  const order = lengths.map((_, j) => j).sort((i, j) => lengths[j] - lengths[i])
  return {
    side,
    values: Float64Array.from(order, (j) => lengths[j]),
    left: order.map((j) => columns[j].map((value) => (lengths[j] > 0 ? value / lengths[j] : 0))),
    right: order.map((j) => right[j]),
  }
}

/**
 * The side of a square matrix given row by row.
 *
 * @throws {ModelError} `matrix-not-square`, `matrix-not-finite` (names the index)
 * @example sideOf([1, 2, 3, 4]) // => 2
 */
export function sideOf(matrix: ArrayLike<number>): number {
  const side = Math.round(Math.sqrt(matrix.length))
  if (side < 1 || side * side !== matrix.length) throw new ModelError('matrix-not-square', `Unexpected number of elements ${matrix.length}, expected that of a square matrix`)
  for (let i = 0; i < matrix.length; i += 1) {
    if (!Number.isFinite(matrix[i])) throw new ModelError('matrix-not-finite', `Unexpected matrix[${i}] ${matrix[i]}, expected a finite number`)
  }
  return side
}

/** Turn columns p and q in their plane until they are orthogonal; whether there was anything to do. */
function orthogonalise(columns: readonly Float64Array[], right: readonly Float64Array[], p: number, q: number, least: number): boolean {
  const [one, other, product] = [dot(columns[p], columns[p]), dot(columns[q], columns[q]), dot(columns[p], columns[q])]
  if (Math.abs(product) <= orthogonal * Math.sqrt(one * other) || Math.sqrt(Math.min(one, other)) <= least) return false
  const cotangent = (other - one) / (2 * product)
  const tangent = (cotangent < 0 ? -1 : 1) / (Math.abs(cotangent) + Math.hypot(1, cotangent))
  const cosine = 1 / Math.hypot(1, tangent)
  turn(columns[p], columns[q], cosine, cosine * tangent)
  turn(right[p], right[q], cosine, cosine * tangent)
  return true
}

function turn(one: Float64Array, other: Float64Array, cosine: number, sine: number): void {
  for (let i = 0; i < one.length; i += 1) {
    const kept = one[i]
    one[i] = cosine * kept - sine * other[i]
    other[i] = sine * kept + cosine * other[i]
  }
}

/**
 * Scalar product.
 *
 * @param one - shape (n)
 * @param other - shape (n)
 * @example dot([1, 2], [3, 4]) // => 11
 */
export function dot(one: ArrayLike<number>, other: ArrayLike<number>): number {
  let sum = 0
  for (let i = 0; i < one.length; i += 1) sum += one[i] * other[i]
  return sum
}
