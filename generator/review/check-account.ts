import { blankFindings } from '../../model/findings/blank.ts'
import type { IntakeTables } from '../../model/intake/intake-tables.ts'
import type { Account } from '../account/account.ts'
import { readAccount } from '../account/read-account.ts'
import { requireSound } from '../compose/compose.ts'
import { InputFault } from '../faults/fault.ts'
import type { RawInputs } from '../inputs/raw-inputs.ts'
import { readSmallInputs } from '../inputs/read-small-inputs.ts'
import { readIntake } from '../intake/read-intake.ts'
import type { Program } from '../program/program.ts'
import { tablesOf } from '../tables/tables-of.ts'
import { loadHouse } from './house.ts'
import { requireSteps } from './make-findings.ts'
import { partsRead, type PartRead } from './parts-read.ts'
import type { Progress } from './stages.ts'

/** What a check has read. */
export interface Checked {
  readonly tables: IntakeTables
  readonly inputs: RawInputs
  /** What the review would be made with. */
  readonly read: readonly PartRead[]
}

/**
 * Read the account file, every input, the template and the notes of all periods, as a build would, and fit nothing.
 *
 * @param rejects - folder for the rows that could not be read; nothing is written where it is absent
 * @throws {InputFault} with what is wrong
 */
export async function checkAccount(program: Program, folder: string, rejects: string | undefined, progress: Progress): Promise<Checked> {
  const account = await readAccount(folder)
  const house = await loadHouse(program, account)
  requireSound({ template: house.template, findings: blankFindings, tables: tablesOf(blankFindings), charts: [...house.charts.keys()], words: house.words })
  progress.stage('intake')
  const [inputs, tables] = await Promise.allSettled([readSmallInputs(account), readMentions(account, rejects, progress)])
  if (inputs.status === 'fulfilled' && tables.status === 'fulfilled') return { tables: tables.value, inputs: inputs.value, read: partsRead(account, house) }
  throw joined([inputs, tables].flatMap((result) => (result.status === 'rejected' ? [result.reason as unknown] : [])))
}

async function readMentions(account: Account, rejects: string | undefined, progress: Progress): Promise<IntakeTables> {
  const tables = await readIntake(account, { rejects, progress: progress.detail })
  requireSteps(account, tables)
  return tables
}

/** Faults of the survey do not hide those of the mentions; an error that is no fault of the input goes before both. */
function joined(reasons: readonly unknown[]): unknown {
  const faults = reasons.filter((reason) => reason instanceof InputFault)
  return faults.length < reasons.length ? reasons.find((reason) => !(reason instanceof InputFault)) : new InputFault(faults.flatMap((fault) => fault.faults))
}
