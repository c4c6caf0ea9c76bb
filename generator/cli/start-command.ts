import { basename, join, relative, resolve } from 'node:path'
import type { Fault } from '../faults/fault.ts'
import type { Program } from '../program/program.ts'
import { startAccount, type StartedAccount } from '../start/start-account.ts'
import { runCheck } from './check-command.ts'
import { failureOf, type ExitCode } from './outcome.ts'
import type { Speaker, SpeakerOptions } from './speaker.ts'
import { listenForStop } from './stop-signals.ts'

export interface StartFlags extends SpeakerOptions {
  readonly from?: string
}

/**
 * `tareline start`. What was laid out stays whatever the check of it finds: there was nothing before, and what it finds is mended there.
 * With a file, faults of the check are the command's own and it ends with 1; without one they are what there is to fill in, and it ends with 0.
 */
export async function runStart(program: Program, folder: string, flags: StartFlags, speaker: Speaker): Promise<ExitCode> {
  const { stop, close } = listenForStop()
  let started: StartedAccount
  try {
    started = await startAccount(folder, { from: flags.from ?? null, stop, progress: (text) => { speaker.note(`${basename(resolve(folder))}: ${text}`) } })
  } catch (error) {
    const { exitCode, faults } = failureOf(error)
    speaker.give({ ok: false, folder: null, faults, accounting: null })
    speaker.faults(faults)
    return exitCode
  } finally {
    close()
  }
  const place = told(started.folder)
  speaker.say(`account laid out in ${place}`)
  for (const line of describeProposal(started)) speaker.say(line)
  let checked: object = {}
  const found: Fault[] = []
  const checking: Speaker = { ...speaker, give: (result) => { checked = result }, faults: (faults) => { found.push(...faults) } }
  const exitCode = await runCheck(program, started.folder, { ...flags, seed: 1 }, checking)
  const toFillIn = started.proposal === null && exitCode === 1
  speaker.give({ ...checked, ...(toFillIn ? { ok: true, faults: [], to_fill_in: found } : {}), folder: started.folder, ...proposalResult(started) })
  if (!toFillIn) speaker.faults(found)
  else for (const { message, mend } of found) speaker.say(`to be filled in: ${message}\n  ${mend}`)
  speaker.say(`next: ${nextStep(place, exitCode === 0)}`)
  return toFillIn ? 0 : exitCode
}

function told(folder: string): string {
  const place = relative(process.cwd(), folder)
  return place.startsWith('..') ? folder : place === '' ? '.' : place
}

function nextStep(place: string, sound: boolean): string {
  const quoted = /^[\w./-]+$/.test(place) ? place : `'${place.replaceAll("'", "'\\''")}'`
  return sound ? `read ${join(place, 'account.yaml')} line by line, then: tareline build ${quoted}`
    : `the folder stays; mend ${join(place, 'account.yaml')} there, then: tareline check ${quoted}`
}

function describeProposal({ proposal, mentions }: StartedAccount): readonly string[] {
  if (proposal === null) return []
  const { columns, undecided, unused } = proposal.columns
  const width = Math.max(0, ...columns.map(({ role }) => role.length))
  return [
    `the mentions were copied to ${mentions}: an account reads nothing outside its folder`,
    ...columns.map(({ role, column, reason, sure }) => `  ${role.padEnd(width)}  ${shown(column.name)}: ${sure ? '' : 'a guess; '}${shown(reason)}`),
    ...undecided.map(({ role, candidates }) => `can't be told: ${role}${candidates.length === 0 ? '' : `, perhaps ${candidates.map(shown).join(', ')}`}`),
    ...(proposal.score === null && columns.some(({ role }) => role === 'score') ? ['can\'t be told: what the scores count'] : []),
    ...(proposal.tally.times?.rival == null ? [] : [`can't be told: day or month first; taken as '${proposal.tally.times.format}'`]),
    ...(proposal.score?.kind !== 'labels' || proposal.score.unknown.length === 0 ? [] : [`without a score: ${proposal.score.unknown.slice(0, 5).map(({ value, rows }) => `${shown(value)} (${rows})`).join(', ')}`]),
    ...(proposal.locale.locale === 'en-GB' ? [] : [`locale ${proposal.locale.locale}: ${shown(proposal.locale.reason)}`]),
    ...unused.slice(0, 12).map(({ name, reason }) => `not used: ${shown(name)}, ${shown(reason)}`),
    ...(unused.length > 12 ? [`not used either: ${unused.length - 12} more`] : []),
  ]
}

/** A text from the data on a terminal: on one line, nothing in it that steers it. */
function shown(text: string): string {
  return text.replace(/\p{C}+/gu, ' ').slice(0, 160)
}

function proposalResult({ proposal, mentions }: StartedAccount): object {
  if (proposal === null) return { mentions, proposed: null, undecided: [] }
  const { columns: { columns, undecided, unused }, score, tally, axis, brand } = proposal
  return {
    mentions,
    proposed: {
      columns: columns.map(({ role, column, reason, sure, alternatives }) => ({ ours: role, theirs: column.name, reason, sure, alternatives })), unused,
      score: score?.kind === 'labels' ? { labels: Object.fromEntries(score.labels.map(({ label, score: value }) => [label, value])), unknown: score.unknown.map(({ value }) => value) }
        : score === null ? null : { range: [score.low, score.high] },
      time_format: tally.times?.format ?? null, other_time_format: tally.times?.rival ?? null, grid: axis.grid, reporting: axis.reporting, locale: proposal.locale.locale, brand: brand?.name ?? null,
    },
    undecided,
  }
}
