import type { DayWindow } from '../inputs/small-inputs.ts'

/** A series on the grid; where its weight is 0 there is no value. */
export interface StepSeries {
  /** Shape (steps). */
  readonly value: Float64Array
  /** Shape (steps), >= 0: 1 for a level, mentions for an average of mentions. */
  readonly weight: Float64Array
}

/** Part of a window that must lie inside the grid for it to have a partner (model.md 5). */
const leastInside = 0.5

/**
 * The partner of a wave: the mean of a series over the wave's fieldwork moved back by a lag, day by day. Days outside the grid are left
 * out if they are less than half.
 *
 * @param lag - in steps; above 0 the series comes first
 * @param end - steps of the series that may be looked at: those before this one
 * @returns null where there is no partner
 */
export function partnerOf(series: StepSeries, window: DayWindow, lag: number, end: number = series.value.length): number | null {
  const from = window.startStep - lag
  let [all, inside, weight, sum] = [0, 0, 0, 0]
  for (let i = 0; i < window.days.length; i++) {
    const t = from + i
    const days = window.days[i]
    all += days
    if (t < 0 || t >= end) continue
    inside += days
    weight += days * series.weight[t]
    sum += days * series.weight[t] * series.value[t]
  }
  return inside >= leastInside * all && weight > 0 ? sum / weight : null
}

/**
 * What a forecast may take as the partner: the part of the moved window that lies before the fieldwork began, and before the
 * series ends; where nothing of it does (no lead), the last step before.
 *
 * @param path - shape (steps known)
 * @param lag - at least 0, in steps
 */
export function knownPartnerOf(path: Float64Array, window: DayWindow, lag: number): number | null {
  const end = Math.min(window.startStep, path.length)
  if (end < 1) return null
  const from = window.startStep - lag
  let [before, inside, sum] = [0, 0, 0]
  for (let i = 0; i < window.days.length && from + i < end; i++) {
    before += window.days[i]
    if (from + i < 0) continue
    inside += window.days[i]
    sum += window.days[i] * path[from + i]
  }
  if (before === 0) return path[end - 1]
  return inside >= leastInside * before ? sum / inside : null
}
