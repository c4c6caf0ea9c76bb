import { readdir, readFile } from 'node:fs/promises'
import { join } from 'node:path'
import { faultOf } from '../faults/catalogue.ts'
import type { Fault } from '../faults/fault.ts'
import { manifestName, sha256Of, type Manifest } from './manifest.ts'
import { readArchive, sealedInOrder, type Archive } from './read-archive.ts'

/** What an archive was found to be. */
export interface Verified {
  readonly archive: Archive
  /** Everything that is not as it was sealed, each named. */
  readonly faults: readonly Fault[]
  /** The last seal stands whole and its entry at the end of the chain is missing: sealing was cut short at its last moment. The next seal mends it. */
  readonly endBehind: boolean
}

/**
 * Hash every file of an archive again and walk the chain of manifests: a byte changed anywhere, a file or a seal removed, added or swapped, a manifest
 * edited even with the right hashes in it.
 */
export async function verifyArchive(folder: string): Promise<Verified> {
  const archive = await readArchive(folder)
  const faults: Fault[] = archive.foreign.map((name) => faultOf('archive-entry-unknown', `archive/${name}`, {}))
  for (const seal of archive.seals) {
    const place = `archive/${seal.name}`
    if (seal.manifest === null) faults.push(faultOf('manifest-unreadable', `${place}/${manifestName}`, { absent: seal.hash === null }))
    else faults.push(...await changedFiles(seal.folder, place, seal.manifest))
  }
  const { faults: ofChain, endBehind } = walkChain(archive)
  return { archive, faults: [...faults, ...ofChain], endBehind }
}

/** Files of a folder that are not what its manifest says. */
async function changedFiles(folder: string, place: string, { files }: Manifest): Promise<readonly Fault[]> {
  const there = new Set(await filesOf(folder))
  const faults: Fault[] = []
  for (const { path, sha256 } of files) {
    if (!there.delete(path)) faults.push(faultOf('sealed-file-absent', `${place}/${path}`, {}))
    else if (sha256Of(await readFile(join(folder, path))) !== sha256) faults.push(faultOf('sealed-file-changed', `${place}/${path}`, {}))
  }
  there.delete(manifestName)
  return [...faults, ...[...there].sort().map((path) => faultOf('sealed-file-added', `${place}/${path}`, {}))]
}

/** Everything in a folder that is no folder, by path with forward slashes; a link or a device counts as a file. */
export async function filesOf(folder: string, inside = ''): Promise<readonly string[]> {
  const entries = await readdir(join(folder, inside), { withFileTypes: true })
  const found = await Promise.all(entries.map((entry) => {
    const path = inside === '' ? entry.name : `${inside}/${entry.name}`
    return entry.isDirectory() ? filesOf(folder, path) : [path]
  }))
  return found.flat().sort()
}

function walkChain(archive: Archive): { readonly faults: readonly Fault[]; readonly endBehind: boolean } {
  const order = sealedInOrder(archive)
  const faults: Fault[] = []
  let before: (typeof order)[number] | undefined
  for (const seal of order) {
    const { sequence, previous } = seal.manifest
    const due = (before?.manifest.sequence ?? 0) + 1
    if (sequence !== due) faults.push(faultOf('chain-gap', `archive/${seal.name}`, { sequence, due }))
    else if (previous !== (before?.hash ?? null)) faults.push(faultOf('chain-broken', `archive/${seal.name}`, { before: before?.name ?? null }))
    before = seal
  }
  const end = endOf(archive, order)
  return { faults: [...faults, ...end.faults], endBehind: end.behind }
}

function endOf({ end, hasEnd }: Archive, order: ReturnType<typeof sealedInOrder>): { readonly faults: readonly Fault[]; readonly behind: boolean } {
  const [last, beforeLast] = [order.at(-1), order.at(-2)]
  if (last === undefined) return { faults: hasEnd ? [faultOf('chain-cut', 'archive', { sealed: end?.sequence ?? 1, found: 0 })] : [], behind: false }
  if (hasEnd && end === null) return { faults: [faultOf('chain-end-unreadable', 'archive/chain-end.json', {})], behind: false }
  if (end?.manifest === last.hash) return { faults: [], behind: false }
  if ((end?.manifest ?? null) === (beforeLast?.hash ?? null)) return { faults: [], behind: true }
  const found = last.manifest.sequence
  if (end !== null && end.sequence > found) return { faults: [faultOf('chain-cut', 'archive', { sealed: end.sequence, found })], behind: false }
  return { faults: [faultOf('chain-end-differs', `archive/${last.name}/${manifestName}`, {})], behind: false }
}
