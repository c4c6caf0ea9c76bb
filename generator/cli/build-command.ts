import { basename, relative, resolve } from 'node:path'
import type { Browser } from 'puppeteer'
import { readAccount } from '../account/read-account.ts'
import { buildReview, type Draft } from '../review/build-review.ts'
import type { Fault } from '../faults/fault.ts'
import { openBrowser } from '../print/open-browser.ts'
import type { Program } from '../program/program.ts'
import { failureOf, type ExitCode } from './outcome.ts'
import { showProgress } from './show-progress.ts'
import type { Speaker, SpeakerOptions } from './speaker.ts'
import { runWatch } from './watch-command.ts'
import { listenForStop } from './stop-signals.ts'

export interface BuildFlags extends SpeakerOptions {
  readonly period?: string
  readonly out?: string
  readonly pdf: boolean
  readonly seed: number
  readonly threads?: number
  readonly browser?: string
  readonly watch?: boolean
}

/** `tareline build`: account by account; a faulty one does not stop the others. */
export async function runBuild(program: Program, folders: readonly string[], flags: BuildFlags, speaker: Speaker): Promise<ExitCode> {
  if (flags.out !== undefined && folders.length > 1) {
    speaker.faults([{ code: 'usage', place: '--out', message: 'Unexpected --out with several accounts, expected one.', mend: 'Build one account at a time, or leave --out out.' }])
    return 2
  }
  if (flags.watch === true) {
    const unfit = folders.length > 1 ? 'several accounts' : flags.json === true ? '--json' : null
    if (unfit === null) return runWatch(program, folders[0], flags, speaker)
    speaker.faults([{ code: 'usage', place: '--watch', message: `Unexpected --watch with ${unfit}, expected one account and words for a person.`, mend: 'Watch one account, without --json.' }])
    return 2
  }
  const browsers = sharedBrowser(flags)
  const signals = listenForStop()
  try {
    const outcomes: Outcome[] = []
    for (const folder of folders) {
      const outcome = await buildOne(program, folder, flags, { browser: browsers.open, stop: signals.stop }, speaker)
      outcomes.push(outcome)
      if (outcome.exitCode > 128) break
    }
    const exitCode = outcomes.reduce<ExitCode>((worst, outcome) => (outcome.exitCode > worst ? outcome.exitCode : worst), 0)
    speaker.give({ ok: exitCode === 0, drafts: outcomes.flatMap(({ draft }) => (draft === null ? [] : [draftResult(draft)])), faults: outcomes.flatMap(({ faults }) => faults) })
    return exitCode
  } finally {
    await browsers.close()
    signals.close()
  }
}

interface Outcome {
  readonly exitCode: ExitCode
  readonly draft: Draft | null
  readonly faults: readonly Fault[]
}

/** What all accounts of a run have in common. */
interface Shared {
  readonly browser: () => Promise<Browser>
  readonly stop: AbortSignal
}

async function buildOne(program: Program, folder: string, flags: BuildFlags, { browser, stop }: Shared, speaker: Speaker): Promise<Outcome> {
  const shown = showProgress(speaker, process.stderr.isTTY && flags.json !== true, basename(resolve(folder)))
  try {
    stop.throwIfAborted()
    const account = await readAccount(folder)
    const draft = await buildReview(program, account, {
      period: flags.period, out: flags.out === undefined ? undefined : resolve(flags.out), seed: flags.seed, threads: flags.threads,
      browser: flags.pdf ? browser : null, progress: shown.progress, stop,
    })
    await shown.end()
    speaker.say(describeDraft(draft))
    return { exitCode: 0, draft, faults: [] }
  } catch (error) {
    await shown.end(error)
    const { exitCode, faults } = failureOf(error)
    speaker.faults(faults)
    return { exitCode, draft: null, faults }
  }
}

/** One browser for all accounts, started when it is first asked for. */
function sharedBrowser(flags: BuildFlags): { open: () => Promise<Browser>; close: () => Promise<void> } {
  let opened: Promise<Browser> | undefined
  return {
    open: () => (opened ??= openBrowser({ browser: flags.browser })),
    close: async () => { await opened?.then((browser) => browser.close(), () => undefined) },
  }
}

function draftResult({ folder, findings }: Draft) {
  return {
    account: findings.account, period: findings.period.name, folder,
    movement: findings.opinion.movement, change: findings.opinion.change, serious: findings.caveats.filter(({ severity }) => severity === 'serious').map(({ code }) => code),
  }
}

function describeDraft({ folder, findings }: Draft): string {
  const place = relative(process.cwd(), folder)
  return `${findings.brand}, ${findings.period.name}: draft in ${place.startsWith('..') ? folder : place === '' ? '.' : place}`
}
