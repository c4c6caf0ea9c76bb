import { basename, resolve } from 'node:path'
import type { Accounting } from '../../model/intake/intake-tables.ts'
import { checkAccount } from '../review/check-account.ts'
import type { Program } from '../program/program.ts'
import { failureOf, type ExitCode } from './outcome.ts'
import { showProgress } from './show-progress.ts'
import type { Speaker, SpeakerOptions } from './speaker.ts'

export interface CheckFlags extends SpeakerOptions {
  readonly rejects?: string
}

/** `tareline check`. */
export async function runCheck(program: Program, folder: string, flags: CheckFlags, speaker: Speaker): Promise<ExitCode> {
  const shown = showProgress(speaker, false, basename(resolve(folder)))
  try {
    const { accounting, timeline } = await checkAccount(program, folder, flags.rejects, shown.progress)
    speaker.give({ ok: true, faults: [], accounting: accountingResult(accounting), period: timeline.review.name })
    speaker.say(describeAccounting(accounting))
    speaker.say(`mentions from ${timeline.steps[0]} to ${timeline.lastMention}; a build would review ${timeline.review.name}`)
    return 0
  } catch (error) {
    const { exitCode, faults } = failureOf(error)
    speaker.give({ ok: false, faults, accounting: null })
    speaker.faults(faults)
    return exitCode
  }
}

function accountingResult({ received, rejected, duplicates, outOfScope, modelled, reasons, unread, unmapped }: Accounting) {
  return { received, rejected, duplicates, out_of_scope: outOfScope, modelled, reasons, unread, unmapped }
}

function describeAccounting({ received, rejected, duplicates, outOfScope, modelled, reasons, unread, unmapped }: Accounting): string {
  const rows: readonly (readonly [string, number])[] = [
    ['received', received], ['rejected', rejected], ['duplicates', duplicates], ['out of scope', outOfScope], ['modelled', modelled],
  ]
  const because = Object.entries(reasons).map(([name, count]) => [`  ${name}`, count] as const)
  const names = Math.max(...[...rows, ...because].map(([name]) => name.length)) + 2
  const counts = String(received).length
  const line = ([name, count]: readonly [string, number]) => `${name.padEnd(names)}${String(count).padStart(counts)}`
  const unreadable = unread.map(({ column, value, rows: count }) => `  ${column} "${value}": ${count}`)
  const kept = unmapped.map(({ factor, value, mentions }) => `  ${factor} "${value}": ${mentions}`)
  return [
    ...rows.map(line),
    ...(because.length > 0 ? ['reasons', ...because.map(line)] : []),
    ...(unreadable.length > 0 ? ['values that could not be read, the most frequent ones', ...unreadable] : []),
    ...(kept.length > 0 ? ['values the account does not map, kept under their own name', ...kept] : []),
  ].join('\n')
}
