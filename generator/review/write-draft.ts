import { chmod, mkdir, mkdtemp, readdir, rm, rmdir, stat } from 'node:fs/promises'
import { basename, join } from 'node:path'
import type { CompetitorTables } from '../../model/competitors/competitor-tables.ts'
import { writeCompetitors } from '../archive/competitor-files.ts'
import { theDisk, type Disk } from '../archive/disk.ts'
import type { FlatIntake } from '../archive/flatten-intake.ts'
import { writeIntake } from '../archive/intake-files.ts'
import { fingerprints, recordName, type BuildRecord } from '../archive/record.ts'
import { filesOf } from '../archive/verify-archive.ts'
import { faultOf } from '../faults/catalogue.ts'
import { InputFault } from '../faults/fault.ts'
import { writeRefusal } from '../faults/write-refusal.ts'
import type { MadeReview } from './make-review.ts'
import { asideName, restoreDrafts } from './restore-drafts.ts'

/** Everything a draft folder may hold: a folder with anything else in it is somebody's, and is left alone. */
const ours = new Set(['review.html', 'review.pdf', 'findings.json', 'tables', 'rejects', 'intake', recordName])

export interface DraftContents extends MadeReview {
  readonly intake: FlatIntake
  readonly competitors: CompetitorTables | null
  /** All but the draft's own files. */
  readonly record: Omit<BuildRecord, 'files'>
}

/** A folder beside the draft's, to be filled and then put in its place: a failure leaves what was there untouched. */
export interface UnfinishedDraft {
  /** Where readers of input may write on the way. */
  readonly rejects: string
  /** Put the draft in its place. */
  finish(folder: string, contents: DraftContents): Promise<void>
  /** Leave no trace. */
  abandon(): Promise<void>
}

/**
 * Begin a draft; unfinished ones that a killed build left behind more than a day ago go.
 *
 * @param parent - the folder in which the draft's own will stand; made where it is absent
 * @param disk - what the draft is written through, once it is finished
 * @throws {MachineFault} `draft-unwritable`, then and when the draft is finished
 */
export async function openDraft(parent: string, disk: Disk = theDisk): Promise<UnfinishedDraft> {
  const made = await writing(parent, () => mkdir(parent, { recursive: true }))
  const unfinished = await writing(parent, () => mkdtemp(join(parent, '.unfinished-')))
  await sweep(parent)
  await restoreDrafts(parent)
  return {
    rejects: join(unfinished, 'rejects'),
    finish: async (folder, contents) => {
      await requireDraft(folder)
      await writing(parent, async () => {
        await fill(unfinished, contents, disk)
        await chmod(unfinished, 0o755)
        await replace(folder, unfinished, disk)
      })
    },
    abandon: async () => {
      // what could not be written may not be removable either; why it was abandoned is told, not that
      await rm(unfinished, { recursive: true, force: true }).catch(() => undefined)
      await restoreDrafts(parent)
      if (made !== undefined) await rmdir(made).catch(() => undefined)
    },
  }
}

async function writing<T>(parent: string, write: () => Promise<T>): Promise<T> {
  try {
    return await write()
  } catch (error) {
    throw writeRefusal('draft-unwritable', parent, error)
  }
}

const dayLong = 24 * 60 * 60 * 1000

/** Take away what killed builds left behind; what can't be taken away stays. */
async function sweep(parent: string): Promise<void> {
  const entries = await readdir(parent, { withFileTypes: true }).catch(() => [])
  // a `-before` is an earlier draft on its way: it is never taken away unseen
  for (const entry of entries.filter(({ name }) => /^\.unfinished-[^-]+$/.test(name))) {
    const left = join(parent, entry.name)
    const age = await stat(left).then(({ mtimeMs }) => Date.now() - mtimeMs, () => 0)
    if (entry.isDirectory() && age > dayLong) await rm(left, { recursive: true, force: true }).catch(() => undefined)
  }
}

/**
 * A folder that may be replaced by a draft: absent, empty, or a draft itself.
 *
 * @throws {InputFault} `out-not-a-draft` where it holds anything that no draft does
 * @throws {MachineFault} `draft-unwritable` where nobody may look into it
 */
export async function requireDraft(folder: string): Promise<void> {
  const found = await readdir(folder).catch((error: NodeJS.ErrnoException) => {
    if (error.code === 'ENOENT') return []
    throw error.code === 'ENOTDIR' ? new InputFault([faultOf('out-not-a-draft', folder, { entry: 'a file' })]) : writeRefusal('draft-unwritable', folder, error)
  })
  const foreign = found.find((entry) => !ours.has(entry))
  if (foreign !== undefined) throw new InputFault([faultOf('out-not-a-draft', folder, { entry: foreign })])
}

/** The record comes last: it says what everything else is. */
async function fill(folder: string, { data, html, pdf, intake, competitors, record }: DraftContents, disk: Disk): Promise<void> {
  await disk.makeFolder(join(folder, 'tables'))
  await disk.write(join(folder, 'review.html'), html)
  if (pdf !== null) await disk.write(join(folder, 'review.pdf'), pdf)
  for (const { path, bytes } of data) await disk.write(join(folder, path), bytes)
  await writeIntake(join(folder, 'intake'), intake)
  await writeCompetitors(join(folder, 'intake'), competitors)
  const whole: BuildRecord = { ...record, files: [...await fingerprints(folder, await filesOf(folder))] }
  await disk.write(join(folder, recordName), `${JSON.stringify(whole, null, 2)}\n`)
}

/** The old folder steps aside before the new one takes its name, so that at every moment one of the two is whole; between the two, `restoreDrafts` knows where it is. */
async function replace(folder: string, unfinished: string, disk: Disk): Promise<void> {
  const aside = asideName(unfinished, basename(folder))
  const before = await stat(folder).then(() => true, () => false)
  if (before) await disk.rename(folder, aside)
  await disk.rename(unfinished, folder)
  if (before) await disk.remove(aside)
}
