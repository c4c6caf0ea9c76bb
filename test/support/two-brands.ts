import type { CompetitorTables } from '../../model/competitors/competitor-tables.ts'
import { readCompetitors } from '../../model/competitors/read-competitors.ts'
import type { Findings } from '../../model/findings/schema.ts'
import { targetMix } from '../../model/cells/target-mix.ts'
import { effortFor } from '../../model/fit/effort.ts'
import { localExecutor } from '../../model/fit/executor.ts'
import { samplePosterior } from '../../model/fit/posterior.ts'
import { prepareFit } from '../../model/fit/prepare-fit.ts'
import type { IntakeTables } from '../../model/intake/intake-tables.ts'
import { createGenerator } from '../../model/random/generator.ts'
import { createReading } from '../../model/reading/context.ts'
import { simulateCells, type Simulation, type SimulationOptions } from './simulate-cells.ts'

const shape = { steps: 26, venues: 3, topics: 2, posters: 2, mentionsPerStep: 150, sigmas: 'prior' } as const

export interface TwoBrands {
  readonly own: Simulation
  readonly other: Simulation
  /** In points: the brand's opinion less the competitor's at the brand's base mix, and how far that moved since the period before. */
  readonly difference: number
  readonly changeDifference: number
}

/** Two brands drawn apart, each from the model and its priors, unless told otherwise. */
export function twoBrands(seed: number, options: Partial<SimulationOptions> = {}): TwoBrands {
  const [own, other] = [0, 1].map((stream) => simulateCells({ ...shape, ...options }, createGenerator(seed, stream)))
  const { timeline } = own.tables
  const mix = targetMix(own.tables)
  const levelOf = ({ truth }: Simulation, period: number) => {
    const steps = timeline.steps.flatMap((_, t) => (timeline.periodOf[t] === period ? [t] : []))
    const standing = truth.offsets.reduce((sum, offsets, f) => sum + mix.shares[f].reduce((inner, share, l) => inner + share * offsets[l], 0), 0)
    return 100 * (steps.reduce((sum, t) => sum + truth.mu[t], 0) / steps.length + standing)
  }
  const gapAt = (period: number) => levelOf(own, period) - levelOf(other, period)
  return { own, other, difference: gapAt(timeline.current), changeDifference: gapAt(timeline.current) - gapAt(timeline.current - 1) }
}

/** The comparison as an analysis makes it, in this thread. */
export async function compareHere(own: IntakeTables, competitors: CompetitorTables, seed = 1): Promise<NonNullable<Findings['competitors']>> {
  const { fitted, sampling, problem } = prepareFit(own, null)
  const posterior = await samplePosterior(problem, localExecutor(problem), { seed, ...effortFor(problem) })
  const reading = createReading(own, fitted, targetMix(own), sampling, posterior, 0.9)
  return readCompetitors(reading, competitors, null, { seed, interval: 0.9, smallestGroup: 10 }, localExecutor)
}
