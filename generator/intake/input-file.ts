import { createHash } from 'node:crypto'
import { createReadStream, createWriteStream } from 'node:fs'
import { symlink } from 'node:fs/promises'
import { isUtf8 } from 'node:buffer'
import path from 'node:path'
import { pipeline } from 'node:stream/promises'
import { createGunzip } from 'node:zlib'
import { faultOf } from '../faults/catalogue.ts'
import { InputFault } from '../faults/fault.ts'

/** A file of the account, looked over: where to read it as UTF-8. */
export interface InputFile {
  /** Relative to the account folder. */
  readonly path: string
  /** Begins the names of its copies in the scratch folder. */
  readonly copyName: string
  readonly kind: FileKind
  /** Absolute: the file itself, or its transcoded copy in the scratch folder. */
  readonly readable: string
  /** The beginning of its text, for the header; empty for Parquet. */
  readonly start: string
}

export type FileKind = 'csv' | 'parquet' | 'ndjson'

type Encoding = 'utf-8' | 'utf-16le' | 'windows-1252'

const startLength = 1 << 16

/** The kind of a file by its name. */
function fileKind(name: string): FileKind {
  return name.endsWith('.parquet') ? 'parquet' : name.endsWith('.ndjson') ? 'ndjson' : 'csv'
}

/**
 * See how the text of a file is encoded, and put a UTF-8 copy into the scratch folder if it is not UTF-8.
 * Bytes that are neither UTF-8 nor marked as UTF-16 are taken for windows-1252, in which every byte means something.
 *
 * @throws {InputFault} `file-unreadable`
 */
export async function lookOver(folder: string, file: string, scratch: string): Promise<InputFile> {
  const absolute = path.join(folder, file)
  const kind = fileKind(file)
  const copyName = createHash('sha256').update(file).digest('hex').slice(0, 24)
  return readingFile(file, async () => {
    const { encoding, start } = kind === 'parquet' ? { encoding: 'utf-8' as const, start: Buffer.alloc(0) } : await lookAtText(absolute)
    const looked = { path: file, copyName, kind, start: decode(start, encoding) }
    if (encoding === 'utf-8') return { ...looked, readable: await plainlyNamed(absolute, path.join(scratch, copyName)) }
    const copy = path.join(scratch, `${copyName}.txt`)
    await transcode(absolute, copy, encoding)
    return { ...looked, readable: copy }
  })
}

/** The SHA-256 of a file's bytes, in hexadecimal digits. @throws {InputFault} `file-unreadable` */
export async function hashOf(folder: string, file: string): Promise<string> {
  return readingFile(file, async () => {
    const hash = createHash('sha256')
    for await (const chunk of createReadStream(path.join(folder, file), { highWaterMark: 1 << 20 }) as AsyncIterable<Buffer>) hash.update(chunk)
    return hash.digest('hex')
  })
}

async function readingFile<T>(file: string, read: () => Promise<T>): Promise<T> {
  try {
    return await read()
  } catch (error) {
    throw new InputFault([faultOf('file-unreadable', file, { reason: error instanceof Error ? error.message.split('\n')[0]! : 'no reason given' })])
  }
}

/** DuckDB takes some characters of a path for a pattern: such a file is read through a link in the scratch folder. */
async function plainlyNamed(absolute: string, link: string): Promise<string> {
  if (!/[[\]*?{}]/.test(absolute)) return absolute
  const named = `${link}${absolute.endsWith('.gz') ? '.gz' : ''}`
  await symlink(absolute, named)
  return named
}

interface LookedAt {
  readonly encoding: Encoding
  readonly start: Buffer
}

async function lookAtText(absolute: string): Promise<LookedAt> {
  const raw = createReadStream(absolute, { highWaterMark: 1 << 20 })
  let valid = true
  let start = Buffer.alloc(0)
  let rest = Buffer.alloc(0)
  for await (const chunk of textOf(raw, absolute)) {
    if (start.length < startLength) start = Buffer.concat([start, chunk.subarray(0, startLength - start.length)])
    if (!valid) continue
    const whole = rest.length === 0 ? chunk : Buffer.concat([rest, chunk])
    const cut = lastBoundary(whole)
    valid = isUtf8(whole.subarray(0, cut))
    rest = Buffer.from(whole.subarray(cut))
  }
  const marked = start[0] === 0xff && start[1] === 0xfe
  return { encoding: marked ? 'utf-16le' : valid && isUtf8(rest) ? 'utf-8' : 'windows-1252', start }
}

function textOf(raw: ReturnType<typeof createReadStream>, absolute: string): AsyncIterable<Buffer> {
  if (!absolute.endsWith('.gz')) return raw as AsyncIterable<Buffer>
  const unzipped = createGunzip()
  raw.on('error', (error) => { unzipped.destroy(error) })
  return raw.pipe(unzipped) as AsyncIterable<Buffer>
}

/** Where the last character that may go on in the next chunk begins: UTF-8 takes four bytes at most. */
function lastBoundary(bytes: Buffer): number {
  for (let back = 1; back <= Math.min(3, bytes.length); back++) {
    const byte = bytes[bytes.length - back]!
    if (byte >= 0xc0) return bytes.length - back
    if (byte < 0x80) break
  }
  return bytes.length
}

function decode(start: Buffer, encoding: Encoding): string {
  return new TextDecoder(encoding).decode(start)
}

async function transcode(absolute: string, copy: string, encoding: Encoding): Promise<void> {
  const decoder = new TextDecoder(encoding)
  await pipeline(textOf(createReadStream(absolute), absolute), async function* (chunks: AsyncIterable<Buffer>) {
    for await (const chunk of chunks) yield decoder.decode(chunk, { stream: true })
    yield decoder.decode()
  }, createWriteStream(copy))
}
