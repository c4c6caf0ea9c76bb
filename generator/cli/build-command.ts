import { basename, resolve } from 'node:path'
import type { Fault } from '../faults/fault.ts'
import type { Program } from '../program/program.ts'
import { buildAccount, describeDraft, draftResult, type DraftResult } from './build-account.ts'
import { runBuildAll } from './build-all.ts'
import { failureOf, worstOf, type ExitCode } from './outcome.ts'
import { sharedBrowser, type SharedBrowser } from './shared-browser.ts'
import { showProgress } from './show-progress.ts'
import type { Speaker, SpeakerOptions } from './speaker.ts'
import { listenForStop } from './stop-signals.ts'
import { runWatch } from './watch-command.ts'

export interface BuildFlags extends SpeakerOptions {
  readonly period?: string
  readonly out?: string
  readonly all?: string
  readonly pdf: boolean
  readonly seed: number
  readonly threads?: number
  readonly browser?: string
  readonly watch?: boolean
}

/** `tareline build`: account by account; a faulty one does not stop the others. */
export async function runBuild(program: Program, folders: readonly string[], flags: BuildFlags, speaker: Speaker): Promise<ExitCode> {
  const wrong = usageFault(folders, flags)
  if (wrong !== null) {
    speaker.faults([wrong])
    return 2
  }
  if (flags.watch === true) return runWatch(program, folders[0], flags, speaker)
  return flags.all === undefined ? buildEach(program, folders, flags, speaker) : runBuildAll(program, flags.all, flags, speaker)
}

/** What does not go together. */
function usageFault(folders: readonly string[], { all, out, watch, json }: BuildFlags): Fault | null {
  const usage = (place: string, unexpected: string, expected: string, mend: string): Fault => ({ code: 'usage', place, message: `Unexpected ${unexpected}, expected ${expected}.`, mend })
  if (all !== undefined) {
    const beside = folders.length > 0 ? 'accounts' : out !== undefined ? '--out' : watch === true ? '--watch' : null
    return beside === null ? null : usage('--all', `${beside} beside --all`, 'one or the other', 'Build all accounts of a folder, or name the accounts without --all.')
  }
  if (folders.length === 0) return usage('build', 'build of nothing', 'an account', 'Name the folders of accounts, or with --all the folder around them.')
  if (out !== undefined && folders.length > 1) return usage('--out', '--out with several accounts', 'one', 'Build one account at a time, or leave --out out.')
  const unfit = watch !== true ? null : folders.length > 1 ? 'several accounts' : json === true ? '--json' : null
  return unfit === null ? null : usage('--watch', `--watch with ${unfit}`, 'one account and words for a person', 'Watch one account, without --json.')
}

async function buildEach(program: Program, folders: readonly string[], flags: BuildFlags, speaker: Speaker): Promise<ExitCode> {
  const browser = sharedBrowser(flags.browser)
  const signals = listenForStop()
  try {
    const outcomes: Outcome[] = []
    for (const folder of folders) {
      const outcome = await buildOne(program, folder, flags, { browser, stop: signals.stop, told: folders.length > 1 }, speaker)
      outcomes.push(outcome)
      if (outcome.exitCode > 128) break
    }
    const exitCode = worstOf(outcomes)
    speaker.give({ ok: exitCode === 0, drafts: outcomes.flatMap(({ draft }) => draft ?? []), faults: outcomes.flatMap(({ faults }) => faults) })
    return exitCode
  } finally {
    await browser.close()
    signals.close()
  }
}

interface Outcome {
  readonly exitCode: ExitCode
  readonly draft: DraftResult | null
  readonly faults: readonly Fault[]
}

/** What all accounts of a run have in common. */
interface Shared {
  readonly browser: SharedBrowser
  readonly stop: AbortSignal
  /** Whether faults are told with the account's name. */
  readonly told: boolean
}

async function buildOne(program: Program, folder: string, { period, out, pdf, seed, threads, json }: BuildFlags, { browser, stop, told }: Shared, speaker: Speaker): Promise<Outcome> {
  const name = basename(resolve(folder))
  const shown = showProgress(speaker, process.stderr.isTTY && json !== true, name)
  try {
    const { draft } = await buildAccount(program, folder, { period, out, seed, threads, browser: pdf ? browser.open : null, stop, keep: false }, shown.progress)
    await shown.end()
    speaker.say(describeDraft(draft))
    return { exitCode: 0, draft: draftResult(draft), faults: [] }
  } catch (error) {
    await shown.end(error)
    const { exitCode, faults } = failureOf(error)
    speaker.faults(faults, told ? name : undefined)
    return { exitCode, draft: null, faults }
  }
}
