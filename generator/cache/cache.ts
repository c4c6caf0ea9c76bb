import { createHash, randomUUID } from 'node:crypto'
import { mkdir, readFile, rename, rm, writeFile } from 'node:fs/promises'
import path from 'node:path'

/**
 * What was computed once, kept under the hash of all it depends on. Safe to delete at any time: it saves work and holds
 * nothing that can't be made again.
 */
export interface Cache {
  /**
   * @param kind - of the result: a folder of its own
   * @param from - everything the result depends on: plain values and typed arrays
   * @param restore - from what was written; null where it can't be used
   */
  remember<T>(kind: string, from: unknown, compute: () => Promise<T>, restore: (written: unknown) => T | null): Promise<T>
}

/**
 * A cache in a folder, one JSON file a result. A folder that can't be written, or a file that can't be read, costs time and nothing else.
 *
 * @param program - what stands for the program's own code: another program computes anew
 */
export function openCache(folder: string, program: string): Cache {
  return {
    remember: async (kind, from, compute, restore) => {
      const file = path.join(folder, kind, `${keyOf([program, from])}.json`)
      const kept = restore(await readJson(file))
      if (kept !== null) return kept
      const result = await compute()
      await writeJson(file, result)
      return result
    },
  }
}

/** SHA-256 of values as JSON, typed arrays by their bytes. */
function keyOf(values: unknown): string {
  const written = JSON.stringify(values, (_, value: unknown) => (ArrayBuffer.isView(value) ? [value.constructor.name, Buffer.from(value.buffer, value.byteOffset, value.byteLength).toString('base64')] : value))
  return createHash('sha256').update(written).digest('hex')
}

async function readJson(file: string): Promise<unknown> {
  try {
    return JSON.parse(await readFile(file, 'utf8')) as unknown
  } catch {
    return null
  }
}

/** Written beside and renamed: whoever reads finds a whole file or none. */
async function writeJson(file: string, value: unknown): Promise<void> {
  const beside = `${file}.${randomUUID()}`
  try {
    await mkdir(path.dirname(file), { recursive: true })
    await writeFile(beside, JSON.stringify(value, (_, part: unknown) => (part instanceof Float64Array ? [...part] : part)))
    await rename(beside, file)
  } catch {
    await rm(beside, { force: true }).catch(() => undefined)
  }
}
