import { createBorderedPrecision, createBorderedVector, factorise, solveForward, type BorderedPrecision, type BorderedVector } from '../linear/bordered-precision.ts'
import type { EffectRuns, FitCells, FitProblem } from './problem.ts'

/** Memory for one evaluation, made once and reused: nothing is allocated inside the loops. */
export interface Workspace {
  readonly precision: BorderedPrecision
  readonly vector: BorderedVector
  readonly scratch: Float64Array
  /** Shape (cells): w_c and w_c y_c. */
  readonly weight: Float64Array
  readonly weightedMean: Float64Array
}

export function createWorkspace(problem: FitProblem): Workspace {
  const block = 1 + problem.walks
  return {
    precision: createBorderedPrecision(problem.steps, block, problem.border),
    vector: createBorderedVector(problem.steps, block, problem.border),
    scratch: new Float64Array(problem.border),
    weight: new Float64Array(problem.cells.count),
    weightedMean: new Float64Array(problem.cells.count),
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
  const sums = weighCells(problem.cells, tau, work)
  addVenues(problem, work)
  for (const effect of problem.cells.effects) addEffect(problem, effect, work)
  const { weight, precision: { corner } } = work
  for (const place of problem.cells.pairs) for (let c = 0; c < place.length; c++) corner[place[c]] += weight[c]
  return sums
}

/** w_c and w_c y_c of every cell. */
function weighCells({ count, mean, variance }: FitCells, tau: number, { weight, weightedMean }: Workspace): { logWeights: number; squares: number } {
  const tau2 = tau * tau
  let logWeights = 0
  let squares = 0
  let product = 1
  for (let c = 0; c < count; c++) {
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
  }
  return { logWeights: logWeights - Math.log(product), squares }
}

/** Opinion and the venue's own walk, or its anchored offset. */
function addVenues({ cells: { venues }, venueWalk, venueFixed }: FitProblem, { precision, vector, weight, weightedMean }: Workspace): void {
  const { diagonal, rows, corner, block: b, border: s } = precision
  const { order, start, step, venue } = venues
  for (let r = 0; r < step.length; r++) {
    let w = 0
    let wy = 0
    for (let i = start[r]; i < start[r + 1]; i++) {
      w += weight[order[i]]
      wy += weightedMean[order[i]]
    }
    const t = step[r]
    const d = t * b * b
    const component = venueWalk[venue[r]]
    const anchor = venueFixed[venue[r]]
    diagonal[d] += w
    vector.walk[t * b] += wy
    if (component > 0) {
      diagonal[d + component * b] += w
      diagonal[d + component * b + component] += w
      vector.walk[t * b + component] += wy
    }
    if (anchor >= 0) {
      rows[(t * s + anchor) * b] += w
      corner[anchor * s + anchor] += w
      vector.fixed[anchor] += wy
    }
  }
}

/** One factor's columns of the border against opinion, the venues and themselves. */
function addEffect({ venueWalk, venueFixed }: FitProblem, effect: EffectRuns, { precision, vector, weight, weightedMean }: Workspace): void {
  const { rows, corner, block: b, border: s } = precision
  const { order, start, step, venue, column } = effect
  for (let r = 0; r < step.length; r++) {
    let w = 0
    let wy = 0
    for (let i = start[r]; i < start[r + 1]; i++) {
      w += weight[order[i]]
      wy += weightedMean[order[i]]
    }
    const own = column[r]
    const row = (step[r] * s + own) * b
    const component = venueWalk[venue[r]]
    const anchor = venueFixed[venue[r]]
    rows[row] += w
    if (component > 0) rows[row + component] += w
    if (anchor >= 0) corner[own > anchor ? own * s + anchor : anchor * s + own] += w
    corner[own * s + own] += w
    vector.fixed[own] += wy
  }
}
