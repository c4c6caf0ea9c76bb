import type { Account, CellSource } from '../account/account.ts'
import { isoDate } from '../calendar/days.ts'
import { faultOf } from '../faults/catalogue.ts'
import { InputFault, type Fault } from '../faults/fault.ts'
import type { CellPart } from './cell-part.ts'
import { cellColumns, cellRow } from './cell-row.ts'
import type { Database } from './database.ts'
import type { InputFile } from './input-file.ts'
import { tidyValue, type LevelReader } from './level-names.ts'
import { lineNumbers } from './record-lines.ts'
import { malformedRows } from './malformed-rows.ts'
import { relationOf } from './relation.ts'

export interface CellFile {
  readonly parts: readonly CellPart[]
  readonly rows: number
}

/** Faults shown of one file; a file with more is broken as a whole. */
const mostFaults = 100

/**
 * Read a file of ready-made cells. Unlike mentions, of which some may always be unreadable, a cell table was made for
 * this: every wrong value is a fault.
 *
 * @param seen - places of the cells read so far from the same source; added to
 * @throws {InputFault} `cell-value`, `cell-twice`, `cell-row`, and those of `relationOf`
 */
export async function readCellFile(
  database: Database, account: Account, source: CellSource, file: InputFile, levelOf: LevelReader, seen: Map<string, string>,
): Promise<CellFile> {
  const wanted = [...cellColumns.needed, 'venue']
  const optional = [...cellColumns.optional, ...account.factors.filter((factor) => factor !== 'venue')]
  const present = await presentColumns(database, file, wanted, optional, source)
  const { sql, column, cut } = await relationOf(database, file, present, source)
  const rows = await database.rows<Record<string, string | null>>(`SELECT ${present.map((name, index) => `${column(name)} AS f${index}`).join(', ')} FROM ${sql}`)
  const malformed = cut === null ? [] : await malformedRows(database)
  const lines = cut === null ? null : await lineNumbers(file.readable, cut, rows.map((_, index) => index), malformed.map((row) => row.offset))
  const faults: Fault[] = malformed.map((row, index) => faultOf('cell-row', `${file.path}:${lines!.malformed[index]}`, { reason: row.reason }))
  const parts: CellPart[] = []
  for (const [index, row] of rows.entries()) {
    const place = `${file.path}:${lines === null ? index + 1 : lines.sound[index]}`
    const part = cellRow((name) => tidyValue(row[`f${present.indexOf(name)}`] ?? ''), account.factors, account.grid)
    if ('length' in part) {
      faults.push(...part.map(({ column: at, actual, expected }) => faultOf('cell-value', `${place} ${at}`, { actual, expected })))
      continue
    }
    const levels = part.levels.map((level, factor) => levelOf(account.factors[factor]!, level, part.mentions))
    const key = JSON.stringify([part.step, ...levels])
    const first = seen.get(key)
    if (first !== undefined) faults.push(faultOf('cell-twice', place, { cell: [isoDate(part.step), ...levels].join(', '), first }))
    seen.set(key, place)
    parts.push({ ...part, levels })
  }
  if (faults.length > 0) throw new InputFault(faults.slice(0, mostFaults))
  return { parts, rows: rows.length }
}

/** The columns of the table that mean something; of the factors only `venue` must be there. */
async function presentColumns(database: Database, file: InputFile, wanted: readonly string[], optional: readonly string[], source: CellSource): Promise<readonly string[]> {
  const { header } = await relationOf(database, file, wanted, source)
  return [...wanted, ...optional.filter((name) => header.includes(name))]
}
