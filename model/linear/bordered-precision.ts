/**
 * A symmetric positive definite matrix that is block tridiagonal with a border, its Cholesky factor and what
 * follows from it: log determinant, solutions, draws.
 *
 *        | D_0  E_0'               F_0' |
 *        | E_0  D_1  E_1'          F_1' |        D_t  b x b, symmetric: one step of the time axis
 *   Q =  |      E_1  D_2  ...      F_2' |        E_t  b x b, diagonal: the coupling of step t+1 to step t
 *        |           ...  ...      ...  |        F_t  s x b: the border's rows at step t
 *        | F_0  F_1  F_2  ...      G    |        G    s x s, symmetric: static effects
 *
 * Q = L L' with L of the same shape (no fill-in beyond the border): for t = 0 .. T-1
 *   D_t = L_t L_t',   W_t = E_t L_t^-T,   M_t = F_t L_t^-T,
 *   D_(t+1) -= W_t W_t',   F_(t+1) -= M_t W_t',   G -= M_t M_t',
 * and last G = L_g L_g'. Work is O(T (b + s)^2 b), memory O(T (b + s) b): linear in steps, and no dense matrix
 * has a side that grows with them. Golub and Van Loan (2013), Matrix Computations, 4th ed., sections 4.2 and 4.5.
 *
 * The inverse of each L_t (lower triangular, small) is kept in place of L_t, so that every later solve is a product.
 */
export interface BorderedPrecision {
  readonly steps: number
  /** b, at least 1. */
  readonly block: number
  /** s, 0 or more. */
  readonly border: number
  /** Shape (steps, b, b): the lower triangle is read; overwritten by the inverse of L_t. */
  readonly diagonal: Float64Array
  /** Shape (steps, b): diagonal of E_t between step t and t + 1; the last one is not read. */
  readonly coupling: Float64Array
  /** Shape (steps, s, b): F_t, overwritten by M_t. */
  readonly rows: Float64Array
  /** Shape (s, s): the lower triangle of G is read; overwritten by the inverse of L_g. */
  readonly corner: Float64Array
}

/** A vector of the same partition: one part per step and one for the border. */
export interface BorderedVector {
  /** Shape (steps, b). */
  readonly walk: Float64Array
  /** Shape (s). */
  readonly fixed: Float64Array
}

export function createBorderedPrecision(steps: number, block: number, border: number): BorderedPrecision {
  return {
    steps, block, border,
    diagonal: new Float64Array(steps * block * block),
    coupling: new Float64Array(steps * block),
    rows: new Float64Array(steps * border * block),
    corner: new Float64Array(border * border),
  }
}

export function createBorderedVector(steps: number, block: number, border: number): BorderedVector {
  return { walk: new Float64Array(steps * block), fixed: new Float64Array(border) }
}

/**
 * Replace the lower triangle of an n x n matrix at `at` by the inverse of its Cholesky factor.
 *
 * @returns determinant of the matrix, or NaN where it is not positive definite
 */
function invertCholesky(matrix: Float64Array, at: number, n: number): number {
  let determinant = 1
  const end = at + n * n
  for (let j = 0; j < n; j++) {
    const rowJ = at + j * n
    let pivot = matrix[rowJ + j]
    for (let k = rowJ; k < rowJ + j; k++) pivot -= matrix[k] * matrix[k]
    if (!(pivot > 0)) return NaN
    determinant *= pivot
    const inverse = 1 / Math.sqrt(pivot)
    matrix[rowJ + j] = inverse
    for (let rowI = rowJ + n; rowI < end; rowI += n) {
      let sum = matrix[rowI + j]
      for (let k = 0; k < j; k++) sum -= matrix[rowI + k] * matrix[rowJ + k]
      matrix[rowI + j] = sum * inverse
    }
  }
  // in place, column by column from the left: column j of the inverse needs columns >= j of L only
  for (let j = 0; j < n; j++) {
    for (let i = j + 1; i < n; i++) {
      const rowI = at + i * n
      let sum = 0
      for (let k = j; k < i; k++) sum += matrix[rowI + k] * matrix[at + k * n + j]
      matrix[rowI + j] = -sum * matrix[rowI + i]
    }
  }
  return determinant
}

/**
 * Factor in place.
 *
 * @returns log determinant of Q, or NaN where Q is not positive definite to working precision
 */
export function factorise(q: BorderedPrecision): number {
  const { steps, block, border, diagonal, corner } = q
  let logDeterminant = 0
  for (let t = 0; t < steps; t++) {
    logDeterminant += Math.log(invertCholesky(diagonal, t * block * block, block))
    solveRows(q, t)
    takeFromCorner(q, t)
    if (t + 1 < steps) takeFromNext(q, t)
  }
  return logDeterminant + logOfCorner(corner, border)
}

/** The corner may be large enough for its determinant to leave the range of numbers: its logarithm is summed from the pivots. */
function logOfCorner(corner: Float64Array, border: number): number {
  const determinant = invertCholesky(corner, 0, border)
  if (Number.isNaN(determinant)) return NaN
  let logDeterminant = 0
  for (let i = 0; i < border; i++) logDeterminant -= 2 * Math.log(corner[i * border + i])
  return logDeterminant
}

/** M_t[i, k] = sum over j <= k of F_t[i, j] Linv[k, j]; from the right, so that F can be overwritten. Two rows at a time. */
function solveRows({ block: b, border: s, diagonal, rows }: BorderedPrecision, t: number): void {
  const d = t * b * b
  const end = (t + 1) * s * b
  for (let row = t * s * b; row < end; row += 2 * b) {
    const twin = row + b < end ? row + b : row
    for (let k = b - 1; k >= 0; k--) {
      let sum = 0
      let twinSum = 0
      for (let j = 0; j <= k; j++) {
        const l = diagonal[d + k * b + j]
        sum += rows[row + j] * l
        twinSum += rows[twin + j] * l
      }
      rows[twin + k] = twinSum
      rows[row + k] = sum
    }
  }
}

/** G -= M_t M_t', two rows by two columns at a time: half the loads for the same products. */
function takeFromCorner({ block: b, border: s, rows, corner }: BorderedPrecision, t: number): void {
  const r = t * s * b
  for (let i = 0; i < s; i += 2) {
    const row0 = r + i * b
    // the row after the last one: the last again, its products left unused
    const row1 = i + 1 < s ? row0 + b : row0
    for (let j = 0; j <= i; j += 2) {
      const column0 = r + j * b
      const column1 = j + 1 < s ? column0 + b : column0
      let sum00 = 0
      let sum01 = 0
      let sum10 = 0
      let sum11 = 0
      for (let k = 0; k < b; k++) {
        const x0 = rows[row0 + k]
        const x1 = rows[row1 + k]
        const y0 = rows[column0 + k]
        const y1 = rows[column1 + k]
        sum00 += x0 * y0
        sum01 += x0 * y1
        sum10 += x1 * y0
        sum11 += x1 * y1
      }
      corner[i * s + j] -= sum00
      if (i + 1 < s) corner[(i + 1) * s + j] -= sum10
      if (j + 1 < s) {
        // above the diagonal where j = i: never read
        corner[i * s + j + 1] -= sum01
        if (i + 1 < s) corner[(i + 1) * s + j + 1] -= sum11
      }
    }
  }
}

/** D_(t+1) -= W_t W_t' and F_(t+1) -= M_t W_t', with W_t[j, k] = E_t[j] Linv_t[k, j], which is 0 for k < j. */
function takeFromNext({ block: b, border: s, diagonal, coupling, rows }: BorderedPrecision, t: number): void {
  const d = t * b * b
  const next = d + b * b
  const e = t * b
  for (let i = 0; i < b; i++) {
    for (let j = 0; j <= i; j++) {
      let sum = 0
      for (let k = d + i * b; k < next; k += b) sum += diagonal[k + i] * diagonal[k + j]
      diagonal[next + i * b + j] -= coupling[e + i] * coupling[e + j] * sum
    }
  }
  const ahead = s * b
  const end = (t + 1) * ahead
  for (let row = t * ahead; row < end; row += 2 * b) {
    const twin = row + b
    for (let j = 0; j < b; j++) {
      let sum = 0
      let twinSum = 0
      for (let k = j; k < b; k++) {
        const l = diagonal[d + k * b + j]
        sum += rows[row + k] * l
        // a twin beyond the last row is the next step's first: summed and thrown away
        twinSum += rows[twin + k] * l
      }
      rows[row + ahead + j] -= coupling[e + j] * sum
      if (twin < end) rows[twin + ahead + j] -= coupling[e + j] * twinSum
    }
  }
}

/**
 * Solve L u = h in place: `h` becomes u.
 *
 * @returns the squared length of u, which is h' Q^-1 h
 */
export function solveForward(q: BorderedPrecision, h: BorderedVector, scratch: Float64Array): number {
  const { steps, block: b, border: s, diagonal, coupling, rows, corner } = q
  const { walk, fixed } = h
  let squares = 0
  for (let t = 0; t < steps; t++) {
    const d = t * b * b
    const at = t * b
    for (let k = b - 1; k >= 0; k--) {
      let sum = 0
      for (let j = 0; j <= k; j++) sum += diagonal[d + k * b + j] * walk[at + j]
      walk[at + k] = sum
      squares += sum * sum
    }
    if (t + 1 < steps) {
      for (let j = 0; j < b; j++) {
        let sum = 0
        for (let k = j; k < b; k++) sum += diagonal[d + k * b + j] * walk[at + k]
        walk[at + b + j] -= coupling[at + j] * sum
      }
    }
    const r = t * s * b
    for (let i = 0; i < s; i++) {
      let sum = 0
      for (let k = 0; k < b; k++) sum += rows[r + i * b + k] * walk[at + k]
      fixed[i] -= sum
    }
  }
  for (let i = 0; i < s; i++) {
    let sum = 0
    for (let j = 0; j <= i; j++) sum += corner[i * s + j] * fixed[j]
    scratch[i] = sum
  }
  for (let i = 0; i < s; i++) {
    fixed[i] = scratch[i]
    squares += scratch[i] * scratch[i]
  }
  return squares
}

/**
 * Solve L' x = u: with u from `solveForward` x is Q^-1 h; with u plus standard normals, a draw from Normal(Q^-1 h, Q^-1).
 *
 * @param u - read only
 * @param x - written
 */
export function solveBackward(q: BorderedPrecision, u: BorderedVector, x: BorderedVector): void {
  const { steps, block: b, border: s, diagonal, coupling, rows, corner } = q
  for (let i = 0; i < s; i++) {
    let sum = 0
    for (let j = i; j < s; j++) sum += corner[j * s + i] * u.fixed[j]
    x.fixed[i] = sum
  }
  for (let t = steps - 1; t >= 0; t--) {
    const d = t * b * b
    const at = t * b
    const r = t * s * b
    // the right-hand side u_t - W_t' x_(t+1) - M_t' x_s, built in x_t; W_t' x = Linv_t (E_t x)
    for (let k = 0; k < b; k++) {
      let sum = u.walk[at + k]
      if (t + 1 < steps) for (let j = 0; j <= k; j++) sum -= diagonal[d + k * b + j] * coupling[at + j] * x.walk[at + b + j]
      for (let i = 0; i < s; i++) sum -= rows[r + i * b + k] * x.fixed[i]
      x.walk[at + k] = sum
    }
    // times L_t^-T, an upper triangle: from the left, in place
    for (let j = 0; j < b; j++) {
      let sum = 0
      for (let k = j; k < b; k++) sum += diagonal[d + k * b + j] * x.walk[at + k]
      x.walk[at + j] = sum
    }
  }
}
