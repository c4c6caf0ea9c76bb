import type { GivenMargins } from './cells/target-mix.ts'
import { targetMix } from './cells/target-mix.ts'
import { ruleCaveats } from './caveats/rule-caveats.ts'
import type { RuledCaveat, Unruled } from './caveats/rule.ts'
import { createOutlook, readHearing } from './advice/hearing.ts'
import { readAdvice } from './advice/read-advice.ts'
import { effortFor } from './fit/effort.ts'
import type { FitExecutor } from './fit/executor.ts'
import { samplePosterior } from './fit/posterior.ts'
import { prepareFit } from './fit/prepare-fit.ts'
import type { FitProblem } from './fit/problem.ts'
import type { IntakeTables } from './intake/intake-tables.ts'
import { createReading } from './reading/context.ts'
import { readCoder } from './reading/coder.ts'
import { readDecomposition } from './reading/decomposition.ts'
import { readDiagnostics } from './reading/diagnostics.ts'
import { readLevels } from './reading/levels.ts'
import { readAccounting, readMethod, readPeriodSteps, type AccountFacts } from './reading/method.ts'
import { readOpinion } from './reading/opinion.ts'
import { readScales } from './reading/scales.ts'
import { readSensitivity } from './reading/sensitivity.ts'
import { readSpeaking } from './reading/speaking.ts'
import { readVenues } from './reading/venues.ts'
import type { SmallInputs, SurveyInput } from './inputs/small-inputs.ts'
import { heardBy, readBenchmark } from './customers/benchmark.ts'
import { readImportance } from './customers/importance.ts'
import { readTipping } from './customers/tipping.ts'
import { readVolume } from './customers/volume.ts'
import type { CompetitorTables } from './competitors/competitor-tables.ts'
import { readCompetitors } from './competitors/read-competitors.ts'
import { maskSmallGroups } from './findings/mask.ts'
import { readOutcome } from './outcome/read-outcome.ts'
import type { Past } from './past/past.ts'
import { lookBack } from './past/look-back.ts'
import { readSurvey } from './survey/read-survey.ts'
import { mostForecasts, type Refit } from './survey/rolling-forecast.ts'

/*
 *   intake tables ──▶ sampling variance ──▶ problem ──▶ posterior ──▶ reading ──▶ opinion, decomposition, venues, ...
 *                └──▶ target mix ─────────────────────────────────────────┘ └──▶ survey, outcome ──▶ caveats
 *   competitors ──▶ a fit each, as the brand's ──▶ beside the brand's reading
 *   small inputs ───────────────────────────────────────────────────────────────────┘
 */

/** What an analysis is asked for, besides the tables. */
export interface AnalysisSpec {
  readonly interval: number
  readonly seed: number
  readonly targetMix: GivenMargins
  /** What was sealed before; null before the first seal. */
  readonly past: Past | null
  /** null where the account gives none. */
  readonly competitors: CompetitorTables | null
  readonly facts: AccountFacts
}

/** Who does the heavy work: this thread or others. What it yields does not depend on that. */
export interface Workers {
  readonly executorFor: (problem: FitProblem) => FitExecutor
  /** `meanPath`: for every forecast of a survey wave one. */
  readonly refit: Refit
}

/** Called as the work goes on, 0 to 1: the draws of the fit, then the forecasts of survey waves. */
export interface AnalysisProgress {
  readonly draws?: ((share: number) => void) | undefined
  readonly forecasts?: ((share: number) => void) | undefined
}

/** Everything of the findings that is computed; the caveats not yet worded. */
export type Analysis = Unruled & { readonly caveats: readonly RuledCaveat[] }

/**
 * From intake tables and small inputs to findings, pure: same tables, inputs, spec and seed, same result to the last bit, whoever works.
 *
 * @throws {ModelError} `base-empty`, `period-empty`, `cells-empty`
 */
export async function analyse(
  tables: IntakeTables, inputs: SmallInputs, spec: AnalysisSpec, workers: Workers, progress: AnalysisProgress = {},
): Promise<Analysis> {
  const { audited, fitted, sampling, problem } = prepareFit(tables, inputs.audit)
  const mix = targetMix(tables, spec.targetMix)
  const posterior = await samplePosterior(problem, workers.executorFor(problem), { seed: spec.seed, ...effortFor(problem), ...(progress.draws && { progress: progress.draws }) })
  const reading = createReading(tables, fitted, mix, sampling, posterior, spec.interval)
  const { timeline } = tables
  const survey = inputs.survey === null ? null : await readSurvey(reading, inputs.survey, inputs.events ?? [], counted(workers.refit, inputs.survey, progress.forecasts), spec)
  const opinion = readOpinion(reading)
  const outlook = createOutlook(reading, spec.interval)
  const { smallestGroup } = spec.facts
  const findings: Omit<Unruled, 'advice' | 'revisions' | 'follow_up'> = {
    schema: 'tareline-findings/1',
    period: timeline.review, previous_period: reading.previousSteps === null ? null : timeline.periods[timeline.current - 1],
    period_steps: readPeriodSteps(reading),
    grid: timeline.grid, interval: spec.interval,
    accounting: readAccounting(tables),
    opinion,
    decomposition: readDecomposition(reading, spec.interval),
    venues: readVenues(reading),
    topics: readLevels(reading, 'topic').map(({ name, ...rest }) => ({ topic: name, ...rest })),
    posters: readLevels(reading, 'poster').map(({ name, ...rest }) => ({ poster: name, ...rest })),
    factors: tables.factors.filter(({ name }) => !['venue', 'topic', 'poster'].includes(name))
      .map(({ name }) => ({ factor: name, levels: readLevels(reading, name).map(({ name: level, ...rest }) => ({ level, ...rest })) })),
    scales: readScales(posterior, spec.interval),
    survey,
    events: inputs.events?.map(({ date, label, kind }) => ({ date, label, kind })) ?? null,
    outcome: inputs.outcome === null || inputs.outcome.spans.length === 0 ? null : readOutcome(reading, inputs.outcome, spec.interval),
    speaking: readSpeaking(tables, spec.interval, smallestGroup),
    benchmark: inputs.benchmark === null || tables.segments === null ? null : readBenchmark(heardBy(tables.segments, inputs.benchmark), spec.interval, smallestGroup),
    importance: inputs.importance === null ? null : readImportance(reading, inputs.importance, smallestGroup),
    volume: readVolume(opinion, survey, inputs.customers, smallestGroup),
    tipping: readTipping(reading, spec.interval),
    coder: readCoder(reading, audited, inputs.audit !== null, spec.facts.labelScores, spec.interval),
    competitors: spec.competitors === null ? null : await readCompetitors(reading, spec.competitors, inputs.audit, { ...spec, smallestGroup }, workers.executorFor),
    sensitivity: readSensitivity(reading), hearing: readHearing(outlook),
    diagnostics: readDiagnostics(reading, spec.seed, spec.interval),
    method: readMethod(reading, spec.facts),
  }
  const advice = readAdvice(outlook, findings, inputs.benchmark, smallestGroup)
  const masked = maskSmallGroups({ ...findings, advice, revisions: null, follow_up: null }, tables, smallestGroup)
  const unruled: Unruled = { ...masked, ...lookBack(spec.past, reading, masked, inputs.audit) }
  return { ...unruled, caveats: ruleCaveats({ findings: unruled, reading }) }
}

/** The same refits, told as they are done. */
function counted(refit: Refit, { waves }: SurveyInput, progress: (share: number) => void = () => undefined): Refit {
  // waves that begin in the same step share a refit
  const expected = Math.min(mostForecasts, new Set(waves.map(({ startStep }) => startStep)).size)
  let done = 0
  return async (problem, seed) => {
    const path = await refit(problem, seed)
    progress(Math.min(1, ++done / expected))
    return path
  }
}
