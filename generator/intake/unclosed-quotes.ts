import { createWriteStream } from 'node:fs'
import { pipeline } from 'node:stream/promises'
import { faultOf } from '../faults/catalogue.ts'
import { InputFault } from '../faults/fault.ts'
import type { InputFile } from './input-file.ts'
import { bytesOf, unclosedQuote, type Cut } from './record-lines.ts'

/** A file with more of them is not cut by this quote. */
const most = 50

/**
 * A quote that is never closed makes one record of everything after it. Read again from a copy in which the line it
 * stands on is overwritten, letter by letter, only that line is lost, and every other stays where it was.
 *
 * @param attempt - number of copies made before
 * @returns the file with its copy as `readable`, or null where every quote is closed
 * @throws {InputFault} `file-unreadable` where that happens again and again
 */
export async function withoutUnclosedQuote(file: InputFile, cut: Cut, scratch: string, attempt: number): Promise<InputFile | null> {
  const offset = await unclosedQuote(file.readable, cut)
  if (offset === null) return null
  if (attempt >= most) throw new InputFault([faultOf('file-unreadable', file.path, { reason: `more than ${most} quotes that are never closed` })])
  const copy = `${scratch}/${file.copyName}-${attempt}.txt`
  await pipeline(bytesOf(file.readable), (chunks: AsyncIterable<Buffer>) => overwriteLine(chunks, offset), createWriteStream(copy))
  return { ...file, readable: copy }
}

async function* overwriteLine(chunks: AsyncIterable<Buffer>, offset: number): AsyncGenerator<Buffer> {
  let position = 0
  let done = false
  for await (const chunk of chunks) {
    const bytes = Buffer.from(chunk)
    for (let at = Math.max(0, offset - position); at < bytes.length && !done; at++) {
      if (bytes[at] === 0x0a || bytes[at] === 0x0d) done = true
      else bytes[at] = 0x78
    }
    position += chunk.length
    yield bytes
  }
}
