import type { Estimate, Findings } from '../findings/schema.ts'
import type { IntakeTables, Timeline } from '../intake/intake-tables.ts'
import type { Reading } from '../reading/context.ts'
import { average, combine, difference, type DrawColumns } from '../reading/draw-columns.ts'
import { movementOf } from '../reading/movement.ts'
import { createSummariser } from '../reading/summarise.ts'
import type { SharedMix } from './shared-mix.ts'

type Brand = NonNullable<Findings['competitors']>['brands'][number]
/** What is said of a competitor's opinion. */
export type OpinionBeside = Pick<Brand, 'level' | 'own_level' | 'difference' | 'probability_above' | 'change' | 'since_base' | 'series'>

const unmoved: Brand['change'] = { own: null, level: null, movement: null, difference: null, difference_movement: null }
export const noOpinion: OpinionBeside = {
  level: null, own_level: null, difference: { level: null, movement: null }, probability_above: null, change: unmoved, since_base: unmoved, series: [],
}

/** Of the base's steps the competitor's history has to hold this part, or nothing is said of its change since. */
const leastOfBase = 0.5

/**
 * Opinion of the brand beside a competitor's at one mix: level, change and change since the base of each, and their differences, brand less competitor.
 *
 * The two fits are separate and their draws independent: the i-th of one is set beside the i-th of the other. What moves both brands alike and venue by venue
 * is in neither's opinion; what moves both everywhere is in both, and falls out of the difference. An audit's errors, the same for both brands, are drawn
 * for each apart: with an audit, differences of levels are told a little less exactly than they are known. Each span of time is read over the steps that
 * both histories have.
 *
 * @param reading - of the brand
 * @param tables - of the competitor, with as many authors in the period as may be shown
 * @param columns - the competitor's draws
 * @param smallestGroup - fewest authors of the competitor in a period that is told
 */
export function compareOpinion(reading: Reading, tables: IntakeTables, columns: DrawColumns, mix: SharedMix, interval: number, smallestGroup: number): OpinionBeside {
  const { timeline } = reading.tables
  const draws = Math.min(reading.columns.count, columns.count)
  const summary = createSummariser(interval, draws)
  const paired = pairing(timeline, tables.timeline)
  const [own, other] = [levelOf(reading.columns, mix.own, draws), levelOf(columns, mix.other, draws)]
  const levels = (steps: readonly number[]): Pair | null => {
    const both = steps.flatMap((t) => paired[t] ?? [])
    return both.length === 0 ? null : { own: own(both.map(([t]) => t)), other: other(both.map(([, t]) => t)) }
  }
  const authors = (name: string) => authorsIn(tables, name)
  const told = (periods: readonly string[]) => periods.reduce((sum, name) => sum + authors(name), 0) >= smallestGroup
  const now = levels(reading.periodSteps)
  if (now === null) return noOpinion
  const moved = (before: Pair | null): Brand['change'] => (before === null ? unmoved : movesOf(summary.estimate, { own: difference(now.own, before.own), other: difference(now.other, before.other) }))
  const previous = reading.previousSteps !== null && told([timeline.periods[timeline.current - 1].name]) ? levels(reading.previousSteps) : null
  const inBase = reading.baseSteps.filter((t) => paired[t] !== null)
  const basePeriods = [...new Set(inBase.map((t) => timeline.periods[timeline.periodOf[t]].name))]
  const base = inBase.length >= leastOfBase * reading.baseSteps.length && told(basePeriods) ? levels(inBase) : null
  const gap = difference(now.own, now.other)
  const level = summary.estimate(gap)
  return {
    level: summary.estimate(now.other), own_level: summary.estimate(now.own), difference: { level, movement: movementOf(level) }, probability_above: summary.probabilityAbove(gap),
    change: moved(previous), since_base: moved(base),
    series: timeline.periods.slice(0, timeline.current + 1).flatMap(({ name }, p) => {
      const steps = paired.flatMap((_, t) => (timeline.periodOf[t] === p ? [t] : []))
      if (steps.length === 0) return []
      const both = told([name]) ? levels(steps) : null
      return [{ period: name, own: summary.estimate(own(steps)), level: both === null ? null : summary.estimate(both.other) }]
    }),
  }
}

interface Pair {
  readonly own: Float64Array
  readonly other: Float64Array
}

function movesOf(estimate: (draws: Float64Array) => Estimate, { own, other }: Pair): Brand['change'] {
  const [level, gap] = [estimate(other), estimate(difference(own, other))]
  return { own: estimate(own), level, movement: movementOf(level), difference: gap, difference_movement: movementOf(gap) }
}

/** Mean of A over steps at a mix, in the first so many draws. */
function levelOf(columns: DrawColumns, shares: readonly Float64Array[], draws: number): (steps: readonly number[]) => Float64Array {
  const first = (column: Float64Array) => column.subarray(0, draws)
  const common = combine(shares.map((of, f) => combine(columns.offset[f], of, columns.count)), new Float64Array(shares.length).fill(1), columns.count)
  return (steps) => combine([average(steps.map((t) => first(columns.mu[t]))), first(common)], [1, 1], draws)
}

/** For each step of the brand the same step of both, or null where the competitor's history lacks it. */
function pairing(own: Timeline, other: Timeline): readonly (readonly [readonly [number, number]] | null)[] {
  const at = new Map(other.steps.map((step, t) => [step, t]))
  return own.steps.map((step, t) => {
    const there = at.get(step)
    return there === undefined ? null : [[t, there]]
  })
}

/** Authors of a period by its name; 0 where the history lacks it. */
export function authorsIn({ timeline, authors }: IntakeTables, period: string): number {
  const p = timeline.periods.findIndex(({ name }) => name === period)
  return p < 0 ? 0 : authors.byPeriod[p]
}

