import type { Findings } from '../findings/schema.ts'
import { average, combine, difference, sum } from './draw-columns.ts'
import { sumByStep, sumCells, type CellSum } from './cell-sums.ts'
import type { Reading } from './context.ts'
import { movementOf } from './movement.ts'
import { points, scaled } from './summarise.ts'

/** The window of a venue's slope, and the time its slope is told for, in days. */
const slopeWindow = 91
const slopeUnit = 28

type Venue = Findings['venues'][number]

/** Every venue: level at the target mix of the other factors, drift, slope, raw mean, spread, share. */
export function readVenues(reading: Reading): Venue[] {
  const totals = mentionTotals(reading)
  return reading.tables.factors[0].levels.map((_, v) => readVenue(reading, v, totals))
}

interface Totals {
  readonly period: number
  readonly previous: number
  readonly base: number
}

function readVenue(reading: Reading, v: number, totals: Totals): Venue {
  const { tables, columns, summary, centre, baseSteps, periodSteps, previousSteps } = reading
  const { timeline, factors, authors, accounting, cells } = tables
  const { name, label, anchor } = factors[0].levels[v]
  const ofVenue = (c: number) => cells.levels[0][c] === v
  const fixed = combine([columns.offset[0][v], ...centre.slice(1)], new Float64Array(centre.length).fill(1), columns.count)
  const level = columns.mu.map((mu, t) => sum(sum(mu, columns.drift[v][t]), fixed))
  const over = (of: readonly Float64Array[], steps: readonly number[]) => average(steps.map((t) => of[t]))
  const drift = difference(over(columns.drift[v], periodSteps), over(columns.drift[v], baseSteps))
  const driftEstimate = summary.estimate(drift)
  const slope = readSlope(reading, level)
  const byStep = sumByStep(tables, ofVenue)
  const seen = timeline.steps.filter((_, t) => byStep.mentions[t] > 0)
  const sums = sumsOf(reading, (c) => ofVenue(c))
  const history = byStep.mentions.reduce((a, b) => a + b, 0)
  return {
    venue: name, label, anchor: anchor === true,
    mentions: sums.period.mentions, mentions_previous: sums.previous?.mentions ?? 0,
    authors: authors.byPeriodLevel[0][timeline.current * factors[0].levels.length + v],
    share: shareOf(sums.period.mentions, totals.period),
    share_previous: sums.previous === null ? null : shareOf(sums.previous.mentions, totals.previous),
    share_base: shareOf(sums.base.mentions, totals.base),
    authors_known: history === 0 ? 0 : Math.min(1, accounting.withAuthor[v] / history),
    raw: scaled(sums.period.raw), raw_previous: scaled(sums.previous?.raw ?? null),
    level: summary.estimate(over(level, periodSteps)),
    level_previous: previousSteps === null ? null : summary.estimate(over(level, previousSteps)),
    level_base: summary.estimate(over(level, baseSteps)),
    drift: driftEstimate, movement: movementOf(driftEstimate),
    slope, slope_movement: slope === null ? null : movementOf(slope),
    probability_drift_down: summary.probabilityAbove(drift.map((x) => -x)),
    spread: scaled(sums.period.spread),
    spread_change: sums.period.spread === null || sums.previous?.spread == null ? null : points * (sums.period.spread - sums.previous.spread),
    offset: summary.estimate(difference(columns.offset[0][v], centre[0])),
    first_step: seen[0], last_step: seen[seen.length - 1],
    series: timeline.steps.map((step, t) => ({
      step, level: summary.estimate(level[t]), drift: summary.estimate(columns.drift[v][t]), raw: scaled(byStep.raw[t]), mentions: byStep.mentions[t],
    })),
  }
}

/** Least-squares slope of the level over the last 13 weeks to the period's end, per 4 weeks; null with fewer than three steps. */
function readSlope(reading: Reading, level: readonly Float64Array[]) {
  const { tables: { timeline }, columns, summary, periodSteps } = reading
  const last = periodSteps[periodSteps.length - 1]
  const first = Math.max(0, last - Math.round(slopeWindow / timeline.stepDays) + 1)
  const n = last - first + 1
  if (n < 3) return null
  const middle = (n - 1) / 2
  const squares = n * (n * n - 1) / 12
  const weights = Float64Array.from({ length: n }, (_, i) => ((i - middle) / squares) * (slopeUnit / timeline.stepDays))
  return summary.estimate(combine(level.slice(first, last + 1), weights, columns.count))
}

/** Cell sums of the period, the one before and the base. */
export function sumsOf(reading: Reading, holds: (c: number) => boolean): { period: CellSum; previous: CellSum | null; base: CellSum } {
  const { tables, previousSteps } = reading
  const { cells, timeline } = tables
  const inPeriod = (p: number) => (c: number) => timeline.periodOf[cells.step[c]] === p && holds(c)
  return {
    period: sumCells(tables, inPeriod(timeline.current)),
    previous: previousSteps === null ? null : sumCells(tables, inPeriod(timeline.current - 1)),
    base: sumCells(tables, (c) => timeline.inBase[cells.step[c]] === 1 && holds(c)),
  }
}

/** All mentions of the period, the one before and the base. */
export function mentionTotals(reading: Reading): Totals {
  const all = sumsOf(reading, () => true)
  return { period: all.period.mentions, previous: all.previous?.mentions ?? 0, base: all.base.mentions }
}

export function shareOf(part: number, whole: number): number {
  return whole === 0 ? 0 : part / whole
}
