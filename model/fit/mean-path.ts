import { createGenerator } from '../random/generator.ts'
import { localExecutor } from './executor.ts'
import type { FitProblem } from './problem.ts'
import { resample } from './resample.ts'
import { sampleScales } from './scales.ts'
import { conditionalMean, createStateWorkspace } from './states.ts'

/** Streams of the seed, apart from those of a full fit. */
const streams = { rounds: 4, resampling: 5 } as const
/** What a mean asks for is far less than what an interval does: its error is a small part of the spread that the standard deviations cause. */
const effort = { proposals: 400, leastEffective: 100, points: 64 } as const

/**
 * Posterior mean of mu at every step: the conditional mean is exact given the standard deviations, and averaged over them.
 *
 * @returns shape (steps), on the score's own scale
 */
export async function meanPath(problem: FitProblem, seed: number): Promise<Float64Array> {
  const { sigmas } = await sampleScales(problem, localExecutor(problem), createGenerator(seed, streams.rounds), effort)
  const d = problem.scales.length
  const block = 1 + problem.walks
  const work = createStateWorkspace(problem)
  const path = new Float64Array(problem.steps)
  const chosen = resample(sigmas.weights, effort.points, createGenerator(seed, streams.resampling))
  const times = new Map<number, number>()
  for (const row of chosen) times.set(row, (times.get(row) ?? 0) + 1)
  for (const [row, count] of times) {
    const mean = conditionalMean(problem, sigmas.values.subarray(row * d, (row + 1) * d), work)
    for (let t = 0; t < path.length; t++) path[t] += count / effort.points * mean[t * block]
  }
  return path
}
