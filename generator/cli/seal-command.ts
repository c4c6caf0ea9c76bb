import { join, relative } from 'node:path'
import { readAccount } from '../account/read-account.ts'
import { theDisk } from '../archive/disk.ts'
import { sha256Of, writtenManifest } from '../archive/manifest.ts'
import { sealReview, type Sealed } from '../archive/seal-review.ts'
import { writeRefusal } from '../faults/write-refusal.ts'
import { namedPeriod } from '../intake/review-period.ts'
import type { Program } from '../program/program.ts'
import { readHouse } from '../review/house.ts'
import { inputPaths } from '../review/record-inputs.ts'
import { restoreDrafts } from '../review/restore-drafts.ts'
import { failureOf, type ExitCode } from './outcome.ts'
import type { Speaker, SpeakerOptions } from './speaker.ts'
import { listenForStop } from './stop-signals.ts'

export interface SealFlags extends SpeakerOptions {
  readonly period: string
  readonly revise?: string
}

/** `tareline seal`. Once it is writing, a signal does not cut it short: it takes no longer than hashing the inputs. */
export async function runSeal(program: Program, folder: string, flags: SealFlags, speaker: Speaker): Promise<ExitCode> {
  const { stop, close } = listenForStop()
  try {
    const sealed = await seal(program, folder, flags, stop)
    speaker.give({ ok: true, faults: [], seal: sealResult(sealed) })
    speaker.say(describeSeal(sealed))
    return 0
  } catch (error) {
    const { exitCode, faults } = failureOf(error)
    speaker.give({ ok: false, faults, seal: null })
    speaker.faults(faults)
    return exitCode
  } finally {
    close()
  }
}

async function seal(program: Program, given: string, { period, revise }: SealFlags, stop: AbortSignal): Promise<Sealed> {
  const account = await readAccount(given)
  const { folder } = account
  namedPeriod(account, period)
  await restoreDrafts(join(folder, 'drafts'))
  const { kept, notKept } = inputPaths(account, await readHouse(program, account), period)
  stop.throwIfAborted()
  return sealReview({
    folder, account: account.account, period, inputs: [...kept, ...notKept], reason: revise ?? null, onePerson: account.onePersonSeals,
    program, disk: theDisk, now: new Date().toISOString(),
  }).catch((error: unknown) => { throw writeRefusal('archive-unwritable', join(folder, 'archive'), error) })
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
