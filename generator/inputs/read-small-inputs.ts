import type { Account, FileSet } from '../account/account.ts'
import { faultOf } from '../faults/catalogue.ts'
import { InputFault, type Fault } from '../faults/fault.ts'
import { byText } from '../intake/level-names.ts'
import { readTable, type CsvRow, type TableColumns } from './csv-table.ts'
import { eventColumns, eventRow, outcomeColumns, outcomeFaults, outcomeRow } from './dated-rows.ts'
import type { RawEvent, RawInputs, RawOutcome, RawSurvey, ReadFile } from './raw-inputs.ts'
import { headlineOf, surveyKeyFaults } from './survey-keys.ts'
import { clashesOf, surveyOfRows } from './survey-of-rows.ts'
import { surveyColumns, surveyRow } from './survey-row.ts'

/** Faults told at once; inputs with more are wrong as a whole. */
const mostFaults = 100

/**
 * Read the survey, the events and the outcome of an account:
 *
 *   files ──cut──▶ rows ──each checked──▶ values ──checked together, and against the account──▶ RawInputs
 *
 * @throws {InputFault} with the faults of all of them, each at its file, line and column
 */
export async function readSmallInputs(account: Account): Promise<RawInputs> {
  const survey = await readSurvey(account)
  const events = await readEvents(account)
  const outcome = await readOutcome(account)
  const faults = [survey, events, outcome].flatMap((input) => input.faults)
  if (faults.length > 0) throw new InputFault(faults.slice(0, mostFaults))
  return { survey: survey.value, events: events.value, outcome: outcome.value, files: [survey, events, outcome].flatMap((input) => input.files) }
}

/** What was read of one input, and what is wrong with it; `value` means something only where nothing is. */
interface Input<T> {
  readonly value: T | null
  readonly files: readonly ReadFile[]
  readonly faults: readonly Fault[]
}

const notGiven = { value: null, files: [], faults: [] } as const

async function readSurvey(account: Account): Promise<Input<RawSurvey>> {
  if (account.survey === null) return notGiven
  const { value: rows, files, faults } = await readRows(account, account.survey, surveyColumns, surveyRow)
  const empty = faults.length === 0 && rows.length === 0 ? [faultOf('input-empty', account.survey.files[0]!, { needed: surveyColumns.needed })] : []
  const wrong = [...faults, ...empty, ...clashesOf(rows)]
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

/** The sound rows of all files of an input. */
async function readRows<T extends object>(
  account: Account, { files: paths }: FileSet, columns: TableColumns, read: (row: CsvRow) => T | readonly Fault[],
): Promise<Input<readonly T[]> & { readonly value: readonly T[] }> {
  const value: T[] = []
  const files: ReadFile[] = []
  const faults: Fault[] = []
  for (const path of paths) {
    try {
      const table = await readTable(account.folder, path, columns)
      files.push({ path, sha256: table.sha256, rows: table.rows.length })
      faults.push(...table.faults)
      for (const row of table.rows) {
        const result = read(row)
        if (Array.isArray(result)) faults.push(...(result as readonly Fault[]))
        else value.push(result as T)
      }
    } catch (error) {
      if (!(error instanceof InputFault)) throw error
      faults.push(...error.faults)
    }
  }
  return { value, files, faults }
}
