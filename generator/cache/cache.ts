import { createHash, randomUUID } from 'node:crypto'
import { mkdir, readdir, readFile, realpath, rename, rm, stat, writeFile } from 'node:fs/promises'
import path from 'node:path'

/**
 * What was computed once, kept under the hash of all it depends on. Safe to delete at any time: it saves work and holds
 * nothing that can't be made again.
 */
export interface Cache {
  /**
   * @param kind - of the result: a folder of its own
   * @param from - everything the result depends on: plain values and typed arrays
   * Two who ask for the same at once share one computation.
   *
   * @param restore - from what was written; null, or an error, where it can't be used
   */
  remember<T>(kind: string, from: unknown, compute: () => Promise<T>, restore: (written: unknown) => T | null): Promise<T>
}

/** A larger result is none of ours, or not worth the reading. */
const mostBytes = 64 * 1024 * 1024
/** Results of a kind; when there are more, the oldest go. */
const mostResults = 2000

/**
 * A cache in a folder, one JSON file a result, which stands beside its SHA-256: one that was changed by hand or cut short is not used.
 * A folder that can't be written, or a file that can't be read, costs time and nothing else. Where a link leads out of the folder
 * around the cache's, nothing is read or written.
 *
 * @param program - what stands for the program's own code: another program computes anew
 */
export function openCache(folder: string, program: string): Cache {
  const home = path.dirname(folder)
  const underWay = new Map<string, Promise<unknown>>()
  return {
    remember: <T>(kind: string, from: unknown, compute: () => Promise<T>, restore: (written: unknown) => T | null): Promise<T> => {
      const file = path.join(folder, kind, `${keyOf([program, from])}.json`)
      const asked = underWay.get(file)
      // the file's name says what is computed, and so of which type it is
      if (asked !== undefined) return asked as Promise<T>
      const work = restoredOr(home, file, compute, restore).finally(() => { underWay.delete(file) })
      underWay.set(file, work)
      return work
    },
  }
}

async function restoredOr<T>(home: string, file: string, compute: () => Promise<T>, restore: (written: unknown) => T | null): Promise<T> {
  const kept = await readResult(home, file).then(restore).catch(() => null)
  if (kept !== null) return kept
  const result = await compute()
  await writeResult(home, file, result)
  return result
}

/** SHA-256 of values as JSON, typed arrays by their bytes. */
function keyOf(values: unknown): string {
  const written = JSON.stringify(values, (_, value: unknown) => (ArrayBuffer.isView(value) ? [value.constructor.name, Buffer.from(value.buffer, value.byteOffset, value.byteLength).toString('base64')] : value))
  return hashOf(written)
}

/** The result that a file holds. @throws {Error} where it can't be read, or is not what was written */
async function readResult(home: string, file: string): Promise<unknown> {
  await requireInside(home, file)
  const found = await stat(file)
  if (!found.isFile() || found.size > mostBytes) throw new Error('no result of ours')
  const { sha256, result } = JSON.parse(await readFile(file, 'utf8')) as { readonly sha256?: unknown; readonly result?: unknown }
  if (sha256 !== hashOf(JSON.stringify(result))) throw new Error('another result than was written')
  return result
}

/** Written beside and renamed: whoever reads finds a whole file or none. */
async function writeResult(home: string, file: string, result: unknown): Promise<void> {
  const kind = path.dirname(file)
  const beside = `${file}.${randomUUID()}`
  try {
    const written = JSON.stringify(result, (_, part: unknown) => (part instanceof Float64Array ? [...part] : part))
    await mkdir(path.dirname(kind), { recursive: true })
    await requireInside(home, path.dirname(kind))
    await mkdir(kind, { recursive: true })
    await requireInside(home, kind)
    await writeFile(beside, `{"sha256":"${hashOf(written)}","result":${written}}`, { flag: 'wx' })
    await rename(beside, file)
    await dropOldest(kind)
  } catch {
    // a link is not followed for the sake of a file that was never written
    await requireInside(home, kind).then(() => rm(beside, { force: true })).catch(() => undefined)
  }
}

async function dropOldest(kind: string): Promise<void> {
  const names = (await readdir(kind)).filter((name) => /^[0-9a-f]{64}\.json/.test(name))
  if (names.length <= mostResults) return
  const ages = await Promise.all(names.map(async (name) => ({ name, at: (await stat(path.join(kind, name))).mtimeMs })))
  const oldest = ages.sort((a, b) => a.at - b.at).slice(0, names.length - mostResults)
  for (const { name } of oldest) await rm(path.join(kind, name), { force: true })
}

/** @throws {Error} where a path, links followed, lies outside a folder */
async function requireInside(folder: string, inside: string): Promise<void> {
  const [outer, inner] = await Promise.all([realpath(folder), realpath(inside)])
  if (!inner.startsWith(`${outer}${path.sep}`)) throw new Error('a link out of the account')
}

function hashOf(text: string): string {
  return createHash('sha256').update(text).digest('hex')
}
