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
 * @returns log determinant of the matrix, or NaN where it is not positive definite
 */
function invertCholesky(matrix: Float64Array, at: number, n: number): number {
  let logDeterminant = 0
  for (let j = 0; j < n; j++) {
    const rowJ = at + j * n
    let pivot = matrix[rowJ + j]
    for (let k = 0; k < j; k++) pivot -= matrix[rowJ + k] * matrix[rowJ + k]
    if (!(pivot > 0)) return NaN
    logDeterminant += Math.log(pivot)
    const root = Math.sqrt(pivot)
    matrix[rowJ + j] = root
    for (let i = j + 1; i < n; i++) {
      const rowI = at + i * n
      let sum = matrix[rowI + j]
      for (let k = 0; k < j; k++) sum -= matrix[rowI + k] * matrix[rowJ + k]
      matrix[rowI + j] = sum / root
    }
  }
  // in place, column by column from the left: column j of the inverse needs columns >= j of L only
  for (let j = 0; j < n; j++) {
    matrix[at + j * n + j] = 1 / matrix[at + j * n + j]
    for (let i = j + 1; i < n; i++) {
      const rowI = at + i * n
      let sum = matrix[rowI + j] * matrix[at + j * n + j]
      for (let k = j + 1; k < i; k++) sum += matrix[rowI + k] * matrix[at + k * n + j]
      matrix[rowI + j] = -sum / matrix[rowI + i]
    }
  }
  return logDeterminant
}

/**
 * Factor in place.
 *
 * @returns log determinant of Q, or NaN where Q is not positive definite to working precision
 */
export function factorise(q: BorderedPrecision): number {
  const { steps, block: b, border: s, diagonal, rows, corner } = q
  let logDeterminant = 0
  for (let t = 0; t < steps; t++) {
    const d = t * b * b
    logDeterminant += invertCholesky(diagonal, d, b)
    if (Number.isNaN(logDeterminant)) return NaN
    const r = t * s * b
    // M_t[i, k] = sum over j <= k of F_t[i, j] Linv[k, j]; from the right, so that F can be overwritten
    for (let i = 0; i < s; i++) {
      const row = r + i * b
      for (let k = b - 1; k >= 0; k--) {
        let sum = 0
        for (let j = 0; j <= k; j++) sum += rows[row + j] * diagonal[d + k * b + j]
        rows[row + k] = sum
      }
    }
    for (let i = 0; i < s; i++) {
      const rowI = r + i * b
      for (let j = 0; j <= i; j++) {
        const rowJ = r + j * b
        let sum = 0
        for (let k = 0; k < b; k++) sum += rows[rowI + k] * rows[rowJ + k]
        corner[i * s + j] -= sum
      }
    }
    if (t + 1 < steps) coupleNext(q, t)
  }
  const last = invertCholesky(corner, 0, s)
  return logDeterminant + last
}

/** D_(t+1) -= W_t W_t' and F_(t+1) -= M_t W_t', with W_t[j, k] = E_t[j] Linv_t[k, j], which is 0 for k < j. */
function coupleNext(q: BorderedPrecision, t: number): void {
  const { block: b, border: s, diagonal, coupling, rows } = q
  const d = t * b * b
  const next = d + b * b
  const e = t * b
  for (let i = 0; i < b; i++) {
    const ei = coupling[e + i]
    if (ei === 0) continue
    for (let j = 0; j <= i; j++) {
      let sum = 0
      for (let k = i; k < b; k++) sum += diagonal[d + k * b + i] * diagonal[d + k * b + j]
      diagonal[next + i * b + j] -= ei * coupling[e + j] * sum
    }
  }
  const r = t * s * b
  const nextRows = r + s * b
  for (let i = 0; i < s; i++) {
    const row = r + i * b
    for (let j = 0; j < b; j++) {
      let sum = 0
      for (let k = j; k < b; k++) sum += rows[row + k] * diagonal[d + k * b + j]
      rows[nextRows + i * b + j] -= coupling[e + j] * sum
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
