import { cholesky } from './proposal.ts'

/** Evaluate a function at many points at once: shape (n, d) in, (n) out. */
export type Evaluate = (points: Float64Array) => Promise<Float64Array>

export interface Mode {
  readonly point: Float64Array
  readonly value: number
  /** Shape (d, d): inverse of the negative curvature at the point. */
  readonly covariance: Float64Array
}

/** Width of the differences in z, where the posterior's scale is about 1. */
const step = 1e-2
const mostIterations = 100
/** A step that promises less than this no longer moves a proposal. */
const enough = 0.01
/** Longer steps leap over the mode onto the plain where a standard deviation is as good as 0. */
const longestMove = 0.7

/**
 * The highest point of a smooth log density and its curvature there, by BFGS with numerical gradients (Nocedal and
 * Wright 2006, Numerical Optimization, 2nd ed., algorithm 6.1). It only seeds the importance sampler, so that a mode
 * not quite reached costs efficiency, never correctness.
 */
export async function findMode(evaluate: Evaluate, start: Float64Array): Promise<Mode> {
  const d = start.length
  let point = start.slice()
  let value = (await evaluate(point))[0]
  let gradient = await numericalGradient(evaluate, point, value)
  const inverse = identity(d)
  for (let iteration = 0; iteration < mostIterations; iteration++) {
    const move = limitLength(multiply(inverse, gradient, d), longestMove)
    const slope = dot(move, gradient)
    if (slope < enough) break
    const next = await searchLine(evaluate, point, value, move, slope)
    if (next === null) break
    const nextGradient = await numericalGradient(evaluate, next.point, next.value)
    // maximising: the curvature pair is (s, -(g' - g))
    updateInverse(inverse, difference(next.point, point), difference(gradient, nextGradient), d)
    point = next.point
    value = next.value
    gradient = nextGradient
  }
  return { point, value, covariance: await curvatureInverse(evaluate, point, value) }
}

/** By forward differences: half the work of central ones, and exact enough for where to look next. */
async function numericalGradient(evaluate: Evaluate, point: Float64Array, value: number): Promise<Float64Array> {
  const d = point.length
  const points = new Float64Array(d * d)
  for (let j = 0; j < d; j++) {
    points.set(point, j * d)
    points[j * d + j] += step
  }
  return (await evaluate(points)).map((found) => (found - value) / step)
}

/** Try a whole step, a half, a quarter ... at once; take the first that rises enough (Armijo's rule). */
async function searchLine(evaluate: Evaluate, point: Float64Array, value: number, move: Float64Array, slope: number) {
  const d = point.length
  const lengths = [1, 0.5, 0.25, 0.1, 0.03, 0.01]
  for (const length of lengths) {
    const candidate = Float64Array.from({ length: d }, (_, j) => point[j] + length * move[j])
    const found = (await evaluate(candidate))[0]
    if (found >= value + 1e-4 * length * slope) return { point: candidate, value: found }
  }
  return null
}

/** BFGS update of the inverse curvature; left alone where the pair carries no curvature. */
function updateInverse(h: Float64Array, s: Float64Array, y: Float64Array, d: number): void {
  const sy = dot(s, y)
  if (sy <= 1e-10) return
  const hy = multiply(h, y, d)
  const scale = (1 + dot(y, hy) / sy) / sy
  for (let i = 0; i < d; i++) for (let j = 0; j < d; j++) h[i * d + j] += scale * s[i] * s[j] - (hy[i] * s[j] + s[i] * hy[j]) / sy
}

/**
 * Inverse of the negative Hessian by differences, (f(i, j) - f(i) - f(j) + f) / h^2 off the diagonal; the diagonal is raised
 * until it is positive definite.
 */
async function curvatureInverse(evaluate: Evaluate, point: Float64Array, value: number): Promise<Float64Array> {
  const d = point.length
  const width = 0.05
  const moves: (readonly number[])[] = []
  for (let i = 0; i < d; i++) moves.push([i], [])
  for (let i = 0; i < d; i++) for (let j = 0; j < i; j++) moves.push([i, j])
  const points = new Float64Array(moves.length * d)
  moves.forEach((move, row) => {
    points.set(point, row * d)
    // an empty move is the step back of the one before it
    if (move.length === 0) points[row * d + moves[row - 1][0]] -= width
    for (const k of move) points[row * d + k] += width
  })
  const values = await evaluate(points)
  const curvature = new Float64Array(d * d)
  for (let i = 0; i < d; i++) curvature[i * d + i] = (2 * value - values[2 * i] - values[2 * i + 1]) / (width * width)
  moves.forEach(([i, j], row) => {
    if (j === undefined) return
    const mixed = (values[2 * i] + values[2 * j] - values[row] - value) / (width * width)
    curvature[i * d + j] = mixed
    curvature[j * d + i] = mixed
  })
  for (let ridge = 0; ; ridge = ridge === 0 ? 0.1 : 2 * ridge) {
    const raised = curvature.slice()
    for (let i = 0; i < d; i++) raised[i * d + i] += ridge
    const factor = cholesky(raised, d)
    if (factor !== null) return invertFactor(factor, d)
  }
}

/** (L L')^-1 of a small lower factor. */
function invertFactor(l: Float64Array, d: number): Float64Array {
  const inverse = new Float64Array(d * d)
  for (let c = 0; c < d; c++) {
    for (let i = c; i < d; i++) {
      let sum = i === c ? 1 : 0
      for (let k = c; k < i; k++) sum -= l[i * d + k] * inverse[k * d + c]
      inverse[i * d + c] = sum / l[i * d + i]
    }
  }
  const out = new Float64Array(d * d)
  for (let i = 0; i < d; i++) for (let j = 0; j < d; j++) for (let k = Math.max(i, j); k < d; k++) out[i * d + j] += inverse[k * d + i] * inverse[k * d + j]
  return out
}

function identity(d: number): Float64Array {
  const m = new Float64Array(d * d)
  for (let i = 0; i < d; i++) m[i * d + i] = 1
  return m
}

function multiply(m: Float64Array, x: Float64Array, d: number): Float64Array {
  return Float64Array.from({ length: d }, (_, i) => dot(m.subarray(i * d, (i + 1) * d), x))
}

function dot(a: Float64Array, b: Float64Array): number {
  let sum = 0
  for (let i = 0; i < a.length; i++) sum += a[i] * b[i]
  return sum
}

function difference(a: Float64Array, b: Float64Array): Float64Array {
  return a.map((x, i) => x - b[i])
}

function limitLength(x: Float64Array, most: number): Float64Array {
  const length = Math.sqrt(dot(x, x))
  return length > most ? x.map((v) => v * most / length) : x
}
