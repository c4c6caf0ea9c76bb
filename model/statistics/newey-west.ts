import { ModelError } from '../model-error.ts'
import { requireFinite } from './moments.ts'

/** Least squares whose errors may be autocorrelated and of unequal variance. */
export interface NeweyWest {
  /** Shape (k). */
  readonly coefficients: Float64Array
  /** Shape (k * k), symmetric. */
  readonly covariance: Float64Array
  /** Shape (k). */
  readonly standardErrors: Float64Array
  /** n - k */
  readonly freedom: number
}

/** What a column has left after those before it, in parts of its length, at and below which it is taken for their combination. */
const deficient = 1e-10

/**
 * Ordinary least squares with standard errors that allow for autocorrelation up to `lags` (Bartlett's weights
 * 1 - lag / (lags + 1)) and for unequal variances. No prewhitening, and no factor for small samples unless asked for.
 *
 * @param design - k columns of shape (n), the constant among them if there is to be one; n > k >= 1
 * @param y - shape (n)
 * @param lags - whole, in [0, n - 1]; `neweyWestLags(n)` gives a usual number
 * @param options - `smallSample`: covariance times n / (n - k)
 * @throws {ModelError} `design-empty`, `design-length` (names the column), `values-too-few`, `lags-invalid`, `values-not-finite`
 *   (names column and index), `design-deficient` (names the column that is a combination of those before it)
 * @see Newey and West (1987), Econometrica 55:703-708
 * @example [...neweyWest([[1, 1, 1, 1]], [1, 2, 3, 6], 0).coefficients] // => [3]
 */
export function neweyWest(design: readonly ArrayLike<number>[], y: ArrayLike<number>, lags: number, options: { readonly smallSample?: boolean } = {}): NeweyWest {
  requireProblem(design, y, lags)
  const [n, k] = [y.length, design.length]
  const { basis, triangle } = orthogonalise(design)
  const projections = Float64Array.from(basis, (column) => dot(column, y))
  const residuals = Float64Array.from(y, (value, t) => basis.reduce((rest, column, j) => rest - column[t] * projections[j], value))
  const scores = basis.map((column) => column.map((value, t) => value * residuals[t]))
  const factor = options.smallSample === true ? n / (n - k) : 1
  const covariance = sandwich(triangle, bartlettCovariance(scores, lags), k, factor)
  return {
    coefficients: backSubstitute(triangle, projections, k),
    covariance,
    standardErrors: Float64Array.from({ length: k }, (_, i) => Math.sqrt(Math.max(0, covariance[i * k + i]))),
    freedom: n - k,
  }
}

/**
 * A usual number of lags: floor(4 (n / 100)^(2/9)), and no more than n - 1.
 *
 * @param n - observations, whole, >= 1
 * @throws {ModelError} `values-too-few`
 * @see Newey and West (1994), Review of Economic Studies 61:631-653: their first number of lags for Bartlett's weights, which
 *   practice takes as it is
 * @example neweyWestLags(100) // => 4
 */
export function neweyWestLags(n: number): number {
  if (!(Number.isInteger(n) && n >= 1)) throw new ModelError('values-too-few', `Unexpected number of values ${n}, expected a whole number of at least 1`)
  return Math.min(n - 1, Math.floor(4 * Math.pow(n / 100, 2 / 9)))
}

interface Factorisation {
  /** k orthonormal columns of shape (n). */
  readonly basis: readonly Float64Array[]
  /** Shape (k * k), upper triangular: design = basis times triangle. */
  readonly triangle: Float64Array
}

/** Gram and Schmidt, each column taken twice: after that the basis is orthogonal to rounding (Giraud and others 2005). */
function orthogonalise(design: readonly ArrayLike<number>[]): Factorisation {
  const k = design.length
  const basis: Float64Array[] = []
  const triangle = new Float64Array(k * k)
  for (const [j, given] of design.entries()) {
    const column = Float64Array.from(given)
    const length = Math.sqrt(dot(column, column))
    for (let pass = 0; pass < 2; pass += 1) {
      for (const [i, earlier] of basis.entries()) {
        const part = dot(earlier, column)
        triangle[i * k + j] += part
        for (let t = 0; t < column.length; t += 1) column[t] -= part * earlier[t]
      }
    }
    const left = Math.sqrt(dot(column, column))
    if (left <= deficient * length) throw new ModelError('design-deficient', `Unexpected design[${j}], a combination of the columns before it, expected independent columns`)
    triangle[j * k + j] = left
    basis.push(column.map((value) => value / left))
  }
  return { basis, triangle }
}

/** Weighted sum of the autocovariances of the scores, not divided by n. */
function bartlettCovariance(scores: readonly Float64Array[], lags: number): Float64Array {
  const k = scores.length
  const sum = new Float64Array(k * k)
  for (let lag = 0; lag <= lags; lag += 1) {
    const weight = 1 - lag / (lags + 1)
    for (let i = 0; i < k; i += 1) {
      for (let j = 0; j < k; j += 1) {
        const part = weight * laggedProduct(scores[i], scores[j], lag)
        sum[i * k + j] += part
        if (lag > 0) sum[j * k + i] += part
      }
    }
  }
  return sum
}

/** factor T^-1 M T^-T for a symmetric M. */
function sandwich(triangle: Float64Array, middle: Float64Array, k: number, factor: number): Float64Array {
  const half = Array.from({ length: k }, (_, j) => backSubstitute(triangle, middle.subarray(j * k, j * k + k), k))
  const covariance = new Float64Array(k * k)
  for (let i = 0; i < k; i += 1) {
    covariance.set(backSubstitute(triangle, Float64Array.from(half, (row) => row[i]), k).map((value) => factor * value), i * k)
  }
  return covariance
}

function backSubstitute(triangle: Float64Array, right: Float64Array, k: number): Float64Array {
  const solution = Float64Array.from(right)
  for (let i = k - 1; i >= 0; i -= 1) {
    for (let j = i + 1; j < k; j += 1) solution[i] -= triangle[i * k + j] * solution[j]
    solution[i] /= triangle[i * k + i]
  }
  return solution
}

const dot = (one: ArrayLike<number>, other: ArrayLike<number>) => laggedProduct(one, other, 0)

function laggedProduct(one: ArrayLike<number>, other: ArrayLike<number>, lag: number): number {
  let sum = 0
  for (let t = lag; t < one.length; t += 1) sum += one[t] * other[t - lag]
  return sum
}

function requireProblem(design: readonly ArrayLike<number>[], y: ArrayLike<number>, lags: number): void {
  const [n, k] = [y.length, design.length]
  if (k === 0) throw new ModelError('design-empty', 'Unexpected design without a column, expected at least one')
  for (const [j, column] of design.entries()) {
    if (column.length !== n) throw new ModelError('design-length', `Unexpected length of design[${j}] ${column.length}, expected ${n}`)
  }
  if (n <= k) throw new ModelError('values-too-few', `Unexpected number of values ${n}, expected more than the ${k} columns of the design`)
  if (!(Number.isInteger(lags) && lags >= 0 && lags < n)) {
    throw new ModelError('lags-invalid', `Unexpected number of lags ${lags}, expected a whole number from 0 to one below the ${n} values`)
  }
  requireFinite(y, 'y')
  for (const [j, column] of design.entries()) requireFinite(column, `design[${j}]`)
}
