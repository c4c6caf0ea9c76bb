import { basename, resolve } from 'node:path'
import type { Accounting } from '../../model/intake/intake-tables.ts'
import type { RawInputs } from '../inputs/raw-inputs.ts'
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
    const { tables: { accounting, timeline }, inputs } = await checkAccount(program, folder, flags.rejects, shown.progress)
    speaker.give({ ok: true, faults: [], accounting: accountingResult(accounting), period: timeline.review.name, survey: surveyResult(inputs.survey) })
    speaker.say(describeAccounting(accounting))
    for (const line of describeInputs(inputs)) speaker.say(line)
    speaker.say(`mentions from ${timeline.steps[0]} to ${timeline.lastMention}; a build would review ${timeline.review.name}`)
    return 0
  } catch (error) {
    const { exitCode, faults } = failureOf(error)
    speaker.give({ ok: false, faults, accounting: null, survey: null })
    speaker.faults(faults)
    return exitCode
  }
}

function accountingResult({ received, rejected, duplicates, outOfScope, modelled, reasons, unread, unmapped }: Accounting) {
  return { received, rejected, duplicates, out_of_scope: outOfScope, modelled, reasons, unread, unmapped }
}

function surveyResult(survey: RawInputs['survey']) {
  return survey === null ? null : { waves: survey.waves.length, metrics: survey.metrics.length }
}

function describeInputs({ survey, events, outcome }: RawInputs): readonly string[] {
  const span = (dates: readonly string[]): string => (dates.length === 0 ? '' : `, ${dates[0]} to ${dates.at(-1)}`)
  const ends = survey?.waves.map(({ end }) => end).sort() ?? []
  return [
    ...(survey === null ? [] : [`survey: ${counted(survey.waves.length, 'wave')}, ${counted(survey.metrics.length, 'metric')}${span([survey.waves[0]!.start, ...ends])}`]),
    ...(events === null ? [] : [`events: ${events.length}${span(events.map(({ date }) => date))}`]),
    ...(outcome === null ? [] : [`outcome: ${counted(outcome.length, 'value')}${span(outcome.map(({ date }) => date))}`]),
  ]
}

function counted(count: number, noun: string): string {
  return `${count} ${noun}${count === 1 ? '' : 's'}`
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
