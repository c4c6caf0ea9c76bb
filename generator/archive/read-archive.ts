import { readdir, readFile } from 'node:fs/promises'
import { join } from 'node:path'
import { chainEndName, chainEndSchema, manifestName, manifestSchema, sealName, sha256Of, type ChainEnd, type Manifest } from './manifest.ts'

/** A folder of the archive, with its manifest as far as it can be read. */
export interface SealFolder {
  readonly name: string
  readonly folder: string
  /** null where there is none, or it is none of ours. */
  readonly manifest: Manifest | null
  /** SHA-256 of the manifest's bytes; null where there is none. */
  readonly hash: string | null
}

export interface Archive {
  /** Sorted by name. */
  readonly seals: readonly SealFolder[]
  /** null before the first seal, and where it can't be read. */
  readonly end: ChainEnd | null
  /** Whether there is a file for the end of the chain, readable or not. */
  readonly hasEnd: boolean
  /** Entries of the archive's folder that belong to no seal. */
  readonly foreign: readonly string[]
}

/** Pages about the archive and what an interrupted seal left behind: no part of the chain. */
const besides = new Set([chainEndName, 'index.html'])
export const unfinishedPrefix = '.unfinished-'

/** Look through the archive of an account; an archive that is not there is empty. */
export async function readArchive(archive: string): Promise<Archive> {
  const entries = await readdir(archive, { withFileTypes: true }).catch((error: NodeJS.ErrnoException) => {
    if (error.code === 'ENOENT') return []
    throw error
  })
  const visible = entries.filter(({ name }) => !name.startsWith(unfinishedPrefix) && !besides.has(name))
  const folders = visible.filter((entry) => entry.isDirectory()).map(({ name }) => name).sort()
  const end = await readFile(join(archive, chainEndName), 'utf8').catch(() => null)
  return {
    seals: await Promise.all(folders.map((name) => readSeal(archive, name))),
    end: end === null ? null : chainEndSchema.safeParse(parsed(end)).data ?? null,
    hasEnd: end !== null,
    foreign: visible.filter((entry) => !entry.isDirectory()).map(({ name }) => name).sort(),
  }
}

async function readSeal(archive: string, name: string): Promise<SealFolder> {
  const folder = join(archive, name)
  const bytes = await readFile(join(folder, manifestName)).catch(() => null)
  if (bytes === null) return { name, folder, manifest: null, hash: null }
  const manifest = manifestSchema.safeParse(parsed(bytes.toString('utf8'))).data ?? null
  return { name, folder, hash: sha256Of(bytes), manifest: manifest !== null && sealName(manifest) === name ? manifest : null }
}

function parsed(text: string): unknown {
  try {
    return JSON.parse(text)
  } catch {
    return null
  }
}

/** Those with a manifest, in the order of sealing. */
export function sealedInOrder({ seals }: Archive): readonly (SealFolder & { readonly manifest: Manifest; readonly hash: string })[] {
  return seals.flatMap((seal) => (seal.manifest === null || seal.hash === null ? [] : [{ ...seal, manifest: seal.manifest, hash: seal.hash }]))
    .sort((a, b) => a.manifest.sequence - b.manifest.sequence)
}
