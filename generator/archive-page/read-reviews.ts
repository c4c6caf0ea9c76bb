import { readFile } from 'node:fs/promises'
import { join } from 'node:path'
import { sha256Of, type Manifest } from '../archive/manifest.ts'
import { readArchive, sealedInOrder } from '../archive/read-archive.ts'
import { pageFigures, type PageFigures } from './page-figures.ts'

/** A sealed review as the page tells of it. */
export interface ListedReview {
  /** Of its folder: `2026-10`, `2026-10.r2`. */
  readonly name: string
  readonly manifest: Manifest
  /** SHA-256 of the manifest's bytes. */
  readonly hash: string
  /** Or why they can't be shown: the file is missing, is not the one that was sealed, or has a form that this program does not know. */
  readonly figures: PageFigures | 'missing' | 'changed' | 'unknown'
}

export interface ListedArchive {
  /** In the order of sealing. */
  readonly reviews: readonly ListedReview[]
  /** Folders whose manifest can't be read, sorted. */
  readonly unreadable: readonly string[]
}

/** What an archive holds; figures are taken from findings alone whose bytes are those that were sealed. */
export async function readReviews(folder: string): Promise<ListedArchive> {
  const archive = await readArchive(folder)
  const reviews: ListedReview[] = []
  for (const { name, folder, manifest, hash } of sealedInOrder(archive)) reviews.push({ name, manifest, hash, figures: await readFigures(folder, manifest) })
  return { reviews, unreadable: archive.seals.filter(({ manifest }) => manifest === null).map(({ name }) => name) }
}

async function readFigures(folder: string, { files }: Manifest): Promise<ListedReview['figures']> {
  const sealed = files.find(({ path }) => path === 'findings.json')
  const bytes = await readFile(join(folder, 'findings.json')).catch(() => null)
  if (sealed === undefined || bytes === null) return 'missing'
  return sha256Of(bytes) === sealed.sha256 ? pageFigures(bytes.toString('utf8')) ?? 'unknown' : 'changed'
}
