import type { Findings } from '../../model/findings/schema.ts'

type Grid = Findings['grid']

const dayLength = 864e5
const time = (iso: string) => Date.parse(`${iso}T00:00:00Z`)
const iso = (milliseconds: number) => new Date(milliseconds).toISOString().slice(0, 10)

/** The day in the middle of fieldwork, the earlier of two; ISO dates, first and last day inclusive. */
export function middleOf(start: string, end: string): string {
  return iso(time(start) + Math.floor((time(end) - time(start)) / dayLength / 2) * dayLength)
}

/**
 * The day in the middle of a step, moved by so many steps of the grid.
 *
 * @param step - first day of the step, ISO date
 * @param by - whole steps; above 0 later
 */
export function movedMiddle(step: string, by: number, grid: Grid): string {
  const first = new Date(time(step))
  const at = (index: number) => grid === 'month'
    ? Date.UTC(first.getUTCFullYear(), first.getUTCMonth() + index, first.getUTCDate())
    : first.getTime() + index * (grid === 'week' ? 7 : 1) * dayLength
  return middleOf(iso(at(by)), iso(at(by + 1) - dayLength))
}
