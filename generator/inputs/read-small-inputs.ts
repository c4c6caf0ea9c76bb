import type { AuditCount, BenchmarkMargin } from '../../model/inputs/small-inputs.ts'
import type { Account, FileSet } from '../account/account.ts'
import { faultOf } from '../faults/catalogue.ts'
import { InputFault, type Fault } from '../faults/fault.ts'
import { byText } from '../intake/level-names.ts'
import { auditColumns, auditCounts, auditRowOf } from './audit-counts.ts'
import { benchmarkColumns, benchmarkFaults, benchmarkRow, marginsOf } from './benchmark-margins.ts'
import type { TableColumns } from './csv-table.ts'
import { eventColumns, eventRow, outcomeColumns, outcomeFaults, outcomeRow } from './dated-rows.ts'
import type { RawEvent, RawInputs, RawOutcome, RawSurvey } from './raw-inputs.ts'
import { readImportance } from './read-importance.ts'
import { notGiven, readRows, type Input, type Read } from './read-rows.ts'
import { headlineOf, surveyKeyFaults } from './survey-keys.ts'
import { clashesOf, surveyOfRows } from './survey-of-rows.ts'
import { surveyColumns, surveyRow } from './survey-row.ts'

/** Faults told at once; inputs with more are wrong as a whole. */
const mostFaults = 100

/**
 * Read the small inputs of an account: survey, events, outcome, benchmark, coding audit, importance.
 *
 *   files ──cut──▶ rows ──each checked──▶ values ──checked together, and against the account──▶ RawInputs
 *
 * @throws {InputFault} with the faults of all of them, each at its file, line and column
 */
export async function readSmallInputs(account: Account): Promise<RawInputs> {
  const survey = await readSurvey(account)
  const events = await readEvents(account)
  const outcome = await readOutcome(account)
  const benchmark = await readBenchmark(account)
  const audit = await readAudit(account)
  const importance = await readImportance(account)
  const all = [survey, events, outcome, benchmark, audit, importance]
  const faults = all.flatMap((input) => input.faults)
  if (faults.length > 0) throw new InputFault(faults.slice(0, mostFaults))
  return {
    survey: survey.value, events: events.value, outcome: outcome.value, benchmark: benchmark.value, audit: audit.value, importance: importance.value,
    files: all.flatMap((input) => input.files),
  }
}

async function readSurvey(account: Account): Promise<Input<RawSurvey>> {
  if (account.survey === null) return notGiven
  const read = await readRows(account, account.survey, surveyColumns, surveyRow)
  const { value: rows, files } = read
  const wrong = [...read.faults, ...emptyFaults(read, account.survey, surveyColumns), ...clashesOf(rows)]
  // Metrics and waves are not all known while rows are wrong: the account is held against them only then.
  if (wrong.length > 0) return { value: null, files, faults: wrong }
  const waves = surveyOfRows(rows, account.survey.labels)
  const headline = headlineOf(waves, account)
  return { value: { ...waves, headline }, files, faults: surveyKeyFaults(waves, headline, account) }
}

async function readEvents(account: Account): Promise<Input<readonly RawEvent[]>> {
  if (account.events === null) return notGiven
  const { value, files, faults } = await readRows(account, account.events, eventColumns, eventRow)
  return { value: value.toSorted((a, b) => byText(a.date, b.date)), files, faults }
}

async function readOutcome(account: Account): Promise<Input<readonly RawOutcome[]>> {
  if (account.outcome === null) return notGiven
  const { value, files, faults } = await readRows(account, account.outcome, outcomeColumns, outcomeRow)
  const rows = value.toSorted((a, b) => byText(a.date, b.date))
  const together = outcomeFaults(rows, account.outcome.files[0]!).filter(({ code }) => faults.length === 0 || code !== 'outcome-short')
  return { value: rows.map(({ date, value: observed, market }) => ({ date, value: observed, market })), files, faults: [...faults, ...together] }
}

async function readBenchmark(account: Account): Promise<Input<readonly BenchmarkMargin[]>> {
  if (account.benchmark === null) return notGiven
  const read = await readRows(account, account.benchmark, benchmarkColumns, benchmarkRow)
  // Shares have a sum to keep only where all are there.
  const wrong = read.faults.length > 0 ? read.faults : [...emptyFaults(read, account.benchmark, benchmarkColumns), ...benchmarkFaults(read.value)]
  return { value: wrong.length > 0 ? null : marginsOf(read.value), files: read.files, faults: wrong }
}

async function readAudit(account: Account): Promise<Input<readonly AuditCount[]>> {
  if (account.codingAudit === null) return notGiven
  const read = await readRows(account, account.codingAudit, auditColumns, auditRowOf(account))
  return { value: auditCounts(read.value), files: read.files, faults: [...read.faults, ...emptyFaults(read, account.codingAudit, auditColumns)] }
}

/** Files that hold no row at all, though nothing is wrong with one. */
function emptyFaults({ value, faults }: Read<readonly unknown[]>, { files }: FileSet, { needed }: TableColumns): readonly Fault[] {
  return faults.length === 0 && value.length === 0 ? [faultOf('input-empty', files[0]!, { needed })] : []
}
