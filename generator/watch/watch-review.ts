import { rename, rm, writeFile } from 'node:fs/promises'
import { basename, dirname, join } from 'node:path'
import type { Findings } from '../../model/findings/schema.ts'
import type { Account } from '../account/account.ts'
import type { Fault } from '../faults/fault.ts'
import type { Program } from '../program/program.ts'
import { keepDrawings } from '../render/drawings.ts'
import { livePage } from './live-page.ts'
import { renderAgain } from './render-again.ts'
import { foldersOf, watchFolders } from './watched-folders.ts'

export interface Watch {
  readonly account: Account
  /** Of the draft that was built before. */
  readonly findings: Findings
  /** Of that draft. */
  readonly folder: string
  /** Aborted when the watch is to end. */
  readonly stop: AbortSignal
  readonly tell: WatchTeller
}

/** Where the watch tells what it does. */
export interface WatchTeller {
  readonly rendered: (page: string, milliseconds: number) => void
  readonly faults: (faults: readonly Fault[]) => void
  /** account.yaml itself changed: what it says of the data needs a build. */
  readonly accountChanged: () => void
}

/** Changes within this many milliseconds of each other are one: editors write in several steps. */
const settled = 40

/** The page that is watched, beside the draft: the draft itself stays as it was built. */
export function livePageOf(draft: string): string {
  return join(dirname(draft), `${basename(draft)}.live.html`)
}

/**
 * Render a review anew at each change of its template, words, looks or notes, until it is stopped. The findings are those of the draft: nothing is computed.
 * What is at fault shows in the page, and the rest of the page with it.
 */
export async function watchReview(program: Program, { account, findings, folder, stop, tell }: Watch): Promise<void> {
  const page = livePageOf(folder)
  const drawings = keepDrawings()
  let lastGood: string | null = null
  let files: readonly string[] = []

  const renderOnce = async (): Promise<void> => {
    const began = performance.now()
    const rendered = await renderAgain(program, account, findings, drawings)
    const { html, faults, unshown } = rendered
    files = rendered.files ?? files
    inside.look(foldersOf(account, files))
    drawings.nextRound()
    if (html !== null) lastGood = html
    await replaceFile(page, livePage(lastGood, unshown))
    tell.rendered(page, performance.now() - began)
    tell.faults(faults)
  }

  const rounds = oneAtATime(renderOnce)
  const inside = watchFolders(account.folder, (path) => {
    if (path === 'account.yaml') tell.accountChanged()
    if (isOutput(path)) return
    rounds.ask()
  })
  rounds.ask()
  try {
    await Promise.race([stopped(stop), rounds.failed])
  } finally {
    inside.close()
    await rounds.idle()
    await rm(page, { force: true })
  }
}

/** What the program itself writes into an account is no reason to render again. */
function isOutput(path: string): boolean {
  return /^(?:drafts|cache|archive)(?:\/|$)/.test(path) || basename(path).startsWith('.')
}

/** A reader finds the old page or the new one, never half of one. */
async function replaceFile(file: string, content: string): Promise<void> {
  const beside = `${file}.new`
  await writeFile(beside, content)
  await rename(beside, file)
}

interface Rounds {
  /** Another round, once changes have settled and the round under way is over. */
  ask(): void
  /** When nothing is under way any more. */
  idle(): Promise<void>
  /** Rejected with what a round throws. */
  readonly failed: Promise<never>
}

function oneAtATime(work: () => Promise<void>): Rounds {
  let [underWay, again]: [Promise<void> | null, boolean] = [null, false]
  let timer: NodeJS.Timeout | undefined
  let fail: (error: unknown) => void = () => undefined
  const failed = new Promise<never>((_, reject) => { fail = reject })
  failed.catch(() => undefined)
  const begin = (): void => {
    if (underWay !== null) {
      again = true
      return
    }
    underWay = work().catch(fail).finally(() => {
      underWay = null
      if (again) {
        again = false
        begin()
      }
    })
  }
  return {
    failed,
    ask: () => {
      clearTimeout(timer)
      timer = setTimeout(begin, settled)
    },
    idle: async () => {
      clearTimeout(timer)
      again = false
      await underWay
    },
  }
}

function stopped(stop: AbortSignal): Promise<void> {
  return new Promise((resolve) => {
    if (stop.aborted) resolve()
    else stop.addEventListener('abort', () => { resolve() }, { once: true })
  })
}
