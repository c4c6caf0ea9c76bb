import { createReadStream, createWriteStream } from 'node:fs'
import { mkdir, open, stat } from 'node:fs/promises'
import path from 'node:path'
import { pipeline } from 'node:stream/promises'
import { createGunzip } from 'node:zlib'
import { faultOf } from '../faults/catalogue.ts'
import { InputFault } from '../faults/fault.ts'
import { writing } from './account-folder.ts'

/** How a file of mentions is called in its account. */
interface CopyName {
  readonly stem: string
  /** One that an account may name. */
  readonly ending: '.csv' | '.csv.gz' | '.ndjson' | '.parquet'
  readonly unzip: boolean
}

/** A copy in the folder `mentions` of an account, relative to the account, and the pattern that matches it and later ones. */
export interface CopiedMentions {
  readonly file: string
  readonly pattern: string
}

/** What is copied without a word. */
const quietBytes = 64 * 1024 * 1024

/**
 * Copy a file of mentions into an account: an account reads nothing outside its folder, and a copy stays as it is when the export is
 * overwritten or moved. The name is changed where an account could not take it.
 *
 * @param progress - told how far the copy of a large file is
 * @throws {InputFault} `start-file-kind`, `start-file-absent`, `file-unreadable`
 */
export async function copyMentions(from: string, account: string, progress: (text: string) => void, stop: AbortSignal | undefined): Promise<CopiedMentions> {
  const { stem, ending, unzip } = copyName(path.basename(from))
  const bytes = await readableBytes(from)
  const file = `mentions/${stem}${ending}`
  if (bytes > quietBytes) progress(`copying ${path.basename(from)}, ${Math.round(bytes / 1e6)} MB`)
  const target = path.join(account, file)
  await writing(account, async () => {
    await mkdir(path.dirname(target), { recursive: true })
    const source = createReadStream(from, { highWaterMark: 1 << 20 })
    source.on('data', inQuarters(bytes, progress))
    source.pause()
    const options = stop === undefined ? {} : { signal: stop }
    if (unzip) await pipeline(source, createGunzip(), createWriteStream(target), options).catch((error: NodeJS.ErrnoException) => { throw unzipFault(from, error) })
    else await pipeline(source, createWriteStream(target), options)
  })
  return { file, pattern: `mentions/*${ending}` }
}

function copyName(name: string): CopyName {
  const [, stem = '', kind = '', zipped] = /^(.*?)\.(csv|tsv|tab|txt|ndjson|jsonl|parquet)(\.gz)?$/is.exec(name) ?? []
  const lines = /^(ndjson|jsonl)$/i.test(kind)
  const table = /^parquet$/i.test(kind)
  if (kind === '' || (table && zipped !== undefined)) throw new InputFault([faultOf('start-file-kind', name, {})])
  // patterns know these characters only for themselves; a name that begins with a dot is matched by none
  const plain = stem.replace(/[^\p{L}\p{N} ._-]+/gu, '-').replace(/^[. -]+|[. ]+$/g, '').slice(0, 80)
  return { stem: plain === '' ? 'mentions' : plain, ending: lines ? '.ndjson' : table ? '.parquet' : zipped === undefined ? '.csv' : '.csv.gz', unzip: lines && zipped !== undefined }
}

async function readableBytes(from: string): Promise<number> {
  try {
    const handle = await open(from)
    await handle.close()
    const info = await stat(from)
    if (!info.isFile()) throw Object.assign(new Error('no file'), { code: 'no file' })
    return info.size
  } catch (error) {
    throw new InputFault([faultOf('start-file-absent', from, { reason: (error as NodeJS.ErrnoException).code ?? 'no reason given' })])
  }
}

function inQuarters(bytes: number, progress: (text: string) => void): (chunk: Buffer | string) => void {
  let [read, told] = [0, 0]
  return (chunk) => {
    read += chunk.length
    const quarter = Math.floor(4 * read / bytes)
    if (bytes > quietBytes && quarter > told && quarter < 4) progress(`copied ${25 * quarter} %`)
    told = quarter
  }
}

function unzipFault(from: string, error: NodeJS.ErrnoException): unknown {
  return error.code?.startsWith('Z_') === true ? new InputFault([faultOf('file-unreadable', from, { reason: error.message })]) : error
}
