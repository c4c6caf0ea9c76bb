import { open } from 'node:fs/promises'
import { join } from 'node:path'
import { findFiles } from '../account/file-patterns.ts'
import { faultOf } from '../faults/catalogue.ts'
import { InputFault } from '../faults/fault.ts'

/** A file of the account that a theme names. */
export interface NamedFile {
  /** The account's folder, absolute, links resolved. */
  readonly folder: string
  /** Relative to it, as the theme says. */
  readonly path: string
  /** Where it is named. */
  readonly place: string
}

/**
 * Read a file of the account, in whole or not at all.
 *
 * @param kinds - endings that it may have
 * @param most - bytes
 * @throws {InputFault} a path that leaves the account folder, by a link too; that names no file, or several; another kind; more bytes
 */
export async function readBounded(named: NamedFile, kinds: readonly string[], most: number): Promise<Uint8Array> {
  const [{ folder, place }, file] = [named, await findNamed(named)]
  if (!kinds.some((kind) => file.toLowerCase().endsWith(kind))) throw new InputFault([faultOf('account-file-kind', place, { path: file, kinds })])
  const handle = await open(join(folder, file))
  try {
    const buffer = Buffer.alloc(most + 1)
    let filled = 0
    for (let read = -1; read !== 0 && filled <= most; filled += read) ({ bytesRead: read } = await handle.read(buffer, filled, most + 1 - filled, null))
    if (filled > most) throw new InputFault([faultOf('theme-file-large', place, { path: file, most })])
    return Uint8Array.from(buffer.subarray(0, filled))
  } finally {
    await handle.close()
  }
}

/**
 * The file that a path of a theme means, relative to the account folder.
 *
 * @throws {InputFault} a path that leaves the account folder, by a link too; that names no file, or several
 */
export async function findNamed({ folder, path, place }: NamedFile): Promise<string> {
  const found = await findFiles(folder, path)
  if (found.kind === 'outside') throw new InputFault([faultOf('account-path-outside', place, { path: found.path })])
  if (found.kind === 'none' || found.files.length !== 1) throw new InputFault([faultOf('account-file-absent', place, { path, what: 'file' })])
  return found.files[0]
}
