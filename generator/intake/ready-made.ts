import type { Period } from '../../model/intake/intake-tables.ts'
import type { Account, CellSource } from '../account/account.ts'
import { dayNumber } from '../calendar/days.ts'
import { midpointDay, nextStep, type Grid } from '../calendar/grid.ts'
import { InputFault, type Fault } from '../faults/fault.ts'
import type { CellPart } from './cell-part.ts'
import { readCellFile } from './cell-source.ts'
import type { Database } from './database.ts'
import type { InputFile } from './input-file.ts'
import type { LevelReader } from './level-names.ts'

/** All ready-made cells of an account, before a period is chosen. */
export interface ReadyMade {
  readonly parts: readonly CellPart[]
  /** Data rows by path of the file. */
  readonly rows: ReadonlyMap<string, number>
}

/** Read every cell table of the account. @throws {InputFault} with the faults of all of them */
export async function readReadyMade(database: Database, account: Account, files: ReadonlyMap<string, InputFile>, levelOf: LevelReader): Promise<ReadyMade> {
  const parts: CellPart[] = []
  const rows = new Map<string, number>()
  const faults: Fault[] = []
  for (const source of account.mentions.filter((candidate): candidate is CellSource => candidate.kind === 'cells')) {
    const seen = new Map<string, string>()
    for (const path of source.files) {
      try {
        const read = await readCellFile(database, account, source, files.get(path)!, levelOf, seen)
        for (const part of read.parts) parts.push(part)
        rows.set(path, read.rows)
      } catch (error) {
        if (!(error instanceof InputFault)) throw error
        faults.push(...error.faults)
      }
    }
  }
  if (faults.length > 0) throw new InputFault(faults)
  return { parts, rows }
}

/**
 * The cells that the review of a period reads. A cell does not say on which days of its step people posted: it is
 * dated by the step's midpoint, as its belonging to a period is.
 */
export function cellsWithin(parts: readonly CellPart[], grid: Grid, review: Period): readonly CellPart[] {
  const end = dayNumber(review.end)
  return parts.filter((part) => midpointDay(grid, part.step) <= end)
}

/** First and last day that cells cover, or null where there is none. */
export function daysOf(parts: readonly CellPart[], grid: Grid): { readonly first: number; readonly last: number } | null {
  if (parts.length === 0) return null
  const [first, last] = parts.reduce(([low, high], { step }) => [Math.min(low, step), Math.max(high, step)], [Infinity, -Infinity])
  return { first: first!, last: nextStep(grid, last!) - 1 }
}
