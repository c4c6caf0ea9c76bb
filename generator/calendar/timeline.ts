import type { Period, Timeline } from '../../model/intake/intake-tables.ts'
import { dayNumber, firstOfMonth, isoDate, monthOf } from './days.ts'
import { midpointDay, nextStep, stepDays, stepsBetween, stepStart, type Grid } from './grid.ts'
import { periodHolding, type Reporting } from './periods.ts'

/** First and last day, inclusive, as ISO dates. */
export interface DateRange {
  readonly from: string
  readonly to: string
}

export interface TimelineInput {
  readonly grid: Grid
  readonly reporting: Reporting
  /** As the account gives it; null for the first 12 months of mentions. */
  readonly base: DateRange | null
  /** Day numbers of the first and the last mention that the review reads; where only its step is known, of that. */
  readonly firstDay: number
  readonly lastDay: number
  readonly review: Period
}

/** The time axis from the first to the last step that holds a mention: a step belongs to what holds its midpoint. */
export function timeline(input: TimelineInput): Timeline {
  const starts = stepsBetween(input.grid, input.firstDay, input.lastDay)
  const midpoints = starts.map((start) => midpointDay(input.grid, start))
  const base = input.base ?? defaultBase(input, midpoints)
  const periods: Period[] = []
  const periodOf = Int32Array.from(midpoints, (day) => {
    const last = periods.at(-1)
    if (last === undefined || day > dayNumber(last.end)) periods.push(periodHolding(input.reporting, day))
    return periods.length - 1
  })
  const [from, to] = [dayNumber(base.from), dayNumber(base.to)]
  return {
    grid: input.grid,
    stepDays: stepDays(input.grid),
    steps: starts.map(isoDate),
    lastDays: starts.map((start) => isoDate(Math.min(nextStep(input.grid, start) - 1, dayNumber(input.review.end)))),
    lastMention: isoDate(input.lastDay),
    quietDays: Math.max(0, dayNumber(input.review.end) - input.lastDay),
    periods,
    periodOf,
    inBase: Uint8Array.from(midpoints, (day) => (day >= from && day <= to ? 1 : 0)),
    base,
    current: periods.findIndex((period) => period.name === input.review.name),
    review: input.review,
  }
}

/** The first twelve months of mentions; from the beginning of their step where, of so short a history, they would hold no midpoint. */
function defaultBase({ grid, firstDay, review }: TimelineInput, midpoints: readonly number[]): DateRange {
  const base = firstYear(firstDay, review)
  return midpoints.some((day) => day >= dayNumber(base.from) && day <= dayNumber(base.to)) ? base : firstYear(stepStart(grid, firstDay), review)
}

/** Twelve months from a day, or as much of them as ends with the period under review. */
function firstYear(first: number, review: Period): DateRange {
  const { year, month } = monthOf(first)
  const dayOfMonth = first - firstOfMonth(year, month)
  const end = Math.min(firstOfMonth(year, month + 12) + dayOfMonth, firstOfMonth(year, month + 13)) - 1
  return { from: isoDate(first), to: isoDate(Math.max(first, Math.min(end, dayNumber(review.end)))) }
}
