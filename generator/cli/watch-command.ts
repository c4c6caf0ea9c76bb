import { relative, resolve } from 'node:path'
import { createInterface } from 'node:readline'
import type { Browser } from 'puppeteer'
import type { Account } from '../account/account.ts'
import { readAccount } from '../account/read-account.ts'
import { openBrowser } from '../print/open-browser.ts'
import type { Program } from '../program/program.ts'
import { withAccountLock } from '../review/account-lock.ts'
import { buildReview, type Draft } from '../review/build-review.ts'
import { watchReview } from '../watch/watch-review.ts'
import type { BuildFlags } from './build-command.ts'
import { failureOf, type ExitCode } from './outcome.ts'
import { showProgress } from './show-progress.ts'
import type { Speaker } from './speaker.ts'
import { listenForStop } from './stop-signals.ts'

/**
 * `tareline build ACCOUNT --watch`: build the draft without its PDF, then render a page beside it anew at each change of template, words, looks and notes.
 * Enter builds the draft again, with its PDF; a change of account.yaml builds it without. Ends with 0 when it is stopped.
 */
export async function runWatch(program: Program, folder: string, flags: BuildFlags, speaker: Speaker): Promise<ExitCode> {
  const signals = listenForStop()
  const build = builderOf(program, flags, speaker)
  const lines = createInterface({ input: process.stdin })
  try {
    let account = await readAccount(folder)
    let draft = await build(account, null, signals.stop)
    const printing = printer(async () => { await build(account, () => openBrowser({ browser: flags.browser }), signals.stop) }, speaker)
    lines.on('line', () => { printing() })
    while (!signals.stop.aborted) {
      await watchUntilAccountChanges(program, account, draft, signals.stop, speaker)
      if (signals.stop.aborted) break
      try {
        account = await readAccount(folder)
        draft = await build(account, null, signals.stop)
      } catch (error) {
        tellFailure(error, speaker)
      }
    }
    return 0
  } catch (error) {
    // whoever watches ends it by a signal, whatever it was doing then
    return signals.stop.aborted ? 0 : tellFailure(error, speaker)
  } finally {
    lines.close()
    signals.close()
  }
}

type Build = (account: Account, browser: (() => Promise<Browser>) | null, stop: AbortSignal) => Promise<Draft>

function builderOf(program: Program, { period, out, seed, threads }: BuildFlags, speaker: Speaker): Build {
  return async (account, open, stop) => {
    const shown = showProgress(speaker, process.stderr.isTTY, account.account)
    const browser = open === null ? null : open()
    try {
      const draft = await withAccountLock(account.folder, 'build --watch', () => buildReview(program, account, {
        period, out: out === undefined ? undefined : resolve(out), seed, threads, browser: browser === null ? null : () => browser, progress: shown.progress, stop,
      }))
      await shown.end()
      speaker.say(`${draft.findings.brand}, ${draft.findings.period.name}: draft in ${here(draft.folder)}${browser === null ? ', without its PDF; press Enter to make it' : ''}`)
      return draft
    } catch (error) {
      await shown.end(error)
      throw error
    } finally {
      await browser?.then((opened) => opened.close(), () => undefined)
    }
  }
}

async function watchUntilAccountChanges(program: Program, account: Account, { findings, folder }: Draft, stop: AbortSignal, speaker: Speaker): Promise<void> {
  const changed = new AbortController()
  await watchReview(program, {
    account, findings, folder, stop: AbortSignal.any([stop, changed.signal]),
    tell: {
      rendered: (page, milliseconds) => { speaker.say(`${here(page)} (${(milliseconds / 1000).toFixed(2)} s)`) },
      faults: (faults) => { speaker.faults(faults) },
      accountChanged: () => { changed.abort() },
    },
  })
}

/** One print at a time; asked for while one is under way, it is not made twice. */
function printer(print: () => Promise<void>, speaker: Speaker): () => void {
  let underWay = false
  return () => {
    if (underWay) return
    underWay = true
    print().catch((error: unknown) => { tellFailure(error, speaker) }).finally(() => { underWay = false })
  }
}

function tellFailure(error: unknown, speaker: Speaker): ExitCode {
  const { exitCode, faults } = failureOf(error)
  speaker.faults(faults)
  return exitCode
}

function here(path: string): string {
  const place = relative(process.cwd(), path)
  return place.startsWith('..') ? path : place
}
