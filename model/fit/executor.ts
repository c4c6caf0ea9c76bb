import { createGenerator } from '../random/generator.ts'
import { createWorkspace, logEvidence } from './evidence.ts'
import type { FitProblem } from './problem.ts'
import { drawStates } from './states.ts'

/**
 * The heavy work of a fit, in batches whose rows do not depend on each other. Who calls does not know whether one thread
 * does it or several: every row is computed alike, and every draw has a random stream of its own.
 */
export interface FitExecutor {
  /** Log marginal likelihood of every row of `sigmas`, shape (n, scales) in, (n) out. */
  evidence(sigmas: Float64Array): Promise<Float64Array>
  /** One draw of all states for every row; row i uses stream `firstStream + i` of `seed`. Shape (n, stateWidth). */
  states(sigmas: Float64Array, seed: number, firstStream: number): Promise<Float64Array>
}

/** The same work in this thread. */
export function localExecutor(problem: FitProblem): FitExecutor {
  return {
    evidence: (sigmas) => Promise.resolve(evidenceRows(problem, sigmas)),
    states: (sigmas, seed, firstStream) => Promise.resolve(stateRows(problem, sigmas, seed, firstStream)),
  }
}

/** What one thread does for `FitExecutor.evidence`. */
export function evidenceRows(problem: FitProblem, sigmas: Float64Array): Float64Array {
  const d = problem.scales.length
  const work = createWorkspace(problem)
  const out = new Float64Array(sigmas.length / d)
  for (let i = 0; i < out.length; i++) {
    const value = logEvidence(problem, sigmas.subarray(i * d, (i + 1) * d), work)
    out[i] = Number.isNaN(value) ? -Infinity : value
  }
  return out
}

/** What one thread does for `FitExecutor.states`. */
export function stateRows(problem: FitProblem, sigmas: Float64Array, seed: number, firstStream: number): Float64Array {
  return drawStates(problem, sigmas, (row) => createGenerator(seed, firstStream + row))
}
