import { closest } from 'fastest-levenshtein'
import { faultOf } from '../faults/catalogue.ts'
import { InputFault } from '../faults/fault.ts'
import { csvForm, type StatedForm } from './csv-header.ts'
import { identifier, literal, type Database } from './database.ts'
import type { InputFile } from './input-file.ts'
import { malformedRows } from './malformed-rows.ts'
import type { Cut } from './record-lines.ts'

/** A file as SQL can select from it, every field as text. */
export interface Relation {
  readonly sql: string
  /** SQL that gives a column of the file as VARCHAR. */
  readonly column: (name: string) => string
  readonly header: readonly string[]
  /** SQL BOOLEAN: the row could be picked apart. */
  readonly sound: string
  /** How the records of a text are cut; null for Parquet. */
  readonly cut: Cut | null
}

/**
 * The relation of a file. Of CSV, rows that cannot be cut into the header's fields go to `reject_errors`.
 *
 * @param wanted - columns that the file must have; of NDJSON each must be in some line
 * @throws {InputFault} `columns-absent`, `header-twice`, `file-unreadable`
 */
export async function relationOf(database: Database, file: InputFile, wanted: readonly string[], stated: StatedForm): Promise<Relation> {
  if (file.kind === 'ndjson') {
    const lines = ndjsonRelation(file)
    await requireKeys(database, file, wanted, lines.sql)
    return lines
  }
  if (file.kind === 'parquet') return parquetRelation(database, file, wanted)
  const { delimiter, quote, header } = csvForm(file.start, wanted, stated)
  const twice = header.find((name, index) => header.indexOf(name) !== index)
  requireColumns(file, wanted, header)
  if (twice !== undefined && wanted.includes(twice)) throw new InputFault([faultOf('header-twice', `${file.path}:1`, { column: twice })])
  // Columns that nobody asked for are named by their position: they may be nameless or alike.
  const names = header.map((name, index) => (wanted.includes(name) ? `c:${name}` : `n:${index}`))
  const types = names.map((name) => `${literal(name)}: 'VARCHAR'`).join(', ')
  const options = `auto_detect = false, header = true, delim = ${literal(delimiter)}, quote = ${literal(quote)}, escape = ${literal(quote)}`
  const sql = `read_csv(${literal(file.readable)}, ${options}, columns = {${types}}, ignore_errors = true, store_rejects = true${zipped(file)})`
  return { sql, column: (name) => identifier(`c:${name}`), header, sound: 'true', cut: { delimiter, quote, header: true } }
}

/** Every line a record: neither byte can stand in one. */
const lines: Cut = { delimiter: '\0', quote: '\0', header: false }

function zipped(file: InputFile): string {
  return file.readable.endsWith('.gz') ? ", compression = 'gzip'" : ''
}

/** Keys are looked for in this many lines first, and in all lines only if some are not there. */
const firstLines = 1000

/** @throws {InputFault} `columns-absent` where no line of the file has one of the wanted keys */
async function requireKeys(database: Database, file: InputFile, wanted: readonly string[], lineSql: string): Promise<void> {
  for (const limit of [` LIMIT ${firstLines}`, '']) {
    const objects = `SELECT line FROM ${lineSql} WHERE sound AND json_type(line) = 'OBJECT'${limit}`
    const keys = (await database.rows<{ key: string }>(`SELECT DISTINCT unnest(json_keys(line)) AS key FROM (${objects}) ORDER BY key`)).map(({ key }) => key)
    // The file will be read again, and lines that are too long reported then.
    await malformedRows(database)
    if (wanted.every((key) => keys.includes(key))) return
    if (limit === '' && keys.length > 0) requireColumns(file, wanted, keys)
  }
}

/** A line is read as one field and picked apart, since rows that are no JSON would otherwise come as empty ones. */
function ndjsonRelation(file: InputFile): Relation {
  const sql = `(SELECT line, json_valid(line) AS sound FROM read_csv(${literal(file.readable)}, auto_detect = false, header = false, delim = '', quote = '', escape = '', `
    + `columns = {'line': 'VARCHAR'}, max_line_size = 33554432, ignore_errors = true, store_rejects = true${zipped(file)}) WHERE line <> '')`
  return { sql, column: (name) => `CASE WHEN sound THEN json_extract_string(line, ${literal(`$."${name.replace(/["\\]/g, '\\$&')}"`)}) END`, header: [], sound: 'sound', cut: lines }
}

async function parquetRelation(database: Database, file: InputFile, wanted: readonly string[]): Promise<Relation> {
  const sql = `read_parquet(${literal(file.readable)})`
  try {
    const described = await database.rows<{ column_name: string }>(`SELECT column_name FROM (DESCRIBE SELECT * FROM ${sql})`)
    const header = described.map((row) => row.column_name)
    requireColumns(file, wanted, header)
    return { sql, column: (name) => `CAST(${identifier(name)} AS VARCHAR)`, header, sound: 'true', cut: null }
  } catch (error) {
    if (error instanceof InputFault) throw error
    throw new InputFault([faultOf('file-unreadable', file.path, { reason: 'no Parquet' })])
  }
}

function requireColumns(file: InputFile, wanted: readonly string[], header: readonly string[]): void {
  const absent = wanted.filter((column) => !header.includes(column))
  if (absent.length === 0) return
  throw new InputFault([faultOf('columns-absent', `${file.path}:1`, { columns: absent, header, nearest: header.length === 0 ? 'none' : closest(absent[0]!, [...header]) })])
}
