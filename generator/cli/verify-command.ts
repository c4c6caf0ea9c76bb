import { join } from 'node:path'
import type { Browser } from 'puppeteer'
import { largest } from '../archive/compare-findings.ts'
import { sealedInOrder, type SealFolder } from '../archive/read-archive.ts'
import { rebuildSeal, shown, type Rebuilt } from '../archive/rebuild.ts'
import { verifyArchive, type Verified } from '../archive/verify-archive.ts'
import { faultOf } from '../faults/catalogue.ts'
import { MachineFault, type Fault } from '../faults/fault.ts'
import { openBrowser } from '../print/open-browser.ts'
import type { Program } from '../program/program.ts'
import { unlessStopped } from '../review/stopping.ts'
import { failureOf, type ExitCode } from './outcome.ts'
import { showProgress } from './show-progress.ts'
import type { Speaker, SpeakerOptions } from './speaker.ts'
import { listenForStop } from './stop-signals.ts'

export interface VerifyFlags extends SpeakerOptions {
  readonly rebuild?: boolean
  readonly threads?: number
  readonly browser?: string
}

/** `tareline verify`. It reads the archive alone: neither account.yaml nor the inputs need be there. */
export async function runVerify(program: Program, folder: string, flags: VerifyFlags, speaker: Speaker): Promise<ExitCode> {
  const { stop, close } = listenForStop()
  try {
    const verified = await unlessStopped(stop, verifyArchive(join(folder, 'archive')))
    const empty = verified.archive.seals.length === 0 && verified.faults.length === 0 ? [faultOf('archive-empty', 'archive', {})] : []
    const rebuilt = flags.rebuild === true ? await rebuildAll(program, verified, flags, stop, speaker) : null
    const faults = [...verified.faults, ...empty, ...(rebuilt ?? []).flatMap((one) => one.faults)]
    speaker.give({ ok: faults.length === 0, faults, seals: sealResults(verified), end_behind: verified.endBehind, rebuilt: rebuilt?.map(rebuiltResult) ?? null })
    for (const line of [...describeVerified(verified), ...(rebuilt ?? []).flatMap(describeRebuilt)]) speaker.say(line)
    speaker.faults(faults)
    return faults.length === 0 ? 0 : 1
  } catch (error) {
    const { exitCode, faults } = failureOf(error)
    speaker.give({ ok: false, faults, seals: [], end_behind: null, rebuilt: null })
    speaker.faults(faults)
    return exitCode
  } finally {
    close()
  }
}

/** Those seals again whose own files are sound: of another nothing could be said. */
async function rebuildAll(program: Program, verified: Verified, { browser: asked, threads }: VerifyFlags, stop: AbortSignal, speaker: Speaker): Promise<readonly Rebuilt[]> {
  const sound = sealedInOrder(verified.archive).filter((seal) => isSound(seal, verified))
  const browser = sound.length === 0 ? null : await printer(asked, speaker)
  try {
    const rebuilt: Rebuilt[] = []
    for (const seal of sound) {
      const { progress, end } = showProgress(speaker, false, seal.name)
      rebuilt.push(await unlessStopped(stop, rebuildSeal(program, seal, { archive: verified.archive, browser: browser === null ? null : Promise.resolve(browser), threads, progress })))
      await end()
    }
    return rebuilt
  } finally {
    await browser?.close()
  }
}

/** Without a browser everything but the PDFs is compared; one that was asked for must be there. */
async function printer(asked: string | undefined, speaker: Speaker): Promise<Browser | null> {
  try {
    return await openBrowser({ browser: asked })
  } catch (error) {
    if (!(error instanceof MachineFault) || asked !== undefined) throw error
    speaker.note(`PDFs are not printed again: ${error.fault.message}`)
    return null
  }
}

function isSound({ name }: SealFolder, { faults }: Verified): boolean {
  return !faults.some(({ place }: Fault) => place === `archive/${name}` || place.startsWith(`archive/${name}/`))
}

function sealResults(verified: Verified): readonly object[] {
  return sealedInOrder(verified.archive).map((seal) => {
    const { period, revision, reason, sequence, sealed_at, prepared_by, reviewed_by, program, files } = seal.manifest
    return { name: seal.name, sound: isSound(seal, verified), period, revision, reason, sequence, sealed_at, prepared_by, reviewed_by, program, files: files.length, manifest: seal.hash }
  })
}

function rebuiltResult({ name, otherwise, findings, files, compared, printed, refusals }: Rebuilt): object {
  return {
    name, made_otherwise: otherwise, identical: findings !== null && files.length === 0, printed, files_compared: compared, files_that_differ: files,
    values: findings?.values ?? null, differences: findings?.differences ?? null, refusals,
  }
}

function describeVerified(verified: Verified): readonly string[] {
  const seals = sealedInOrder(verified.archive)
  return [
    ...seals.map((seal) => {
      const { sequence, sealed_at: at, prepared_by: prepared, reviewed_by: reviewed, files } = seal.manifest
      return `${sequence}  ${seal.name}  ${isSound(seal, verified) ? 'as it was sealed' : 'NOT as it was sealed'}, ${at.slice(0, 10)}: ${files.length} files, prepared by ${prepared}, reviewed by ${reviewed}`
    }),
    ...(seals.length > 0 && verified.faults.length === 0 ? [`the chain of ${seals.length === 1 ? 'one seal' : `${seals.length} seals`} is whole; its last manifest is ${seals.at(-1)!.hash}`] : []),
    ...(verified.endBehind ? ['the last seal was cut short at its last moment: it stands whole, and the next seal puts its entry at the end of the chain'] : []),
  ]
}

function describeRebuilt({ name, otherwise, findings, files, compared, printed, refusals }: Rebuilt): readonly string[] {
  const others = otherwise.length === 0 ? '' : ` (made with another ${otherwise.join(', ')})`
  const unprinted = printed ? '' : ', the PDF not among them'
  if (findings === null) return [`${name}: can't be made again${others}`, ...refusals.map(({ message, mend }) => `  ${message}\n  ${mend}`)]
  if (files.length === 0) return [`${name}: made again, the same${others}: ${findings.values} values and ${compared} files to the byte${unprinted}`]
  const worst = largest(findings.differences)
  const most = worst === undefined ? '' : `, most of all ${worst.path}: ${shown(worst.sealed)} was sealed, ${shown(worst.rebuilt)} now${worst.relative === null ? '' : ` (${(100 * worst.relative).toPrecision(2)} %)`}`
  return [`${name}: made again, with differences${others}: ${findings.differences.length} of ${findings.values} values${most}; ${files.length} of ${compared} files${unprinted}`, `  ${files.join(', ')}`]
}
