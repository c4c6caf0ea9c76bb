import { availableParallelism } from 'node:os'
import { analyse, type Analysis, type AnalysisSpec } from '../../model/analyse.ts'
import type { CompetitorTables } from '../../model/competitors/competitor-tables.ts'
import type { FitProblem } from '../../model/fit/problem.ts'
import { findingsSchema, type Findings } from '../../model/findings/schema.ts'
import type { Past } from '../../model/past/past.ts'
import type { SmallInputs } from '../../model/inputs/small-inputs.ts'
import type { IntakeTables } from '../../model/intake/intake-tables.ts'
import type { Refit } from '../../model/survey/rolling-forecast.ts'
import type { Account } from '../account/account.ts'
import type { Cache } from '../cache/cache.ts'
import { faultOf } from '../faults/catalogue.ts'
import { InputFault } from '../faults/fault.ts'
import { startFitThreads, type FitThreads } from '../threads/fit-threads.ts'
import { startRefitThreads } from '../threads/refit-threads.ts'
import { wordFindings } from '../words/word-findings.ts'
import type { Words } from '../words/words.ts'
import type { Progress } from './stages.ts'

/** All that the figures rest on. */
export interface ReviewInputs {
  readonly tables: IntakeTables
  readonly small: SmallInputs
  /** What was sealed before; null before the first seal. */
  readonly past: Past | null
  /** null where the account gives none. */
  readonly competitors: CompetitorTables | null
  /** The files that the small inputs were read from. */
  readonly files: readonly Findings['inputs'][number][]
}

export interface FitOptions {
  readonly seed: number
  readonly version: string
  /** Threads of the fit; the findings do not depend on it. Default: the machine's. */
  readonly threads?: number | undefined
  readonly cache: Cache
  readonly progress: Progress
}

/** Tables and inputs ──model──▶ analysis ──worded──▶ findings, checked against their schema. */
export async function makeFindings(account: Account, inputs: ReviewInputs, words: Words, options: FitOptions): Promise<Findings> {
  const spec = specOf(account, options.seed, inputs)
  const worded = (analysis: Analysis): Findings => findingsSchema.parse({
    ...wordFindings(analysis, words),
    account: account.account, brand: account.brand, locale: account.locale,
    inputs: [...inputs.tables.accounting.inputs, ...inputs.files].map((input) => ({ ...input })),
    program: { version: options.version, seed: options.seed },
  })
  // whatever template, words and theme say, the figures are the same
  const analysis = await options.cache.remember('analyses', [inputs.tables, inputs.small, inputs.files, keyOf(spec)], () => compute(inputs, spec, options), (written) => {
    const restored = analysisOf(written)
    // one that can't be worded is none: what this throws leads to a fresh one
    if (restored !== null) worded(restored)
    return restored
  })
  return worded(analysis)
}

/** A sealed review is known by its manifest, which holds the hash of all that is read of it. */
function keyOf({ past, ...spec }: AnalysisSpec) {
  return [spec, past === null ? null : [past.definition, past.program, past.reviews.map(({ manifest }) => manifest)]]
}

const analysisShape = findingsSchema.omit({ account: true, brand: true, locale: true, inputs: true, program: true, caveats: true, advice: true }).extend({
  caveats: findingsSchema.shape.caveats.element.pick({ code: true, severity: true, figures: true }).array(),
  advice: findingsSchema.shape.advice.element.omit({ action: true, evidence: true, success: true }).array(),
})

/** An analysis that was written down, if it has the shape of one. */
function analysisOf(written: unknown): Analysis | null {
  return analysisShape.safeParse(written).data ?? null
}

function specOf(account: Account, seed: number, { past, competitors }: Pick<ReviewInputs, 'past' | 'competitors'>): AnalysisSpec {
  return {
    interval: account.interval, seed, past, competitors,
    targetMix: Object.fromEntries(account.targetMix.map(({ factor, shares }) => [factor, Object.fromEntries(shares.map(({ level, share }) => [level, share]))])),
    facts: {
      smallestGroup: account.smallestGroup, posterBounds: account.posters, preparedBy: account.preparedBy, reviewedBy: account.reviewedBy,
      timeZone: account.timeZone, reporting: account.reporting, labelScores: labelScoresOf(account),
    },
  }
}

/** Scores of the labels of the first source that has any, each once. */
function labelScoresOf({ mentions }: Account): readonly number[] | null {
  const labelled = mentions.find((source) => source.kind === 'mentions' && source.score.kind === 'labels')
  if (labelled?.kind !== 'mentions' || labelled.score.kind !== 'labels') return null
  const scores = [...new Set(labelled.score.labels.map(({ score }) => score))].sort((a, b) => a - b)
  return scores.length < 2 ? null : scores
}

async function compute({ tables, small }: ReviewInputs, spec: AnalysisSpec, { threads = Math.min(8, availableParallelism()), cache, progress }: FitOptions): Promise<Analysis> {
  const fits: FitThreads[] = []
  const closing: Promise<void>[] = []
  const refits = startRefitThreads(threads)
  const executorFor = (problem: FitProblem) => {
    // one fit after another: the threads of the one before have done their work
    closing.push(...fits.splice(0).map((before) => before.close()))
    const started = startFitThreads(problem, threads)
    fits.push(started)
    return started.executor
  }
  const refit: Refit = (problem, seed) => cache.remember('forecasts', [problem, seed], () => refits.refit(problem, seed), pathOf(problem.steps))
  try {
    return await analyse(tables, small, spec, { executorFor, refit }, { draws: progress.draws, forecasts: progress.forecasts })
  } finally {
    await Promise.all([...closing, ...[...fits, refits].map((started) => started.close())])
  }
}

/** A path that was written down: as many finite numbers as there are steps, or it is not used. */
function pathOf(steps: number): (written: unknown) => Float64Array | null {
  return (written) => (Array.isArray(written) && written.length === steps && written.every((value) => typeof value === 'number' && Number.isFinite(value)) ? Float64Array.from(written as number[]) : null)
}

/**
 * What a fit needs of the time axis, asked before it begins.
 *
 * @throws {InputFault} `period-empty`, `base-empty`: no step's middle lies in the period under review, or in the base
 */
export function requireSteps(account: Account, { timeline }: IntakeTables): void {
  const span = { first: timeline.steps[0], last: timeline.lastMention }
  if (timeline.current < 0) throw new InputFault([faultOf('period-empty', '--period', { name: timeline.review.name, ...span })])
  if (!timeline.inBase.includes(1)) throw new InputFault([faultOf('base-empty', account.places['base'] ?? 'account.yaml', { ...timeline.base, ...span })])
}
