import { samplingVariance } from '../cells/sampling-variance.ts'
import { buildProblem } from '../fit/build-problem.ts'
import { levelAt } from '../fit/level-at.ts'
import { conditionalMean, createStateWorkspace } from '../fit/states.ts'
import type { FitProblem } from '../fit/problem.ts'
import type { CellColumns, Factor, IntakeTables } from '../intake/intake-tables.ts'
import { stepsOfPeriod } from '../reading/context.ts'
import { points } from '../reading/summarise.ts'

/** How the present review reads tables: everything but the tables themselves. */
export interface PresentReading {
  /** Of the present review, as coded. */
  readonly tables: IntakeTables
  /** Undo the coder's errors, as far as the present audit allows it. */
  readonly correct: (tables: IntakeTables) => IntakeTables
  /** Posterior mean of each standard deviation, by its name. */
  readonly sigma: ReadonlyMap<string, number>
  /** Target mix, by factor and level. */
  readonly shares: ReadonlyMap<string, ReadonlyMap<string, number>>
}

/** Level of a past period's opinion, in points, all by the present reading and with the same standard deviations. */
export interface LevelsOfPast {
  /** From the tables of then. */
  readonly then: number
  /** From those of now, as far as the review of then read: what changed in the tables, and nothing after them. */
  readonly completed: number
  /** From all of those of now. */
  readonly now: number
}

/**
 * How far a past period's level moves with what came in for the steps of then, and with what came after them. Given the standard deviations each level is
 * exact, one solve; the three have the same ones, so that their differences are the posts' alone. The last step of then may have been cut by its
 * period's end: its cells stay those of then in `completed`, and what completes the step counts as having come after.
 *
 * @param then - tables of then by the definition of now
 * @returns null where the period has no step in one of the two
 */
export function levelsOfPast(reading: PresentReading, then: IntakeTables, period: string): LevelsOfPast | null {
  const { tables: now } = reading
  const until = then.timeline.steps.at(-1)
  if (until === undefined || !now.timeline.steps.includes(until)) return null
  const [stepsThen, stepsNow] = [stepsOf(then, period), stepsOf(now, period)]
  if (stepsThen.length === 0 || stepsNow.length === 0) return null
  return {
    then: levelOf(reading, then, stepsThen),
    completed: levelOf(reading, upTo(now, then, now.timeline.steps.indexOf(until)), stepsNow),
    now: levelOf(reading, now, stepsNow),
  }
}

function stepsOf(tables: IntakeTables, period: string): readonly number[] {
  return stepsOfPeriod(tables, tables.timeline.periods.findIndex(({ name }) => name === period))
}

function levelOf({ correct, sigma, shares }: PresentReading, tables: IntakeTables, steps: readonly number[]): number {
  const fitted = correct(tables)
  const problem = buildProblem(fitted, samplingVariance(fitted).variance)
  const mean = conditionalMean(problem, sigmaOf(problem, sigma), createStateWorkspace(problem))
  const weights = levelAt(problem, tables.factors, steps, tables.factors.map(({ name, levels }) => Float64Array.from(levels, (level) => shares.get(name)?.get(level.name) ?? 0)))
  return points * weights.reduce((total, weight, i) => total + weight * mean[i], 0)
}

/** A standard deviation that the present fit does not have, of a venue that is gone, is taken at two thirds of its prior's, about its median. */
function sigmaOf(problem: FitProblem, sigma: ReadonlyMap<string, number>): Float64Array {
  return Float64Array.from(problem.scales, ({ name, prior }) => sigma.get(name) ?? 2 / 3 * prior)
}

/** The tables of now up to a step of theirs; the step itself as it was then, if it was cut then. */
function upTo(now: IntakeTables, then: IntakeTables, last: number): IntakeTables {
  const wasCut = then.timeline.lastDays.at(-1)! < now.timeline.lastDays[last]
  const own = cellsWhere(now.cells, (t) => (wasCut ? t < last : t <= last))
  const cut = wasCut ? cellsWhere(then.cells, (t) => t === then.timeline.steps.length - 1) : []
  const factors = now.factors.map((factor, f) => withLevels(factor, then.factors[f]))
  const place = (from: readonly Factor[], f: number) => Int32Array.from(from[f].levels, ({ name }) => factors[f].levels.findIndex((level) => level.name === name))
  const rows = [...own.map((c) => ({ of: now, c })), ...cut.map((c) => ({ of: then, c }))]
  const column = (name: Exclude<keyof CellColumns, 'count' | 'step' | 'levels'>) => Float64Array.from(rows, ({ of, c }) => of.cells[name][c])
  const k = now.labels?.names.length ?? 0
  return {
    ...now, factors,
    timeline: { ...now.timeline, steps: now.timeline.steps.slice(0, last + 1) },
    variation: factors[0].levels.map(({ name }) => variationOf(now, name) ?? variationOf(then, name)),
    labels: now.labels === null || then.labels === null ? null : { ...now.labels, counts: Float64Array.from({ length: rows.length * k }, (_, i) => {
      const { of, c } = rows[Math.floor(i / k)]
      return of.labels!.counts[c * k + i % k]
    }) },
    cells: {
      count: rows.length, step: Int32Array.from(rows, ({ of, c }) => (of === now ? now.cells.step[c] : last)),
      levels: factors.map((_, f) => {
        const [ofNow, ofThen] = [place(now.factors, f), place(then.factors, f)]
        return Int32Array.from(rows, ({ of, c }) => (of === now ? ofNow : ofThen)[of.cells.levels[f][c]])
      }),
      mentions: column('mentions'), authors: column('authors'), mean: column('mean'), squares: column('squares'), freedom: column('freedom'),
      clustering: column('clustering'), deff: column('deff'),
    },
  }
}

function cellsWhere({ step, count }: CellColumns, holds: (step: number) => boolean): readonly number[] {
  return Array.from({ length: count }, (_, c) => c).filter((c) => holds(step[c]))
}

/** With the levels of another that it has not, sorted by name. */
function withLevels(factor: Factor, other: Factor): Factor {
  const more = other.levels.filter(({ name }) => !factor.levels.some((level) => level.name === name))
  return { ...factor, levels: [...factor.levels, ...more].sort((a, b) => (a.name < b.name ? -1 : 1)) }
}

function variationOf({ factors, variation }: IntakeTables, venue: string) {
  return variation[factors[0].levels.findIndex(({ name }) => name === venue)] ?? null
}
