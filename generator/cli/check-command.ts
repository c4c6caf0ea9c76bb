import { basename, join, resolve } from 'node:path'
import type { Accounting, Timeline } from '../../model/intake/intake-tables.ts'
import { readAccount } from '../account/read-account.ts'
import type { RawInputs } from '../inputs/raw-inputs.ts'
import { sampleForAudit, type AuditPost } from '../intake/audit-sample.ts'
import { csvField } from '../intake/rejects.ts'
import { checkAccount } from '../review/check-account.ts'
import type { PartRead } from '../review/parts-read.ts'
import { restoreDrafts } from '../review/restore-drafts.ts'
import { unlessStopped } from '../review/stopping.ts'
import type { Program } from '../program/program.ts'
import { describeAccounting } from './describe-accounting.ts'
import { failureOf, type ExitCode } from './outcome.ts'
import { showProgress } from './show-progress.ts'
import type { Speaker, SpeakerOptions } from './speaker.ts'
import { listenForStop } from './stop-signals.ts'

export interface CheckFlags extends SpeakerOptions {
  readonly rejects?: string
  readonly auditSample?: number
  readonly seed: number
}

/** `tareline check`. */
export async function runCheck(program: Program, folder: string, flags: CheckFlags, speaker: Speaker): Promise<ExitCode> {
  const shown = showProgress(speaker, false, basename(resolve(folder)))
  const { stop, close } = listenForStop()
  try {
    await restoreDrafts(join(folder, 'drafts'))
    const { tables: { accounting, timeline }, inputs, read } = await unlessStopped(stop, checkAccount(program, folder, flags.rejects, shown.progress))
    const sample = flags.auditSample === undefined ? null
      : await unlessStopped(stop, sampleForAudit(await readAccount(folder), { size: flags.auditSample, seed: flags.seed, progress: shown.progress.detail }))
    // The ids are for a spreadsheet: nothing else goes to stdout beside them.
    const say = sample === null ? speaker.say : speaker.note
    speaker.give({ ok: true, faults: [], accounting: accountingResult(accounting), period: timeline.review.name, survey: surveyResult(inputs.survey), events: eventsResult(inputs.events, timeline), ...listeningResult(inputs), read, ...sampleResult(sample) })
    say(describeAccounting(accounting))
    for (const line of describeInputs(inputs, timeline)) say(line)
    say(`mentions from ${timeline.steps[0]} to ${timeline.lastMention}; a build would review ${timeline.review.name}`)
    for (const line of describeParts(read)) say(line)
    if (sample !== null) speaker.say(['venue,id', ...sample.map(({ venue, id }) => `${csvField(venue)},${csvField(id)}`)].join('\n'))
    return 0
  } catch (error) {
    const { exitCode, faults } = failureOf(error)
    speaker.give({ ok: false, faults, accounting: null, survey: null, events: null, benchmark: null, coding_audit: null, importance: null })
    speaker.faults(faults)
    return exitCode
  } finally {
    close()
  }
}

function accountingResult({ received, rejected, duplicates, outOfScope, modelled, reasons, unread, unmapped }: Accounting) {
  return { received, rejected, duplicates, out_of_scope: outOfScope, modelled, reasons, unread, unmapped }
}

function sampleResult(sample: readonly AuditPost[] | null) {
  return sample === null ? {} : { audit_sample: sample.map(({ venue, id }) => ({ venue, id })) }
}

function surveyResult(survey: RawInputs['survey']) {
  return survey === null ? null : { waves: survey.waves.length, metrics: survey.metrics.length }
}

/** Events, those of them that are left out because they are dated after the period under review, and those that are kept though there are no mentions of their day. */
function eventsResult(events: RawInputs['events'], { steps, lastMention, review }: Timeline) {
  if (events === null) return null
  const after = events.filter(({ date }) => date > review.end)
  const outside = events.filter(({ date }) => date <= review.end && (date < steps[0] || date > lastMention))
  return { events: events.length, after_period: after.length, outside_mentions: outside.length }
}

function describeEvents(events: RawInputs['events'], timeline: Timeline): readonly string[] {
  const result = eventsResult(events, timeline)
  if (events === null || result === null) return []
  if (events.length === 0) return ['events: none']
  return [
    `events: ${events.length}, ${events[0].date} to ${events.at(-1)?.date}`,
    ...(result.after_period === 0 ? [] : [`  after ${timeline.review.name}, so left out of its review: ${result.after_period}`]),
    ...(result.outside_mentions === 0 ? [] : [`  before the first mentions or after the last, and kept: ${result.outside_mentions}`]),
  ]
}

/** What is read for the questions who is speaking and how well they are coded. */
function listeningResult({ benchmark, audit, importance }: RawInputs) {
  return {
    benchmark: benchmark === null ? null : { margins: benchmark.length, levels: benchmark.reduce((sum, { levels }) => sum + levels.length, 0) },
    coding_audit: audit === null ? null : { venues: new Set(audit.map(({ venue }) => venue)).size, codings: audit.reduce((sum, { count }) => sum + count, 0) },
    importance: importance === null ? null : {
      kind: importance.input.kind, topics: importance.input.topics.length,
      respondents: importance.input.kind === 'respondents' ? importance.input.overall.length : null, incomplete: importance.incomplete,
    },
  }
}

function describeListening(inputs: RawInputs): readonly string[] {
  const { benchmark, coding_audit: audit, importance } = listeningResult(inputs)
  const respondents = importance?.respondents ?? null
  const incomplete = importance === null || importance.incomplete === 0 ? '' : `, ${counted(importance.incomplete, 'row')} left out for want of an answer`
  return [
    ...(benchmark === null ? [] : [`benchmark: ${counted(benchmark.margins, 'margin')}, ${counted(benchmark.levels, 'level')}`]),
    ...(audit === null ? [] : [`coding audit: ${counted(audit.codings, 'coding')} in ${counted(audit.venues, 'venue')}`]),
    ...(importance === null ? [] : [`importance: ${counted(importance.topics, 'topic')}, ${respondents === null ? 'as stated' : counted(respondents, 'respondent')}${incomplete}`]),
  ]
}

function describeInputs(inputs: RawInputs, timeline: Timeline): readonly string[] {
  const { survey, events, outcome } = inputs
  const span = (dates: readonly string[]): string => (dates.length === 0 ? '' : `, ${dates[0]} to ${dates.at(-1)}`)
  const ends = survey?.waves.map(({ end }) => end).sort() ?? []
  return [
    ...(survey === null ? [] : [`survey: ${counted(survey.waves.length, 'wave')}, ${counted(survey.metrics.length, 'metric')}${span([survey.waves[0]!.start, ...ends])}`]),
    ...describeEvents(events, timeline),
    ...(outcome === null ? [] : [`outcome: ${counted(outcome.length, 'value')}${span(outcome.map(({ date }) => date))}`]),
    ...describeListening(inputs),
  ]
}

const mostFiles = 6

/** A line for each part that is the account's own, and one for those that are the house's. */
function describeParts(read: readonly PartRead[]): readonly string[] {
  const told = (files: readonly string[]): string => (files.length <= mostFiles ? files.join(', ') : `${files.length} files, ${files[0]} to ${files.at(-1)}`)
  const house = read.filter(({ part, files }) => files.length === 0 && part !== 'notes').map(({ part }) => part)
  return [
    ...read.filter(({ files }) => files.length > 0).map(({ part, files }) => `${part}: ${told(files)}`),
    ...(house.length === 0 ? [] : [`of the house: ${house.join(', ')}`]),
  ]
}

function counted(count: number, noun: string): string {
  return `${count} ${noun}${count === 1 ? '' : 's'}`
}
