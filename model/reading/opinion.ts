import type { Findings } from '../findings/schema.ts'
import { average, difference } from './draw-columns.ts'
import { sumByStep, sumCells } from './cell-sums.ts'
import { stepsOfPeriod, type Reading } from './context.ts'
import { movementOf } from './movement.ts'
import { points, scaled } from './summarise.ts'

/** Mix-adjusted opinion by step and by period, its change, and the raw average beside it. */
export function readOpinion(reading: Reading): Findings['opinion'] {
  const { tables, adjusted, summary, columns, baseSteps, periodSteps, previousSteps } = reading
  const { timeline, authors } = tables
  const pick = (steps: readonly number[]) => average(steps.map((t) => adjusted[t]))
  const base = pick(baseSteps)
  const baseMu = average(baseSteps.map((t) => columns.mu[t]))
  const byStep = sumByStep(tables)
  const inPeriod = new Set(periodSteps)

  const series = timeline.steps.map((step, t) => ({
    step, adjusted: summary.estimate(adjusted[t]),
    // the offsets cancel: from mu alone the difference is exact
    since_base: summary.estimate(difference(columns.mu[t], baseMu)),
    raw: scaled(byStep.raw[t]), mentions: byStep.mentions[t], authors: authors.byStep[t], in_period: inPeriod.has(t),
  }))
  // a step that begins in the period may have its middle in the next one: that one is not reviewed yet
  const periods = timeline.periods.slice(0, timeline.current + 1).flatMap((period, p) => {
    const steps = stepsOfPeriod(tables, p)
    if (steps.length === 0) return []
    const level = pick(steps)
    const before = p === 0 ? [] : stepsOfPeriod(tables, p - 1)
    const sums = sumCells(tables, (c) => timeline.periodOf[tables.cells.step[c]] === p)
    return [{
      period: period.name, adjusted: summary.estimate(level), since_base: summary.estimate(difference(level, base)),
      change: before.length === 0 ? null : summary.estimate(difference(level, pick(before))), raw: scaled(sums.raw), mentions: sums.mentions, authors: authors.byPeriod[p],
    }]
  })
  const now = pick(periodSteps)
  const change = previousSteps === null ? null : difference(now, pick(previousSteps))
  const changeEstimate = change === null ? null : summary.estimate(change)
  const sinceBase = summary.estimate(difference(now, base))
  const rawNow = rawOf(reading, timeline.current)
  const rawBefore = previousSteps === null ? null : rawOf(reading, timeline.current - 1)
  return {
    series, periods,
    period: summary.estimate(now),
    previous: previousSteps === null ? null : summary.estimate(pick(previousSteps)),
    previous_sealed: null,
    change: changeEstimate,
    probability_up: change === null ? null : summary.probabilityAbove(change),
    movement: changeEstimate === null ? null : movementOf(changeEstimate),
    since_base: sinceBase, movement_since_base: movementOf(sinceBase),
    raw: scaled(rawNow.raw),
    raw_previous: scaled(rawBefore?.raw ?? null),
    raw_change: rawNow.raw === null || rawBefore === null || rawBefore.raw === null ? null : points * (rawNow.raw - rawBefore.raw),
    mentions: rawNow.mentions, mentions_previous: rawBefore?.mentions ?? 0,
    authors: authors.byPeriod[timeline.current],
  }
}

function rawOf(reading: Reading, period: number) {
  const { tables } = reading
  return sumCells(tables, (c) => tables.timeline.periodOf[tables.cells.step[c]] === period)
}
