import { createReadStream } from 'node:fs'
import { createGunzip } from 'node:zlib'

export interface RecordLines {
  /** Line on which each asked-for sound record begins, counted from 1. */
  readonly sound: Float64Array
  /** Line of each malformed record. */
  readonly malformed: Float64Array
}

export interface Cut {
  readonly delimiter: string
  readonly quote: string
  /** Whether the first record is a header. */
  readonly header: boolean
}

const [newline, carriageReturn] = [0x0a, 0x0d]

/**
 * The line in the file on which records begin, by one walk over its bytes: a quoted field may hold line breaks, so a
 * record's line is not its number.
 *
 * @param ordinals - asked-for records among the sound ones, from 0, ascending; the header is none
 * @param malformed - where DuckDB says that malformed records begin, ascending: a byte too far or a line break too early
 */
export async function lineNumbers(file: string, cut: Cut, ordinals: ArrayLike<number>, malformed: ArrayLike<number>): Promise<RecordLines> {
  const lines: RecordLines = { sound: new Float64Array(ordinals.length), malformed: new Float64Array(malformed.length) }
  let [ordinal, nextSound, nextMalformed] = [cut.header ? -1 : 0, 0, 0]
  await eachRecord(file, cut, (line, offset) => {
    if (nextMalformed < malformed.length && malformed[nextMalformed]! - 1 <= offset) { lines.malformed[nextMalformed++] = line; return }
    if (ordinal === ordinals[nextSound]) lines.sound[nextSound++] = line
    ordinal++
  })
  return lines
}

/** Byte at which the record begins whose quote is never closed, or null. */
export async function unclosedQuote(file: string, cut: Cut): Promise<number | null> {
  let last = 0
  const open = await eachRecord(file, cut, (_, offset) => { last = offset })
  return open ? last : null
}

/** The bytes of a file, unzipped. */
export function bytesOf(file: string): AsyncIterable<Buffer> {
  const stream = createReadStream(file, { highWaterMark: 1 << 20 })
  return (file.endsWith('.gz') ? stream.pipe(createGunzip()) : stream) as AsyncIterable<Buffer>
}

/** @returns whether a quote is still open at the end */
async function eachRecord(file: string, cut: Cut, begins: (line: number, offset: number) => void): Promise<boolean> {
  const [quote, delimiter] = [cut.quote.charCodeAt(0), cut.delimiter.charCodeAt(0)]
  let [line, position, before] = [1, 0, delimiter]
  let [quoted, atRecord, atField] = [false, true, true]
  for await (const chunk of bytesOf(file)) {
    for (let index = position === 0 && hasMark(chunk) ? 3 : 0; index < chunk.length; index++) {
      const byte = chunk[index]!
      if (byte === newline || byte === carriageReturn) {
        if (byte === carriageReturn || before !== carriageReturn) line++
        if (!quoted) atRecord = true
      } else {
        if (atRecord) begins(line, position + index)
        // A quote right after a closing quote was one of a doubled pair: the field goes on.
        if (byte === quote) quoted = !quoted && (atRecord || atField || before === quote)
        atField = byte === delimiter && !quoted
        atRecord = false
      }
      before = byte
    }
    position += chunk.length
  }
  return quoted
}

function hasMark(chunk: Buffer): boolean {
  return chunk[0] === 0xef && chunk[1] === 0xbb && chunk[2] === 0xbf
}
