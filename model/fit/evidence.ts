import { createBorderedPrecision, createBorderedVector, factorise, solveForward, type BorderedPrecision, type BorderedVector } from '../linear/bordered-precision.ts'
import type { FitProblem } from './problem.ts'

/** Memory for one evaluation, made once and reused: nothing is allocated inside the loops. */
export interface Workspace {
  readonly precision: BorderedPrecision
  readonly vector: BorderedVector
  readonly scratch: Float64Array
  /** Shape (cells): w_c and w_c y_c. */
  readonly weight: Float64Array
  readonly weightedMean: Float64Array
  /** Of the step at hand, shape (venues). */
  readonly venueWeight: Float64Array
  readonly venueSum: Float64Array
  /** Of the step at hand, shape (venues, s). */
  readonly crossWeight: Float64Array
}

export function createWorkspace(problem: FitProblem): Workspace {
  const block = 1 + problem.walks
  const venues = problem.venueWalk.length
  return {
    precision: createBorderedPrecision(problem.steps, block, problem.border),
    vector: createBorderedVector(problem.steps, block, problem.border),
    scratch: new Float64Array(problem.border),
    weight: new Float64Array(problem.cells.count),
    weightedMean: new Float64Array(problem.cells.count),
    venueWeight: new Float64Array(venues),
    venueSum: new Float64Array(venues),
    crossWeight: new Float64Array(venues * problem.border),
  }
}

/**
 * log p(y | sigma) with every state integrated out, exactly:
 *
 *   -N/2 log 2 pi + 1/2 sum log w_c - 1/2 sum w_c y_c^2 + 1/2 h' Q^-1 h - 1/2 log|Q| + 1/2 log|P|,
 *
 * w_c = 1 / (V_c + tau^2), P the prior precision of the states, Q = P + H' W H, h = H' W y (all constants kept).
 * Leaves the factor of Q and u = L^-1 h in the workspace, ready for means and draws.
 *
 * @param sigma - shape (scales), each > 0, on the score's own scale
 * @returns the log marginal likelihood; NaN where Q is not positive definite to working precision
 */
export function logEvidence(problem: FitProblem, sigma: Float64Array, work: Workspace): number {
  const logPrior = assemblePrior(problem, sigma, work)
  const data = assembleData(problem, sigma[problem.position.tau], work)
  const logDeterminant = factorise(work.precision)
  const squares = solveForward(work.precision, work.vector, work.scratch)
  return 0.5 * (-problem.cells.count * Math.log(2 * Math.PI) + data.logWeights - data.squares + squares - logDeterminant + logPrior)
}

/** Write P, zero h; return log|P|. */
function assemblePrior(problem: FitProblem, sigma: Float64Array, work: Workspace): number {
  const { steps, walks, position, movementMultiplier } = problem
  const { diagonal, coupling, rows, corner, block: b, border: s } = work.precision
  diagonal.fill(0)
  rows.fill(0)
  corner.fill(0)
  work.vector.walk.fill(0)
  work.vector.fixed.fill(0)

  let logDeterminant = 0
  const initial = 1 / (problem.initialSd * problem.initialSd)
  diagonal[0] += initial
  logDeterminant += Math.log(initial)
  const movement = 1 / (sigma[position.mu] * sigma[position.mu])
  for (let t = 1; t < steps; t++) {
    const p = movement / movementMultiplier[t]
    diagonal[(t - 1) * b * b] += p
    diagonal[t * b * b] += p
    coupling[(t - 1) * b] = -p
    logDeterminant += Math.log(p)
  }
  for (let w = 0; w < walks; w++) {
    const c = (w + 1) * b + w + 1
    const start = 1 / (sigma[position.venue] * sigma[position.venue])
    const p = 1 / (sigma[position.drift[w]] * sigma[position.drift[w]])
    diagonal[c] += start
    logDeterminant += Math.log(start) + (steps - 1) * Math.log(p)
    for (let t = 1; t < steps; t++) {
      diagonal[(t - 1) * b * b + c] += p
      diagonal[t * b * b + c] += p
      coupling[(t - 1) * b + w + 1] = -p
    }
  }
  for (const group of problem.groups) {
    const p = 1 / (sigma[group.scale] * sigma[group.scale])
    for (let i = group.from; i < group.from + group.count; i++) corner[i * s + i] += p
    logDeterminant += group.count * Math.log(p)
  }
  return logDeterminant
}

/** How many variances are multiplied before their logarithm is taken: far from under- and overflow, and one log for all. */
const logBatch = 16

/** Add H' W H to Q and H' W y to h; return sum log w_c and sum w_c y_c^2. */
function assembleData(problem: FitProblem, tau: number, work: Workspace): { logWeights: number; squares: number } {
  const { cells, steps } = problem
  const { start, venue, effects, pairs, mean, variance } = cells
  const { weight, weightedMean, venueWeight, venueSum, crossWeight } = work
  const { corner } = work.precision
  const fixedSum = work.vector.fixed
  const tau2 = tau * tau
  let logWeights = 0
  let squares = 0
  let product = 1
  for (let t = 0; t < steps; t++) {
    const from = start[t]
    const to = start[t + 1]
    venueWeight.fill(0)
    venueSum.fill(0)
    crossWeight.fill(0)
    for (let c = from; c < to; c++) {
      const total = variance[c] + tau2
      product *= total
      if (c % logBatch === 0) {
        logWeights -= Math.log(product)
        product = 1
      }
      const w = 1 / total
      const wy = w * mean[c]
      squares += wy * mean[c]
      weight[c] = w
      weightedMean[c] = wy
      venueWeight[venue[c]] += w
      venueSum[venue[c]] += wy
    }
    for (const { column, cross } of effects) {
      for (let c = from; c < to; c++) {
        crossWeight[cross[c]] += weight[c]
        fixedSum[column[c]] += weightedMean[c]
      }
    }
    for (const place of pairs) for (let c = from; c < to; c++) corner[place[c]] += weight[c]
    spreadStep(problem, work, t)
  }
  return { logWeights: logWeights - Math.log(product), squares }
}

/** What the step's venues add up to, put where it belongs. */
function spreadStep({ venueWalk, venueFixed }: FitProblem, { precision, vector, venueWeight, venueSum, crossWeight }: Workspace, t: number): void {
  const { diagonal, rows, corner, block: b, border: s } = precision
  const d = t * b * b
  const r = t * s * b
  for (let v = 0; v < venueWeight.length; v++) {
    const w = venueWeight[v]
    if (w === 0) continue
    const component = venueWalk[v]
    const anchor = venueFixed[v]
    diagonal[d] += w
    vector.walk[t * b] += venueSum[v]
    if (component > 0) {
      diagonal[d + component * b] += w
      diagonal[d + component * b + component] += w
      vector.walk[t * b + component] += venueSum[v]
    }
    if (anchor >= 0) {
      rows[r + anchor * b] += w
      corner[anchor * s + anchor] += w
      vector.fixed[anchor] += venueSum[v]
    }
    for (let i = 0; i < s; i++) {
      const x = crossWeight[v * s + i]
      if (x === 0) continue
      rows[r + i * b] += x
      if (component > 0) rows[r + i * b + component] += x
      if (anchor >= 0) corner[i > anchor ? i * s + anchor : anchor * s + i] += x
      corner[i * s + i] += x
    }
  }
}
