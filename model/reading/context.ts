import type { SamplingVariance } from '../cells/sampling-variance.ts'
import type { TargetMix } from '../cells/target-mix.ts'
import type { Posterior } from '../fit/posterior.ts'
import type { IntakeTables } from '../intake/intake-tables.ts'
import { ModelError } from '../model-error.ts'
import { combine, drawColumns, sum, type DrawColumns } from './draw-columns.ts'
import { createSummariser, type Summariser } from './summarise.ts'

/** What every reading of the posterior reads from. */
export interface Reading {
  /** As coded: what is counted and averaged raw. */
  readonly tables: IntakeTables
  /** As the fit takes them: the coder's errors undone, where an audit allows it. */
  readonly fitted: IntakeTables
  readonly mix: TargetMix
  readonly sampling: SamplingVariance
  readonly posterior: Posterior
  readonly columns: DrawColumns
  readonly summary: Summariser
  /** Shape (factors) of (draws): each factor's mean offset at the target mix. */
  readonly centre: readonly Float64Array[]
  /** A[t], shape (steps) of (draws). */
  readonly adjusted: readonly Float64Array[]
  readonly baseSteps: readonly number[]
  /** Steps of the period under review. */
  readonly periodSteps: readonly number[]
  /** Steps of the period before; null where there is none. */
  readonly previousSteps: readonly number[] | null
}

/**
 * @param interval - probability inside every interval
 * @throws {ModelError} `base-empty`, `period-empty`: no step's midpoint lies in the base, or in the period
 */
export function createReading(tables: IntakeTables, fitted: IntakeTables, mix: TargetMix, sampling: SamplingVariance, posterior: Posterior, interval: number): Reading {
  const { timeline } = tables
  const columns = drawColumns(tables, posterior)
  const centre = mix.shares.map((shares, f) => combine(columns.offset[f], shares, columns.count))
  const common = combine(centre, new Float64Array(centre.length).fill(1), columns.count)
  const baseSteps = stepsWhere(timeline.steps.length, (t) => timeline.inBase[t] === 1)
  const periodSteps = stepsOfPeriod(tables, timeline.current)
  if (baseSteps.length === 0) throw new ModelError('base-empty', `Unexpected base ${timeline.base.from} to ${timeline.base.to}, expected it to hold the midpoint of a step`)
  if (periodSteps.length === 0) throw new ModelError('period-empty', `Unexpected period ${timeline.review.name}, expected it to hold the midpoint of a step`)
  return {
    tables, fitted, mix, sampling, posterior, columns, centre,
    summary: createSummariser(interval, columns.count),
    adjusted: columns.mu.map((mu) => sum(mu, common)),
    baseSteps, periodSteps,
    previousSteps: timeline.current < 1 ? null : stepsOfPeriod(tables, timeline.current - 1),
  }
}

/** Indices of the steps whose midpoint lies in a period. */
export function stepsOfPeriod(tables: IntakeTables, period: number): number[] {
  return stepsWhere(tables.timeline.steps.length, (t) => tables.timeline.periodOf[t] === period)
}

function stepsWhere(count: number, holds: (t: number) => boolean): number[] {
  return Array.from({ length: count }, (_, t) => t).filter(holds)
}
