import { join, relative } from 'node:path'
import type { Account } from '../account/account.ts'
import { readAccount } from '../account/read-account.ts'
import { theDisk } from '../archive/disk.ts'
import { sha256Of, writtenManifest } from '../archive/manifest.ts'
import { sealReview, type Sealed } from '../archive/seal-review.ts'
import { archivePageName, writeArchivePage } from '../archive-page/write-archive-page.ts'
import { faultOf } from '../faults/catalogue.ts'
import type { Fault } from '../faults/fault.ts'
import { writeRefusal } from '../faults/write-refusal.ts'
import { namedPeriod } from '../intake/review-period.ts'
import type { Program } from '../program/program.ts'
import { withAccountLock } from '../review/account-lock.ts'
import { readHouse, type House } from '../review/house.ts'
import { inputPaths } from '../review/record-inputs.ts'
import { restoreDrafts } from '../review/restore-drafts.ts'
import { failureOf, type ExitCode } from './outcome.ts'
import type { Speaker, SpeakerOptions } from './speaker.ts'
import { listenForStop } from './stop-signals.ts'

export interface SealFlags extends SpeakerOptions {
  readonly period: string
  readonly revise?: string
}

/** `tareline seal`. Once it is writing, a signal does not cut it short: it takes no longer than hashing the inputs and drawing the archive's page. */
export async function runSeal(program: Program, folder: string, flags: SealFlags, speaker: Speaker): Promise<ExitCode> {
  const { stop, close } = listenForStop()
  try {
    const { sealed, warnings } = await seal(program, folder, flags, stop)
    speaker.give({ ok: true, faults: [], warnings, seal: sealResult(sealed) })
    speaker.say(describeSeal(sealed))
    speaker.faults(warnings)
    return 0
  } catch (error) {
    const { exitCode, faults } = failureOf(error)
    speaker.give({ ok: false, faults, warnings: [], seal: null })
    speaker.faults(faults)
    return exitCode
  } finally {
    close()
  }
}

interface SealedAndTold {
  readonly sealed: Sealed
  readonly warnings: readonly Fault[]
}

/** While nobody else builds or seals the account. */
async function seal(program: Program, given: string, flags: SealFlags, stop: AbortSignal): Promise<SealedAndTold> {
  const account = await readAccount(given)
  namedPeriod(account, flags.period)
  return withAccountLock(account.folder, 'seal', () => sealAlone(program, account, flags, stop))
}

async function sealAlone(program: Program, account: Account, { period, revise }: SealFlags, stop: AbortSignal): Promise<SealedAndTold> {
  const { folder } = account
  await restoreDrafts(join(folder, 'drafts'))
  const house = await readHouse(program, account)
  const { kept, notKept } = inputPaths(account, house, period)
  stop.throwIfAborted()
  const sealed = await sealReview({
    folder, account: account.account, period, inputs: [...kept, ...notKept], reason: revise ?? null, onePerson: account.onePersonSeals,
    program, disk: theDisk, now: new Date().toISOString(),
  }).catch((error: unknown) => { throw writeRefusal('archive-unwritable', join(folder, 'archive'), error) })
  return { sealed, warnings: await writePage(program, account, house) }
}

/** The archive's page with the new seal in it. The seal stands whatever becomes of the page. */
async function writePage({ templates }: Program, { folder, brand }: Account, { words, theme }: House): Promise<readonly Fault[]> {
  try {
    await writeArchivePage(join(folder, 'archive'), templates, { brand, words, theme }, theDisk)
    return []
  } catch (error) {
    return [faultOf('archive-page-unwritten', `archive/${archivePageName}`, { reason: error instanceof Error ? error.message : String(error) })]
  }
}

function sealResult({ name, folder, manifest }: Sealed) {
  const { account, period, revision, reason, sequence, sealed_at, prepared_by, reviewed_by } = manifest
  return { account, period, name, folder, revision, reason, sequence, sealed_at, prepared_by, reviewed_by, manifest: sha256Of(writtenManifest(manifest)) }
}

function describeSeal(sealed: Sealed): string {
  const { account, name, folder, sequence, prepared_by: prepared, reviewed_by: reviewed, manifest } = sealResult(sealed)
  const place = relative(process.cwd(), folder)
  return [
    `${account}, ${name}: sealed in ${place.startsWith('..') ? folder : place}, number ${sequence} of the archive; prepared by ${prepared}, reviewed by ${reviewed}`,
    `manifest ${manifest}: note it elsewhere, and nobody can rewrite the archive unseen`,
  ].join('\n')
}
