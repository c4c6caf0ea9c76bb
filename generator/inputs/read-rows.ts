import type { Account, FileSet } from '../account/account.ts'
import { InputFault, type Fault } from '../faults/fault.ts'
import { readTable, type CsvRow, type CsvTable, type TableColumns } from './csv-table.ts'
import type { ReadFile } from './raw-inputs.ts'

/** What was read of one input, and what is wrong with it; `value` means something only where nothing is. */
export interface Input<T> {
  readonly value: T | null
  readonly files: readonly ReadFile[]
  readonly faults: readonly Fault[]
}

export const notGiven = { value: null, files: [], faults: [] } as const

/** The part of an input that is there in any case. */
export type Read<T> = Input<T> & { readonly value: T }

/** All files of an input, cut into fields; of those that can't be, the faults. */
export async function readTables(account: Account, source: FileSet, columns: TableColumns): Promise<Read<readonly CsvTable[]>> {
  const cut = await cutFiles(account, source, columns)
  return { value: tablesOf(cut), files: filesOf(cut), faults: cut.flatMap((file) => ('path' in file ? [] : file.faults)) }
}

/** The sound rows of a table, and what is wrong with it and with the others. */
export function soundRows<T extends object>(table: CsvTable, read: (row: CsvRow) => T | readonly Fault[]): { readonly rows: readonly T[]; readonly faults: readonly Fault[] } {
  const rows: T[] = []
  const faults: Fault[] = [...table.faults]
  for (const row of table.rows) {
    const result = read(row)
    if (Array.isArray(result)) faults.push(...(result as readonly Fault[]))
    else rows.push(result as T)
  }
  return { rows, faults }
}

/** The sound rows of all files of an input. */
export async function readRows<T extends object>(
  account: Account, source: FileSet, columns: TableColumns, read: (row: CsvRow) => T | readonly Fault[],
): Promise<Read<readonly T[]>> {
  const cut = await cutFiles(account, source, columns)
  // File by file, so that faults stand in the order in which one reads.
  const sound = cut.map((file) => ('path' in file ? soundRows(file, read) : { rows: [], faults: file.faults }))
  return { value: sound.flatMap(({ rows }) => rows), files: filesOf(cut), faults: sound.flatMap(({ faults }) => faults) }
}

type CutFile = CsvTable | { readonly faults: readonly Fault[] }

async function cutFiles(account: Account, { files }: FileSet, columns: TableColumns): Promise<readonly CutFile[]> {
  const cut: CutFile[] = []
  for (const path of files) {
    try {
      cut.push(await readTable(account.folder, path, columns))
    } catch (error) {
      if (!(error instanceof InputFault)) throw error
      cut.push({ faults: error.faults })
    }
  }
  return cut
}

function tablesOf(cut: readonly CutFile[]): readonly CsvTable[] {
  return cut.filter((file) => 'path' in file)
}

function filesOf(cut: readonly CutFile[]): readonly ReadFile[] {
  return tablesOf(cut).map(({ path, sha256, rows }) => ({ path, sha256, rows: rows.length }))
}
