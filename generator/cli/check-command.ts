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
    const { accounting } = await checkAccount(program, folder, flags.rejects, shown.progress)
    speaker.give({ ok: true, faults: [], accounting: accountingResult(accounting) })
    speaker.say(describeAccounting(accounting))
    return 0
  } catch (error) {
    const { exitCode, faults } = failureOf(error)
    speaker.give({ ok: false, faults, accounting: null })
    speaker.faults(faults)
    return exitCode
  }
}

function accountingResult({ received, rejected, duplicates, outOfScope, modelled, reasons, unmapped }: Accounting) {
  return { received, rejected, duplicates, out_of_scope: outOfScope, modelled, reasons, unmapped }
}

function describeAccounting({ received, rejected, duplicates, outOfScope, modelled, reasons, unmapped }: Accounting): string {
  const rows: readonly (readonly [string, number])[] = [
    ['received', received], ['rejected', rejected], ['out of scope', outOfScope], ['duplicates', duplicates], ['modelled', modelled],
  ]
  const width = Math.max(...rows.map(([, count]) => String(count).length))
  const line = ([name, count]: readonly [string, number]) => `${name.padEnd(14)}${String(count).padStart(width)}`
  const because = Object.entries(reasons).map((entry) => `  ${entry[0].padEnd(18)}${String(entry[1]).padStart(width)}`)
  const kept = unmapped.map(({ factor, value, mentions }) => `  ${factor} "${value}": ${mentions}`)
  return [
    ...rows.map(line),
    ...(because.length > 0 ? ['reasons', ...because] : []),
    ...(kept.length > 0 ? ['values the account does not map, kept under their own name', ...kept] : []),
  ].join('\n')
}
