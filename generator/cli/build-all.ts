import { existsSync } from 'node:fs'
import { availableParallelism, totalmem } from 'node:os'
import { join, relative } from 'node:path'
import type { Program } from '../program/program.ts'
import { accountFolders } from '../review/account-folders.ts'
import { unlessStopped } from '../review/stopping.ts'
import { buildAccount, draftResult, type BuildWishes } from './build-account.ts'
import type { BuildFlags } from './build-command.ts'
import { closingTable, type AccountOutcome } from './closing-table.ts'
import { failureOf, worstOf, type ExitCode } from './outcome.ts'
import { sharedBrowser } from './shared-browser.ts'
import { sharesOf } from './shares.ts'
import { showBatch, type ShownBatch } from './show-batch.ts'
import { sideBySide } from './side-by-side.ts'
import type { Speaker } from './speaker.ts'
import { listenForStop } from './stop-signals.ts'

/**
 * `tareline build --all FOLDER`: every account in a folder, a few at a time in this one process, with one browser. A faulty account is told and stops no
 * other; a draft that is what would be built stays as it is, so that a run after an interruption does only what is left.
 */
export async function runBuildAll(program: Program, around: string, flags: BuildFlags, speaker: Speaker): Promise<ExitCode> {
  const browser = sharedBrowser(flags.browser)
  const { stop, close } = listenForStop()
  try {
    const names = await accountFolders(around)
    // a machine without a browser is told once, before anything is computed
    if (flags.pdf) await unlessStopped(stop, browser.open())
    const { atOnce, threads } = sharesOf(names.length, flags.threads ?? availableParallelism(), totalmem())
    const shown = showBatch(speaker, process.stderr.isTTY && flags.json !== true, names, atOnce)
    const wishes: BuildWishes = { period: flags.period, seed: flags.seed, threads, browser: flags.pdf ? browser.open : null, stop, keep: true }
    const outcomes = await sideBySide(names, atOnce, (name, index) => buildShown(program, join(around, name), { name, index }, wishes, shown))
    await shown.end()
    return tell(around, outcomes, speaker)
  } catch (error) {
    const { exitCode, faults } = failureOf(error)
    speaker.give({ ok: false, accounts: [], drafts: [], faults })
    speaker.faults(faults)
    return exitCode
  } finally {
    await browser.close()
    close()
  }
}

async function buildShown(program: Program, folder: string, { name, index }: { readonly name: string; readonly index: number }, wishes: BuildWishes, shown: ShownBatch): Promise<AccountOutcome> {
  const progress = shown.begin(index)
  try {
    const { draft, unchanged } = await buildAccount(program, folder, wishes, progress)
    const outcome = unchanged ? 'unchanged' : 'built'
    shown.settle(index, outcome, [])
    const file = existsSync(join(draft.folder, 'review.pdf')) ? 'review.pdf' : 'review.html'
    return { name, exitCode: 0, outcome, draft: draftResult(draft), file: relative(folder, join(draft.folder, file)), faults: [] }
  } catch (error) {
    const { exitCode, faults } = failureOf(error)
    const outcome = exitCode > 128 ? 'stopped' : 'failed'
    shown.settle(index, outcome, outcome === 'stopped' ? [] : faults)
    return { name, exitCode, outcome, draft: null, file: null, faults }
  }
}

/** Faults were told as they came, but that all was stopped is told once. */
function tell(around: string, outcomes: readonly AccountOutcome[], speaker: Speaker): ExitCode {
  const exitCode = worstOf(outcomes)
  const stopped = outcomes.find(({ outcome }) => outcome === 'stopped')?.faults ?? []
  speaker.give({
    ok: exitCode === 0,
    accounts: outcomes.map(({ name, outcome, draft, faults }) => ({ name, outcome, draft, faults })),
    drafts: outcomes.flatMap(({ draft }) => draft ?? []),
    faults: [...outcomes.flatMap(({ outcome, faults }) => (outcome === 'failed' ? faults : [])), ...stopped],
  })
  speaker.say(closingTable(outcomes, around, process.stdout.columns ?? 80))
  speaker.faults(stopped)
  return exitCode
}
