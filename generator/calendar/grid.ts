import { firstOfMonth, mondayOf, monthOf } from './days.ts'

/** The width of a step of the time axis; a week begins on Monday. */
export type Grid = 'day' | 'week' | 'month'

/** Length of a step in days; a month's is 365.25 / 12. */
export function stepDays(grid: Grid): number {
  return { day: 1, week: 7, month: 30.4375 }[grid]
}

/** Day number on which the step that holds `day` begins. */
export function stepStart(grid: Grid, day: number): number {
  if (grid === 'day') return day
  if (grid === 'week') return mondayOf(day)
  const { year, month } = monthOf(day)
  return firstOfMonth(year, month)
}

/** Day number on which the step after the one that begins on `start` begins. */
export function nextStep(grid: Grid, start: number): number {
  if (grid === 'day') return start + 1
  if (grid === 'week') return start + 7
  const { year, month } = monthOf(start)
  return firstOfMonth(year, month + 1)
}

/** The day that holds the midpoint of a step: of a week its Thursday, of a month of 31 days its 16th. */
export function midpointDay(grid: Grid, start: number): number {
  return Math.floor((start + nextStep(grid, start)) / 2)
}

/** Day numbers on which steps begin, from the one that holds `first` to the one that holds `last`. */
export function stepsBetween(grid: Grid, first: number, last: number): readonly number[] {
  const steps: number[] = []
  for (let start = stepStart(grid, first); start <= last; start = nextStep(grid, start)) steps.push(start)
  return steps
}

/** Which step holds a day, counted from the one that begins on `first`: below 0 before it. @example stepIndex('month', 0, 59) // => 2 */
export function stepIndex(grid: Grid, first: number, day: number): number {
  if (grid === 'day') return day - first
  if (grid === 'week') return (mondayOf(day) - first) / 7
  const [from, to] = [monthOf(first), monthOf(day)]
  return (to.year - from.year) * 12 + to.month - from.month
}
