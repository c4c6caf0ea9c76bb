import { isUtf8 } from 'node:buffer'
import { readFile, readdir, realpath, stat } from 'node:fs/promises'
import { basename, isAbsolute, join, posix, sep } from 'node:path'
import { faultOf } from '../faults/catalogue.ts'
import type { Fault } from '../faults/fault.ts'
import type { Source, Unread } from './template.ts'

/** The largest file of an account that becomes part of a document, bytes. */
const mostBytes = 1_000_000

/** Markdown is read in a time that grows with the square of how many blocks stand inside one another. */
const deepest = 100
const nested = new RegExp(`^(?:[ \\t]*[>*+-]){${deepest + 1}}`, 'm')

/**
 * Read a text file of an account; links are followed, but not out of the account.
 *
 * @param folder - the account's, absolute, links resolved
 * @param path - relative to it, with forward slashes
 * @param most - bytes
 */
export async function readOwnFile(folder: string, path: string, most = mostBytes): Promise<Source | Unread> {
  const place = posix.normalize(path)
  const unread = (why: Unread['unread']): Unread => ({ place, unread: why })
  if (isAbsolute(path) || /^[A-Za-z]:|\\|\0/.test(path) || path.split('/').includes('..')) return { place: path, unread: 'outside' }
  const real = await realpath(join(folder, path)).catch(() => undefined)
  if (real === undefined) return unread('absent')
  if (!real.startsWith(folder + sep)) return unread('outside')
  const info = await stat(real).catch(() => undefined)
  if (info?.isFile() !== true) return unread('absent')
  if (info.size > most) return unread('large')
  const bytes = await readFile(real).catch(() => undefined)
  if (bytes === undefined) return unread('absent')
  if (!isUtf8(bytes) || bytes.includes(0)) return unread('no-text')
  const text = bytes.toString('utf8').replace(/^\uFEFF/, '')
  return nested.test(text) ? unread('nested') : { place, text }
}

/** What a folder of an account holds of one kind of file, and the faults of what can't be read. */
export interface OwnFolder {
  /** By name without the ending, sorted. */
  readonly files: ReadonlyMap<string, Source>
  readonly faults: readonly Fault[]
}

/**
 * Read all files of a kind in a folder of an account; a folder that is not there holds nothing.
 *
 * @param folder - the account's, absolute, links resolved
 * @param inside - the folder meant, relative to it
 * @param ending - such as `.md`
 */
export async function readOwnFolder(folder: string, inside: string, ending: string, most = mostBytes): Promise<OwnFolder> {
  const names = (await readdir(join(folder, inside)).catch(() => [])).filter((name) => name.endsWith(ending) && !name.startsWith('.')).sort()
  const read = await Promise.all(names.map((name) => readOwnFile(folder, posix.join(inside, name), most)))
  return {
    files: new Map(read.flatMap((file, at) => isRead(file) ? [[basename(names[at] ?? '', ending), file] as const] : [])),
    faults: read.flatMap((file) => isRead(file) ? [] : [unreadFault(file, file.place)]),
  }
}

export function isRead(file: Source | Unread): file is Source {
  return 'text' in file
}

/** The fault of a file that can't be read, at the place that asks for it. */
export function unreadFault({ place: path, unread }: Unread, place: string): Fault {
  if (unread === 'absent') return faultOf('template-missing', place, { path })
  if (unread === 'outside') return faultOf('template-outside', place, { path })
  if (unread === 'kind') return faultOf('include-kind', place, { path })
  if (unread === 'nested') return faultOf('nested-deep', place, { path, most: deepest })
  return unread === 'large' ? faultOf('template-large', place, { path }) : faultOf('template-no-text', place, { path })
}
