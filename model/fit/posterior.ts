import { drawWeights, type VenueWeights } from '../coder/rescore.ts'
import { createGenerator } from '../random/generator.ts'
import type { FitExecutor } from './executor.ts'
import type { FitProblem } from './problem.ts'
import { resample } from './resample.ts'
import { sampleScales, type SampledScales, type WeightedSigmas } from './scales.ts'

/*
 * The posterior of everything:
 *
 *   standard deviations, weighted (scales.ts) ──resampled──▶ an exact draw of all states for each
 */
export interface Posterior extends SampledScales {
  readonly problem: FitProblem
  /** Equally weighted joint draws: what is said about states comes from these; about the standard deviations, from `sigmas`. */
  readonly draws: StateDraws
  /** Shape (draws): what each coded label is worth in the draw; null where nothing is corrected. */
  readonly weights: readonly VenueWeights[] | null
}

export interface StateDraws {
  readonly count: number
  /** Shape (count, stateWidth). */
  readonly states: Float64Array
  /** Shape (count, scales): the standard deviations each draw was made with. */
  readonly sigmas: Float64Array
}

export interface PosteriorOptions {
  readonly seed: number
  /** Weighted proposals, all rounds together. */
  readonly proposals: number
  /** Joint draws of the states. */
  readonly draws: number
  /** Called as the work goes on: 0 to 1. */
  readonly progress?: (share: number) => void
}

/** Streams of the seed: one per purpose, the draws of the states from the last one on. */
const streams = { rounds: 0, resampling: 1, states: 16 } as const
/** Effective draws of the standard deviations below which more are made. */
const leastEffective = 1000

export async function samplePosterior(problem: FitProblem, executor: FitExecutor, options: PosteriorOptions): Promise<Posterior> {
  const progress = options.progress ?? (() => undefined)
  const scales = await sampleScales(problem, executor, createGenerator(options.seed, streams.rounds), {
    proposals: options.proposals, leastEffective, progress: (share) => { progress(0.1 + 0.5 * share) },
  })
  progress(0.6)
  const draws = await drawJointly(problem, executor, scales.sigmas, options)
  progress(1)
  return { problem, draws, ...scales, weights: weightsOfDraws(problem, options) }
}

/** As the draws of the states made them: from the beginning of the same streams. */
function weightsOfDraws({ coder }: FitProblem, { draws, seed }: PosteriorOptions): readonly VenueWeights[] | null {
  return coder === null ? null : Array.from({ length: draws }, (_, row) => drawWeights(coder, createGenerator(seed, streams.states + row)))
}

/** Equally weighted rows, and one exact draw of all states for each. */
async function drawJointly(problem: FitProblem, executor: FitExecutor, from: WeightedSigmas, options: PosteriorOptions): Promise<StateDraws> {
  const d = problem.scales.length
  const chosen = resample(from.weights, options.draws, createGenerator(options.seed, streams.resampling))
  const sigmas = new Float64Array(options.draws * d)
  chosen.forEach((row, i) => { sigmas.set(from.values.subarray(row * d, (row + 1) * d), i * d) })
  return { count: options.draws, sigmas, states: await executor.states(sigmas, options.seed, streams.states) }
}
