import { isDate, isoDate, dayNumber } from '../calendar/days.ts'
import { stepStart, type Grid } from '../calendar/grid.ts'
import type { CellPart } from './cell-part.ts'

/** The columns of a ready-made cell table besides its factors. */
export const cellColumns = { needed: ['step', 'mentions', 'authors', 'mean'], optional: ['variance', 'deff'] } as const

/** What is wrong with a value of a row: its column, the value as it stands, what it must be. */
export interface CellComplaint {
  readonly column: string
  readonly actual: string
  readonly expected: string
}

/** A row of a ready-made cell table, or everything that is wrong with it. */
export function cellRow(field: (column: string) => string, factors: readonly string[], grid: Grid): CellPart | readonly CellComplaint[] {
  const complaints: CellComplaint[] = []
  const read = (column: string, holds: (value: number) => boolean, expected: string): number => {
    const text = field(column)
    const value = text === '' ? Number.NaN : Number(text)
    if (!holds(value)) complaints.push({ column, actual: text, expected })
    return value
  }
  const start = field('step')
  const step = isDate(start) ? dayNumber(start) : Number.NaN
  if (!(step === stepStart(grid, step))) complaints.push({ column: 'step', actual: start, expected: beginning(grid, step) })
  const mentions = read('mentions', (n) => Number.isSafeInteger(n) && n >= 1, 'a whole number of at least 1')
  const authors = read('authors', (n) => Number.isSafeInteger(n) && n >= 1 && !(n > mentions), 'a whole number from 1 to that of mentions')
  const mean = read('mean', (y) => y >= -1 && y <= 1, 'a number from -1 to 1')
  const variance = field('variance') === '' ? Number.NaN : read('variance', (s2) => s2 >= 0 && s2 < Infinity, 'a number of at least 0, or nothing')
  const deff = field('deff') === '' ? 1 : read('deff', (d) => d >= 1 && d < Infinity, 'a number of at least 1, or nothing')
  if (complaints.length > 0) return complaints
  const freedom = Number.isNaN(variance) ? 0 : mentions - 1
  const levels = factors.map((factor) => field(factor) || (factor === 'poster' ? 'unknown' : 'none'))
  return { step, levels, mentions, authors, mean, squares: freedom === 0 ? 0 : variance * freedom, freedom, clustering: 1, deff, labels: [] }
}

function beginning(grid: Grid, day: number): string {
  const nearest = Number.isNaN(day) ? '' : `, such as ${isoDate(stepStart(grid, day))}`
  if (grid === 'day') return 'an ISO date'
  return grid === 'week' ? `the ISO date of a Monday${nearest}` : `the ISO date of the first of a month${nearest}`
}
