import type { GivenMargins } from './cells/target-mix.ts'
import { targetMix } from './cells/target-mix.ts'
import { samplingVariance } from './cells/sampling-variance.ts'
import { ruleCaveats } from './caveats/rule-caveats.ts'
import type { RuledCaveat, Unruled } from './caveats/rule.ts'
import { buildProblem } from './fit/build-problem.ts'
import { effortFor } from './fit/effort.ts'
import type { FitExecutor } from './fit/executor.ts'
import { samplePosterior } from './fit/posterior.ts'
import type { FitProblem } from './fit/problem.ts'
import type { IntakeTables } from './intake/intake-tables.ts'
import { createReading } from './reading/context.ts'
import { readDecomposition } from './reading/decomposition.ts'
import { readDiagnostics } from './reading/diagnostics.ts'
import { readLevels } from './reading/levels.ts'
import { readAccounting, readMethod, readPeriodSteps, type AccountFacts } from './reading/method.ts'
import { readOpinion } from './reading/opinion.ts'
import { readScales } from './reading/scales.ts'
import { readSpeaking } from './reading/speaking.ts'
import { readVenues } from './reading/venues.ts'

/*
 *   intake tables ──▶ sampling variance ──▶ problem ──▶ posterior ──▶ reading ──▶ opinion, decomposition, venues, ...
 *                └──▶ target mix ─────────────────────────────────────────┘                  └──▶ caveats
 */

/** What an analysis is asked for, besides the tables. */
export interface AnalysisSpec {
  readonly interval: number
  readonly seed: number
  readonly targetMix: GivenMargins
  readonly facts: AccountFacts
}

/** Everything of the findings that is computed; the caveats not yet worded. */
export type Analysis = Unruled & { readonly caveats: readonly RuledCaveat[] }

/**
 * From intake tables to findings, pure: same tables, spec and seed, same result to the last bit, whoever executes.
 *
 * @param executorFor - who does the heavy work of the fit
 * @throws {ModelError} `base-empty`, `period-empty`, `cells-empty`
 */
export async function analyse(
  tables: IntakeTables, spec: AnalysisSpec, executorFor: (problem: FitProblem) => FitExecutor, progress: (share: number) => void = () => undefined,
): Promise<Analysis> {
  const sampling = samplingVariance(tables)
  const mix = targetMix(tables, spec.targetMix)
  const problem = buildProblem(tables, sampling.variance)
  const posterior = await samplePosterior(problem, executorFor(problem), { seed: spec.seed, ...effortFor(problem), progress })
  const reading = createReading(tables, mix, sampling, posterior, spec.interval)
  const { timeline } = tables
  const findings: Unruled = {
    schema: 'tareline-findings/1',
    period: timeline.review, previous_period: reading.previousSteps === null ? null : timeline.periods[timeline.current - 1],
    period_steps: readPeriodSteps(reading),
    grid: timeline.grid, interval: spec.interval,
    accounting: readAccounting(tables, spec.facts),
    opinion: readOpinion(reading),
    decomposition: readDecomposition(reading),
    venues: readVenues(reading),
    topics: readLevels(reading, 'topic').map(({ name, ...rest }) => ({ topic: name, ...rest })),
    posters: readLevels(reading, 'poster').map(({ name, ...rest }) => ({ poster: name, ...rest })),
    factors: tables.factors.filter(({ name }) => !['venue', 'topic', 'poster'].includes(name))
      .map(({ name }) => ({ factor: name, levels: readLevels(reading, name).map(({ name: level, ...rest }) => ({ level, ...rest })) })),
    scales: readScales(posterior, spec.interval),
    survey: null, speaking: readSpeaking(tables), benchmark: null, advice: [],
    diagnostics: readDiagnostics(reading, spec.seed, spec.interval),
    method: readMethod(reading, spec.facts),
  }
  return { ...findings, caveats: ruleCaveats({ findings, reading, givenNotUsed: spec.facts.givenNotUsed }) }
}
