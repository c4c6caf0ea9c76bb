import type { DayWindow } from '../../model/inputs/small-inputs.ts'
import { dayNumber } from './days.ts'
import { nextStep, stepIndex, stepsBetween, type Grid } from './grid.ts'

/**
 * A stretch of days on a grid.
 *
 * @param first - day number on which the first step of the grid begins
 * @param start - first day, an ISO date; `end` the last, on or after it
 */
export function dayWindow(grid: Grid, first: number, start: string, end: string): DayWindow {
  const [from, to] = [dayNumber(start), dayNumber(end)]
  const steps = stepsBetween(grid, from, to)
  return {
    start, end, startStep: stepIndex(grid, first, from),
    days: Float64Array.from(steps, (step) => Math.min(nextStep(grid, step) - 1, to) - Math.max(step, from) + 1),
  }
}
