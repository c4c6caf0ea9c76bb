import { createGenerator } from '../../model/random/generator.ts'
import { correlation } from '../../model/statistics/correlation.ts'
import { analyseHere } from '../support/analyse-reference.ts'
import { simulateCells, type SimulationOptions } from '../support/simulate-cells.ts'

const steps = 78

/** Venues drift and the mix shifts while opinion goes its own way, all drawn from the model. */
export const drawn: SimulationOptions = {
  steps, venues: 4, topics: 3, posters: 2, mentionsPerStep: 1000,
  sigmas: { mu: 0.025, venueDrift: [0.015, 0.004, 0.003, 0.008], venue: 0.2, topic: 0.25, poster: 0.15, tau: 0.03 },
  mix: {
    venue: { from: [0.2, 0.3, 0.3, 0.2], to: [0.5, 0.15, 0.15, 0.2] },
    topic: { from: [0.6, 0.3, 0.1], to: [0.2, 0.3, 0.5] },
    poster: { from: [0.7, 0.3], to: [0.4, 0.6] },
  },
}

/**
 * Opinion rises by 12 points in waves; the first venue sours by 25 and grows from a fifth of the mentions to half; the others
 * nearly stand still. (Where all venues wander, no amount of posts tells opinion from what they do together.)
 */
export const againstTheMix: SimulationOptions = {
  ...drawn,
  sigmas: { mu: 0.025, venueDrift: [0.015, 0.002, 0.001, 0.003], venue: 0.2, topic: 0.25, poster: 0.15, tau: 0.03 },
  paths: {
    mu: Float64Array.from({ length: steps }, (_, t) => 0.12 * t / steps + 0.05 * Math.sin(t / 6)),
    drift: [Float64Array.from({ length: steps }, (_, t) => -0.25 * t / (steps - 1)), null, null, null],
  },
}

/** Opinion and venues stand still: only the mix moves. */
export const mixOnly: SimulationOptions = {
  ...drawn,
  paths: { mu: new Float64Array(steps), drift: Array.from({ length: 4 }, () => new Float64Array(steps)) },
}

/** What one run of a scenario showed. */
export interface Run {
  /** Correlation over steps with true opinion. */
  readonly adjusted: number
  readonly raw: number
  /** Whether the interval of the last change holds the true one. */
  readonly covered: boolean
  /** Whether a change was announced. */
  readonly announced: boolean
}

/** Simulate, analyse, compare with the truth. */
export async function runScenario(scenario: SimulationOptions, seed: number, run: number): Promise<Run> {
  const { tables, truth } = simulateCells(scenario, createGenerator(seed, run))
  const { opinion } = await analyseHere(tables, { seed: run })
  const { current } = tables.timeline
  const mean = (period: number) => {
    const steps = truth.adjusted.filter((_, t) => tables.timeline.periodOf[t] === period)
    return 100 * steps.reduce((a, b) => a + b, 0) / steps.length
  }
  const change = mean(current) - mean(current - 1)
  const seen = opinion.series.flatMap((step, t) => (step.raw === null ? [] : [{ truth: truth.adjusted[t], adjusted: step.adjusted.mean, raw: step.raw }]))
  const against = (key: 'adjusted' | 'raw') => correlation(seen.map((step) => step[key]), seen.map((step) => step.truth)) ?? 0
  return {
    adjusted: against('adjusted'), raw: against('raw'),
    covered: opinion.change!.low <= change && change <= opinion.change!.high,
    announced: opinion.movement !== 'not-established',
  }
}
