import { createBorderedVector, solveBackward, solveForward, type BorderedVector } from '../linear/bordered-precision.ts'
import type { Generator } from '../random/generator.ts'
import { drawWeights, fillMeans } from '../coder/rescore.ts'
import type { FitProblem } from './problem.ts'
import { createWorkspace, logEvidence, type Workspace } from './evidence.ts'

/** Numbers in one draw of all states: (mu, e_1 .. e_W) per step, then the border. */
export function stateWidth(problem: FitProblem): number {
  return problem.steps * (1 + problem.walks) + problem.border
}

/** Memory for drawing states, made once and reused. */
export interface StateWorkspace {
  readonly evidence: Workspace
  readonly solution: BorderedVector
}

export function createStateWorkspace(problem: FitProblem): StateWorkspace {
  return { evidence: createWorkspace(problem), solution: createBorderedVector(problem.steps, 1 + problem.walks, problem.border) }
}

/**
 * Mean of all states given the standard deviations, exactly: Q^-1 h.
 *
 * @param sigma - shape (scales)
 * @returns shape (stateWidth), on the score's own scale
 */
export function conditionalMean(problem: FitProblem, sigma: Float64Array, work: StateWorkspace): Float64Array {
  logEvidence(problem, sigma, work.evidence)
  const { precision, vector } = work.evidence
  solveBackward(precision, vector, work.solution)
  const mean = new Float64Array(stateWidth(problem))
  mean.set(work.solution.walk)
  mean.set(work.solution.fixed, work.solution.walk.length)
  return mean
}

/**
 * Joint draws of all states given the standard deviations, exactly: L'^-1 (u + z), z standard normal
 * (Rue and Held 2005, Gaussian Markov Random Fields, algorithm 2.4). Rows with the same standard deviations side by side
 * share one factor. Where the coder's errors are undone, each row first draws what they are from its stream (`drawWeights`).
 *
 * @param sigmas - shape (n, scales)
 * @param generatorOf - the random stream of a row
 * @returns shape (n, stateWidth)
 */
export function drawStates(problem: FitProblem, sigmas: Float64Array, generatorOf: (row: number) => Generator): Float64Array {
  const work = createStateWorkspace(problem)
  const { precision, vector } = work.evidence
  const d = problem.scales.length
  const width = stateWidth(problem)
  const n = sigmas.length / d
  const out = new Float64Array(n * width)
  const disturbed = createBorderedVector(problem.steps, 1 + problem.walks, problem.border)
  const mean = problem.cells.mean.slice()
  const ofRow: FitProblem = { ...problem, cells: { ...problem.cells, mean } }
  for (let row = 0; row < n; row++) {
    const generator = generatorOf(row)
    if (problem.coder !== null) fillMeans(problem.coder, problem.cells, drawWeights(problem.coder, generator), mean)
    if (row === 0 || problem.coder !== null || !sameRow(sigmas, row, d)) logEvidence(ofRow, sigmas.subarray(row * d, (row + 1) * d), work.evidence)
    for (let i = 0; i < vector.walk.length; i++) disturbed.walk[i] = vector.walk[i] + generator.normal()
    for (let i = 0; i < vector.fixed.length; i++) disturbed.fixed[i] = vector.fixed[i] + generator.normal()
    solveBackward(precision, disturbed, work.solution)
    out.set(work.solution.walk, row * width)
    out.set(work.solution.fixed, row * width + work.solution.walk.length)
  }
  return out
}

function sameRow(sigmas: Float64Array, row: number, d: number): boolean {
  for (let j = row * d; j < (row + 1) * d; j++) if (sigmas[j] !== sigmas[j - d]) return false
  return true
}

/**
 * Covariance of linear functions of the states given the standard deviations, exactly: C Q^-1 C' through L^-1 C'.
 *
 * @param functions - rows c_i over the states, each of shape (stateWidth)
 * @returns shape (n, n)
 */
export function conditionalCovariance(problem: FitProblem, sigma: Float64Array, functions: readonly Float64Array[], work: StateWorkspace): Float64Array {
  logEvidence(problem, sigma, work.evidence)
  const { precision, scratch } = work.evidence
  const walkLength = problem.steps * (1 + problem.walks)
  const solved = functions.map((c) => {
    const vector = { walk: c.slice(0, walkLength), fixed: c.slice(walkLength) }
    solveForward(precision, vector, scratch)
    return vector
  })
  const n = functions.length
  const out = new Float64Array(n * n)
  for (let i = 0; i < n; i++) {
    for (let j = 0; j <= i; j++) {
      const sum = dot(solved[i].walk, solved[j].walk) + dot(solved[i].fixed, solved[j].fixed)
      out[i * n + j] = sum
      out[j * n + i] = sum
    }
  }
  return out
}

function dot(a: Float64Array, b: Float64Array): number {
  let sum = 0
  for (let i = 0; i < a.length; i++) sum += a[i] * b[i]
  return sum
}
