import { parse } from 'csv-parse/sync'
import { faultOf } from '../faults/catalogue.ts'
import { InputFault } from '../faults/fault.ts'
import type { Database } from '../intake/database.ts'
import type { InputFile } from '../intake/input-file.ts'
import { malformedRows } from '../intake/malformed-rows.ts'
import { relationOf } from '../intake/relation.ts'
import { withoutUnclosedQuote } from '../intake/unclosed-quotes.ts'
import type { HeadColumn } from './column-profile.ts'
import { readTimes } from './time-forms.ts'

/** The beginning of a file of mentions, read as the intake reads it. */
export interface TableHead {
  /** Those that an account can name: not nameless, not alike. */
  readonly columns: readonly HeadColumn[]
  /** Names that stand there twice or are none. */
  readonly unnameable: number
  readonly rows: number
  /** How its fields are cut; null for Parquet and NDJSON. */
  readonly form: CsvCut | null
}

export interface CsvCut {
  readonly delimiter: string
  readonly quote: string
}

/** Rows that are looked at. */
const firstRows = 2000
/** A file with more columns is looked at no further than these. */
const mostColumns = 1000

/**
 * Read the header and the first 2,000 rows.
 *
 * @throws {InputFault} `start-no-table` where there is no header or the bytes are no text, `start-no-header` where the first row is data, `file-unreadable`
 */
export async function readHead(database: Database, file: InputFile, scratch: string): Promise<TableHead> {
  if (file.kind !== 'parquet' && file.start.includes('\0')) throw new InputFault([faultOf('start-no-table', file.path, { reason: 'bytes that are no text' })])
  if (file.kind === 'ndjson') return keyedHead(database, file)
  if (file.kind === 'parquet') {
    const { sql, header, column } = await relationOf(database, file, [], unstated)
    // columns by number: names that are numbers would come in an order of their own
    const fields = header.slice(0, mostColumns).map((name, index) => `${column(name)} AS k${index}`)
    return headOf(header, await database.rows<Row>(`SELECT ${fields.join(', ')} FROM ${sql} LIMIT ${firstRows}`), null)
  }
  const form = likelyCut(file.start)
  if (form === null) throw new InputFault([faultOf('start-no-table', file.path, { reason: file.start.trim() === '' ? 'nothing' : 'one column only' })])
  return csvHead(database, file, form, scratch)
}

const unstated = { delimiter: null, quote: null }
type Row = Readonly<Record<string, string | null>>

async function csvHead(database: Database, file: InputFile, form: CsvCut, scratch: string, attempt = 0): Promise<TableHead> {
  const { sql, header, cut } = await relationOf(database, file, [], form)
  const data = header.find((name) => readTimes([name]) !== null)
  if (data !== undefined) throw new InputFault([faultOf('start-no-header', `${file.path}:1`, { value: data })])
  const rows = await database.rows<Row>(`SELECT * FROM ${sql} LIMIT ${firstRows}`)
  const malformed = await malformedRows(database)
  const closed = malformed.length === 0 || cut === null ? null : await withoutUnclosedQuote(file, cut, scratch, attempt)
  return closed === null ? headOf(header, rows, form) : csvHead(database, closed, form, scratch, attempt + 1)
}

async function keyedHead(database: Database, file: InputFile): Promise<TableHead> {
  const { sql, column, sound } = await relationOf(database, file, [], unstated)
  const objects = `SELECT line, sound FROM ${sql} WHERE ${sound} AND json_type(line) = 'OBJECT' LIMIT ${firstRows}`
  const lines = await database.rows<{ keys: readonly string[] }>(`SELECT json_keys(line) AS keys FROM (${objects})`)
  const keys = [...new Set(lines.flatMap((line) => line.keys))].slice(0, mostColumns)
  if (keys.length === 0) throw new InputFault([faultOf('start-no-table', file.path, { reason: 'no line that is a JSON object' })])
  const rows = await database.rows<Row>(`SELECT ${keys.map((key, index) => `${isNameable(key) ? column(key) : 'NULL'} AS k${index}`).join(', ')} FROM (${objects})`)
  await malformedRows(database)
  return headOf(keys, rows, null)
}

/** Whether an account can name it: names are trimmed there, and hold no NUL. */
function isNameable(name: string): boolean {
  return name !== '' && name.trim() === name && !name.includes('\0')
}

function headOf(header: readonly string[], rows: readonly Row[], form: CsvCut | null): TableHead {
  // the database does not tell names apart by case
  const folded = header.map((name) => name.toLowerCase())
  const usable = header.map((name, index) => isNameable(name) && folded.indexOf(folded[index]!) === folded.lastIndexOf(folded[index]!))
  const values = rows.map((row) => Object.values(row))
  const columns = header.slice(0, mostColumns).flatMap((name, index) => (usable[index] === true ? [{ name, values: values.map((row) => row[index] ?? '') }] : []))
  return { columns, unnameable: usable.filter((nameable) => !nameable).length, rows: rows.length, form }
}

const cuts: readonly CsvCut[] = [',', ';', '\t', '|'].flatMap((delimiter) => ['"', "'"].map((quote) => ({ delimiter, quote })))
const firstRecords = 60

/**
 * The delimiter and quote under which most of the first records have as many fields as the header, and the header most fields;
 * null where the header has one field under all of them.
 *
 * @example likelyCut('a;b\n1,5;2,5\n') // => { delimiter: ';', quote: '"' }
 */
export function likelyCut(start: string): CsvCut | null {
  const judged = cuts.map((cut) => {
    const records = recordsOf(start, cut)
    const width = records[0]?.length ?? 0
    const even = records.filter((record) => record.length === width).length / Math.max(1, records.length)
    // fields that are left in quotes were quoted by the other character
    const quoted = records[0]?.some((field) => /^(["']).*\1$/s.test(field)) === true ? 0.5 : 1
    return { cut, width, merit: width < 2 ? 0 : even * even * quoted * Math.log2(1 + width) }
  })
  const best = judged.reduce((most, candidate) => (candidate.merit > most.merit + 1e-9 ? candidate : most))
  return best.width < 2 ? null : best.cut
}

function recordsOf(start: string, { delimiter, quote }: CsvCut): readonly (readonly string[])[] {
  const records: (readonly string[])[] = []
  try {
    parse(start, {
      delimiter, quote, escape: quote, relax_column_count: true, relax_quotes: true, skip_empty_lines: true, to: firstRecords,
      on_record: (record: string[]) => { records.push(record); return null },
    })
  } catch { /* the text ends within a quote: the records before are whole */ }
  return records
}
