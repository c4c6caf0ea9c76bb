import { join } from 'node:path'
import { faultOf } from '../faults/catalogue.ts'
import { InputFault, type Fault } from '../faults/fault.ts'
import type { Disk } from './disk.ts'
import { draftChanges } from './draft-changes.ts'
import { chainEndName, manifestName, manifestSchema, sealName, sha256Of, writtenManifest, type ChainEnd, type KeptFile, type MadeWith, type Manifest } from './manifest.ts'
import { readArchive, sealedInOrder, unfinishedPrefix } from './read-archive.ts'
import { changedSince, readRecord, recordName, type BuildRecord } from './record.ts'
import { filesOf, verifyArchive, type Verified } from './verify-archive.ts'

export interface SealRequest {
  /** Of the account, absolute. */
  readonly folder: string
  /** Its name. */
  readonly account: string
  readonly period: string
  /** Every file of the account that a build of the period would read now. */
  readonly inputs: readonly string[]
  /** Why a sealed period is sealed again; null for a first seal. */
  readonly reason: string | null
  /** Whether one person may both prepare and review. */
  readonly onePerson: boolean
  readonly program: Pick<MadeWith, 'version' | 'model' | 'code'>
  readonly disk: Disk
  /** ISO instant of the seal. */
  readonly now: string
}

export interface Sealed {
  readonly name: string
  readonly folder: string
  readonly manifest: Manifest
}

/**
 * Sign a draft off into the archive, for good. All or nothing: the seal is written beside, flushed, and renamed into its place; a crash at any moment
 * leaves the archive as it was, or with the whole new seal in it.
 *
 *     draft and inputs unchanged? ──▶ archive sound? ──▶ copied beside, with its manifest ──▶ renamed ──▶ end of the chain moved on
 *
 * @throws {InputFault} with every reason for which it is refused
 */
export async function sealReview(request: SealRequest): Promise<Sealed> {
  const { folder, period, disk } = request
  const draft = join(folder, 'drafts', period)
  const record = await readRecord(draft)
  const verified = await verifyArchive(join(folder, 'archive'))
  const faults = [...await draftFaults(request, draft, record), ...archiveFaults(request, verified, record)]
  if (faults.length > 0 || record === null) throw new InputFault(faults)

  const order = sealedInOrder(verified.archive)
  const name = sealName({ period, revision: revisionOf(order, period) })
  const beside = join(folder, 'archive', `${unfinishedPrefix}${name}`)
  await disk.remove(beside)
  const files = await fill(beside, request, draft, record)
  const manifest = manifestSchema.parse({
    schema: 'tareline-manifest/1', account: record.account, period, revision: revisionOf(order, period), reason: request.reason,
    sequence: order.length + 1, previous: order.at(-1)?.hash ?? null, sealed_at: request.now,
    prepared_by: record.prepared_by, reviewed_by: record.reviewed_by, program: record.program, seed: record.seed,
    files: [...files],
  } satisfies Record<keyof Manifest, unknown>)
  const written = writtenManifest(manifest)
  await disk.write(join(beside, manifestName), written)
  if (sealedInOrder(await readArchive(join(folder, 'archive'))).at(-1)?.hash !== order.at(-1)?.hash) throw new InputFault([faultOf('archive-busy', 'archive', {})])
  await disk.rename(beside, join(folder, 'archive', name))
  await moveEnd(join(folder, 'archive'), { schema: 'tareline-chain-end/1', sequence: manifest.sequence, manifest: sha256Of(written) }, disk)
  return { name, folder: join(folder, 'archive', name), manifest }
}

/** Files of a draft that are no part of the seal: rows that could not be read are for mending, not for keeping. */
const notKept = (path: string): boolean => path === recordName || path.startsWith('rejects/')

/** Copy what is kept, and make sure that it is what was recorded: somebody may have written meanwhile. */
async function fill(beside: string, { folder, period, disk }: SealRequest, draft: string, record: BuildRecord): Promise<readonly KeptFile[]> {
  const copies = [
    ...record.files.filter(({ path }) => !notKept(path)).map((file) => ({ from: join(draft, file.path), file })),
    ...record.inputs.filter(({ kept }) => kept).map(({ path, bytes, sha256 }) => ({ from: join(folder, path), file: { path: `account/${path}`, bytes, sha256 } })),
  ]
  const folders = new Set(copies.flatMap(({ file }) => foldersAround(file.path)))
  await disk.makeFolder(beside)
  for (const inside of [...folders].sort()) await disk.makeFolder(join(beside, inside))
  for (const { from, file } of copies) await disk.copy(from, join(beside, file.path))
  const changed = await changedSince(beside, copies.map(({ file }) => file))
  if (changed.length > 0) throw new InputFault([faultOf('inputs-changed', `drafts/${period}`, { paths: changed })])
  return copies.map(({ file }) => file).sort((a, b) => (a.path < b.path ? -1 : 1))
}

/** `a/b/c.csv` lies in `a` and `a/b`. */
function foldersAround(path: string): readonly string[] {
  const parts = path.split('/').slice(0, -1)
  return parts.map((_, i) => parts.slice(0, i + 1).join('/'))
}

async function moveEnd(archive: string, end: ChainEnd, disk: Disk): Promise<void> {
  const beside = join(archive, `${unfinishedPrefix}${chainEndName}`)
  await disk.remove(beside)
  await disk.write(beside, `${JSON.stringify(end, null, 2)}\n`)
  await disk.rename(beside, join(archive, chainEndName))
}

function revisionOf(order: readonly { readonly manifest: Manifest }[], period: string): number {
  return order.filter(({ manifest }) => manifest.period === period).length + 1
}

async function draftFaults({ folder, account, period, inputs, onePerson, program }: SealRequest, draft: string, record: BuildRecord | null): Promise<readonly Fault[]> {
  const place = `drafts/${period}`
  const there = await filesOf(draft).catch(() => null)
  if (there === null || there.length === 0) return [faultOf('draft-absent', place, { period })]
  if (record === null) return [faultOf('draft-unrecorded', `${place}/${recordName}`, {})]
  if (record.period !== period || record.account !== account) return [faultOf('draft-of-another', `${place}/${recordName}`, { account: record.account, period: record.period })]
  const faults: Fault[] = []
  const changed = await draftChanges({ folder, draft, inputs }, record)
  if (changed.draft.length > 0) faults.push(faultOf('draft-changed', place, { paths: changed.draft }))
  if (changed.inputs.length > 0) faults.push(faultOf('inputs-changed', place, { paths: changed.inputs }))
  if ((['version', 'model', 'code'] as const).some((part) => record.program[part] !== program[part])) faults.push(faultOf('program-changed', place, { built: record.program.version }))
  if (!record.passed) faults.push(faultOf('checks-failed', place, {}))
  if (!record.files.some(({ path }) => path === 'review.pdf')) faults.push(faultOf('draft-without-pdf', place, {}))
  return [...faults, ...peopleFaults(record, onePerson)]
}

function peopleFaults({ prepared_by: prepared, reviewed_by: reviewed }: BuildRecord, onePerson: boolean): readonly Fault[] {
  const missing = [...(prepared === null ? ['prepared_by'] : []), ...(reviewed === null ? ['reviewed_by'] : [])]
  if (prepared !== null && reviewed !== null && folded(prepared) === folded(reviewed) && !onePerson) return [faultOf('same-person', 'account.yaml', { person: prepared })]
  return missing.map((key) => faultOf('people-missing', 'account.yaml', { key }))
}

/** A name however it was typed. */
function folded(name: string): string {
  return name.normalize('NFKC').toLowerCase().replace(/\s+/g, ' ').trim()
}

function archiveFaults({ period, reason }: SealRequest, { archive, faults }: Verified, record: BuildRecord | null): readonly Fault[] {
  if (faults.length > 0) return [faultOf('archive-unsound', 'archive', {}), ...faults]
  const order = sealedInOrder(archive)
  const sealed = revisionOf(order, period) > 1
  if (sealed && reason === null) return [faultOf('sealed-already', `archive/${period}`, { period })]
  if (!sealed && reason !== null) return [faultOf('nothing-to-revise', `archive/${period}`, { period })]
  return record === null || record.past === (order.at(-1)?.hash ?? null) ? [] : [faultOf('archive-moved-on', `drafts/${period}`, { last: order.at(-1)?.name ?? null })]
}
