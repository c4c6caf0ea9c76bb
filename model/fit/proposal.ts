import type { Generator } from '../random/generator.ts'
import { kishEffectiveSize } from '../statistics/kish.ts'
import { normalQuantile } from '../statistics/normal.ts'
import { resample } from './resample.ts'
import { fitMarginal, marginalLogDensity, marginalQuantile, standardMarginal, type SplitMarginal } from './marginal.ts'

/** A density over R^d to draw from: z = centre + C s, the coordinates of s independent split marginals. */
export interface Proposal {
  readonly dimension: number
  readonly centre: Float64Array
  /** Shape (d, d), lower triangular C. */
  readonly factor: Float64Array
  readonly marginals: readonly SplitMarginal[]
}

/** Rows that shapes are fitted to: more would not tell them better than a proposal needs. */
const fittedRows = 1000

/** A proposal with this covariance (shape (d, d)) and no skewness; null where it is not positive definite. */
export function normalProposal(centre: Float64Array, covariance: Float64Array): Proposal | null {
  const d = centre.length
  const factor = cholesky(covariance, d)
  if (factor === null) return null
  return { dimension: d, centre, factor, marginals: Array.from({ length: d }, standardMarginal) }
}

/**
 * The proposal that matches a weighted sample's mean and covariance and, along each axis of its factor, its shape;
 * a little wider, because few effective draws show less than there is.
 *
 * @param points - shape (n, d)
 * @param weights - shape (n), >= 0, summing to 1
 * @param generator - moved on: shapes are fitted to a resample
 * @returns null where the weighted covariance is not positive definite
 */
export function fitProposal(points: Float64Array, weights: Float64Array, d: number, generator: Generator): Proposal | null {
  const n = weights.length
  const centre = new Float64Array(d)
  for (let i = 0; i < n; i++) for (let j = 0; j < d; j++) centre[j] += weights[i] * points[i * d + j]
  const covariance = new Float64Array(d * d)
  for (let i = 0; i < n; i++) {
    for (let j = 0; j < d; j++) {
      const dj = weights[i] * (points[i * d + j] - centre[j])
      for (let k = 0; k <= j; k++) covariance[j * d + k] += dj * (points[i * d + k] - centre[k])
    }
  }
  const factor = cholesky(covariance, d)
  if (factor === null) return null
  const sample = resample(weights, Math.min(n, fittedRows), generator)
  const axes = Array.from({ length: d }, () => new Float64Array(sample.length))
  const s = new Float64Array(d)
  sample.forEach((row, i) => {
    standardise(points, row * d, centre, factor, s)
    for (let j = 0; j < d; j++) axes[j][i] = s[j]
  })
  const spare = 1 + d / kishEffectiveSize(weights)
  return { dimension: d, centre, factor, marginals: axes.map((axis) => widen(fitMarginal(axis), spare)) }
}

function widen({ mode, left, right }: SplitMarginal, factor: number): SplitMarginal {
  return { mode, left: { ...left, width: left.width * factor }, right: { ...right, width: right.width * factor } }
}

/** Turn uniforms, shape (n, d), into points of the proposal, in place. */
export function placePoints(q: Proposal, uniforms: Float64Array): void {
  const d = q.dimension
  const s = new Float64Array(d)
  for (let at = 0; at < uniforms.length; at += d) {
    for (let j = 0; j < d; j++) s[j] = marginalQuantile(q.marginals[j], uniforms[at + j], normalQuantile)
    for (let j = 0; j < d; j++) {
      let x = q.centre[j]
      for (let k = 0; k <= j; k++) x += q.factor[j * d + k] * s[k]
      uniforms[at + j] = x
    }
  }
}

/** Log density of every point; shape (n, d) in, (n) out. */
export function proposalLogDensity(q: Proposal, points: Float64Array): Float64Array {
  const d = q.dimension
  let logVolume = 0
  for (let j = 0; j < d; j++) logVolume += Math.log(q.factor[j * d + j])
  const s = new Float64Array(d)
  const out = new Float64Array(points.length / d)
  for (let i = 0; i < out.length; i++) {
    standardise(points, i * d, q.centre, q.factor, s)
    let sum = -logVolume
    for (let j = 0; j < d; j++) sum += marginalLogDensity(q.marginals[j], s[j])
    out[i] = sum
  }
  return out
}

/** s = C^-1 (z - centre). */
function standardise(points: Float64Array, at: number, centre: Float64Array, factor: Float64Array, s: Float64Array): void {
  const d = centre.length
  for (let j = 0; j < d; j++) {
    let x = points[at + j] - centre[j]
    for (let k = 0; k < j; k++) x -= factor[j * d + k] * s[k]
    s[j] = x / factor[j * d + j]
  }
}

/** Lower Cholesky factor of a small matrix of which the lower triangle is read; null where it is not positive definite. */
export function cholesky(matrix: Float64Array, n: number): Float64Array | null {
  const l = new Float64Array(n * n)
  for (let j = 0; j < n; j++) {
    for (let i = j; i < n; i++) {
      let sum = matrix[i * n + j]
      for (let k = 0; k < j; k++) sum -= l[i * n + k] * l[j * n + k]
      if (i === j) {
        if (!(sum > 0)) return null
        l[j * n + j] = Math.sqrt(sum)
      } else l[i * n + j] = sum / l[j * n + j]
    }
  }
  return l
}
