import { relative, resolve } from 'node:path'
import type { Browser } from 'puppeteer'
import { readAccount } from '../account/read-account.ts'
import type { Program } from '../program/program.ts'
import { withAccountLock } from '../review/account-lock.ts'
import { buildReview, type Draft } from '../review/build-review.ts'
import type { Progress } from '../review/stages.ts'
import { unchangedDraft } from '../review/unchanged-draft.ts'
import { plainText } from './plain-text.ts'

export interface BuildWishes {
  readonly period?: string | undefined
  readonly out?: string | undefined
  readonly seed: number
  readonly threads?: number | undefined
  /** null: no PDF. */
  readonly browser: (() => Promise<Browser>) | null
  readonly stop: AbortSignal
  /** Leave a draft alone that is what would be built. */
  readonly keep: boolean
}

export interface BuiltAccount {
  readonly draft: Draft
  /** It stood there already. */
  readonly unchanged: boolean
}

/** Make the draft of one account, while nobody else is at work on it. */
export async function buildAccount(program: Program, folder: string, wishes: BuildWishes, progress: Progress): Promise<BuiltAccount> {
  const { period, out, seed, threads, browser, stop, keep } = wishes
  stop.throwIfAborted()
  const account = await readAccount(folder)
  return withAccountLock(account.folder, 'build', async () => {
    const printer = browser === null || !keep ? null : await browser()
    const standing = keep ? await unchangedDraft(program, account, { period, seed, browser: printer === null ? null : await printer.version() }) : null
    if (standing !== null) return { draft: standing, unchanged: true }
    return { draft: await buildReview(program, account, { period, out: out === undefined ? undefined : resolve(out), seed, threads, browser, progress, stop }), unchanged: false }
  })
}

/** What `--json` says of a draft. */
export interface DraftResult {
  readonly account: string
  readonly period: string
  readonly folder: string
  readonly movement: Draft['findings']['opinion']['movement']
  readonly change: Draft['findings']['opinion']['change']
  /** Codes of the caveats that are serious. */
  readonly serious: readonly string[]
}

export function draftResult({ folder, findings }: Draft): DraftResult {
  return {
    account: findings.account, period: findings.period.name, folder,
    movement: findings.opinion.movement, change: findings.opinion.change, serious: findings.caveats.filter(({ severity }) => severity === 'serious').map(({ code }) => code),
  }
}

export function describeDraft({ folder, findings }: Draft): string {
  const place = relative(process.cwd(), folder)
  return `${plainText(findings.brand)}, ${findings.period.name}: draft in ${place.startsWith('..') ? folder : place === '' ? '.' : place}`
}
