import { isUtf8 } from 'node:buffer'
import { createHash } from 'node:crypto'
import { readFile } from 'node:fs/promises'
import { join } from 'node:path'
import { gunzipSync } from 'node:zlib'
import { parse, type Info } from 'csv-parse/sync'
import { closest } from 'fastest-levenshtein'
import { faultOf } from '../faults/catalogue.ts'
import { InputFault, type Fault } from '../faults/fault.ts'
import { csvForm } from '../intake/csv-header.ts'
import { tidyValue } from '../intake/level-names.ts'

/** A CSV of the account, cut into fields. */
export interface CsvTable {
  readonly path: string
  /** Of the file's bytes, in hexadecimal digits. */
  readonly sha256: string
  readonly header: CsvHeader
  /** Without those that are blank. */
  readonly rows: readonly CsvRow[]
  /** Of the rows that could not be cut into the header's fields. */
  readonly faults: readonly Fault[]
}

export interface CsvHeader {
  /** `survey/tracker.csv:1` */
  readonly place: string
  /** As the file writes them, those without a name left out. */
  readonly names: readonly string[]
  /** Of the columns asked for, those that the file has. */
  readonly columns: readonly string[]
}

export interface CsvRow {
  /** `survey/tracker.csv:17`: the line on which the row begins. */
  readonly place: string
  /** A field without the space around it; empty where the file has no such column. */
  readonly field: (column: string) => string
}

export interface TableColumns {
  readonly needed: readonly string[]
  readonly optional: readonly string[]
}

/** A name as columns are compared: case, spacing and hyphens do not tell them apart. @example columnName('On board') // => 'on_board' */
export function columnName(name: string): string {
  return name.trim().toLowerCase().replace(/[\s-]+/g, '_')
}

/** A table that someone wrote is far smaller; a file that unzips to more is another one. */
const mostBytes = 64 * 1024 * 1024

/**
 * Read a CSV or CSV.gz: any delimiter, UTF-8 or what spreadsheets write instead. Columns are found by name, whatever
 * their case, spacing and hyphens; others are passed over.
 *
 * @throws {InputFault} `file-unreadable`, `input-encoding`, `input-empty`, `input-columns`, `header-twice`
 */
export async function readTable(folder: string, path: string, columns: TableColumns): Promise<CsvTable> {
  const { text, sha256 } = await readText(folder, path)
  // The delimiter that makes most of the header: names are compared in lower case.
  const { delimiter, quote } = csvForm(text.toLowerCase(), [...columns.needed, ...columns.optional], { delimiter: null, quote: null })
  const { records, open } = cut(text, delimiter, quote)
  const [header, ...rows] = records.filter(({ fields }) => fields.some((field) => field !== ''))
  const unclosed = open === null ? [] : [faultOf('input-quote', `${path}:${open}`, {})]
  if (header === undefined) throw new InputFault(unclosed.length > 0 ? unclosed : [faultOf('input-empty', path, { needed: columns.needed })])
  const indexOf = columnIndex(header, path, columns)
  const width = header.fields.findLastIndex((name) => name !== '') + 1
  const ragged = ({ fields }: CsvRecord): boolean => fields.length < width || fields.length > header.fields.length
  return {
    path, sha256,
    header: { place: `${path}:${header.line}`, names: namesOf(header), columns: [...indexOf.keys()] },
    rows: rows.filter((row) => !ragged(row)).map(({ line, fields }) => ({ place: `${path}:${line}`, field: (column) => fields[indexOf.get(column) ?? -1] ?? '' })),
    faults: [...rows.filter(ragged).map(({ line, fields }) => faultOf('input-row', `${path}:${line}`, { fields: fields.length, columns: width })), ...unclosed],
  }
}

async function readText(folder: string, path: string): Promise<{ readonly text: string; readonly sha256: string }> {
  try {
    const bytes = await readFile(join(folder, path))
    if (bytes.length > mostBytes) throw new Error(`more than ${mostBytes} bytes`)
    const content = path.endsWith('.gz') ? gunzipSync(bytes, { maxOutputLength: mostBytes }) : bytes
    if (isUnmarkedUtf16(content)) throw new InputFault([faultOf('input-encoding', path, {})])
    return { text: decode(content), sha256: createHash('sha256').update(bytes).digest('hex') }
  } catch (error) {
    if (error instanceof InputFault) throw error
    throw new InputFault([faultOf('file-unreadable', path, { reason: error instanceof Error ? error.message.split('\n')[0]! : 'no reason given' })])
  }
}

/** Every second byte of a table in UTF-16 is 0, or nearly so; where it is not marked, which of the two cannot be told for sure. */
function isUnmarkedUtf16(bytes: Buffer): boolean {
  const start = bytes.subarray(0, 1 << 16)
  const marked = (start[0] === 0xff && start[1] === 0xfe) || (start[0] === 0xfe && start[1] === 0xff)
  return !marked && start.reduce((zeros, byte) => zeros + (byte === 0 ? 1 : 0), 0) > start.length / 8
}

/** UTF-16 where it is marked, and windows-1252, in which every byte means something, for what is not UTF-8. */
function decode(bytes: Buffer): string {
  const encoding = bytes[0] === 0xff && bytes[1] === 0xfe ? 'utf-16le' : bytes[0] === 0xfe && bytes[1] === 0xff ? 'utf-16be' : isUtf8(bytes) ? 'utf-8' : 'windows-1252'
  return new TextDecoder(encoding).decode(bytes)
}

interface CsvRecord {
  /** On which it begins, from 1. */
  readonly line: number
  readonly fields: readonly string[]
}

/** The records of a text, and the line on which a quote opens that is never closed. */
function cut(text: string, delimiter: string, quote: string): { readonly records: readonly CsvRecord[]; readonly open: number | null } {
  let open = false
  // Inside quotes the library counts a carriage return and its line feed as two lines.
  const parsed = parse(text.replace(/\r\n?/g, '\n'), {
    delimiter, quote, escape: quote, info: true, relax_column_count: true, relax_quotes: true, record_delimiter: '\n',
    // Of a quote that is never closed the records before it are kept.
    skip_records_with_error: true, on_skip: () => { open = true },
  }) as unknown as readonly { readonly record: readonly string[]; readonly info: Info }[]
  // A record is said to end on a line; it begins after the one before, blank lines being records too.
  const ends = [0, ...parsed.map(({ info }) => info.lines)]
  return {
    records: parsed.map(({ record }, index) => ({ line: ends[index]! + 1, fields: record.map((field) => tidyValue(field).trim()) })),
    open: open ? ends.at(-1)! + 1 : null,
  }
}

function columnIndex(header: CsvRecord, path: string, { needed, optional }: TableColumns): ReadonlyMap<string, number> {
  const names = header.fields.map(columnName)
  const place = `${path}:${header.line}`
  const absent = needed.filter((column) => !names.includes(column))
  if (absent.length > 0) {
    const given = namesOf(header)
    throw new InputFault([faultOf('input-columns', place, { absent, header: given, nearest: closest(absent[0]!, given) })])
  }
  const known = [...needed, ...optional].filter((column) => names.includes(column))
  const twice = known.filter((column) => names.indexOf(column) !== names.lastIndexOf(column))
  if (twice.length > 0) throw new InputFault(twice.map((column) => faultOf('header-twice', place, { column })))
  return new Map(known.map((column) => [column, names.indexOf(column)]))
}

function namesOf({ fields }: CsvRecord): readonly string[] {
  return fields.filter((name) => name !== '')
}
