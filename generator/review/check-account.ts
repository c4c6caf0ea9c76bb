import { blankFindings } from '../../model/findings/blank.ts'
import type { IntakeTables } from '../../model/intake/intake-tables.ts'
import { readAccount } from '../account/read-account.ts'
import { compose } from '../compose/compose.ts'
import { readIntake } from '../intake/read-intake.ts'
import type { Program } from '../program/program.ts'
import { tablesOf } from '../tables/tables-of.ts'
import { loadHouse } from './house.ts'
import { requireSteps } from './make-findings.ts'
import type { Progress } from './stages.ts'

/**
 * Read the account file, every input and the template, as a build would, and fit nothing.
 *
 * @param rejects - folder for the rows that could not be read; nothing is written where it is absent
 * @throws {InputFault} with what is wrong
 */
export async function checkAccount(program: Program, folder: string, rejects: string | undefined, progress: Progress): Promise<IntakeTables> {
  const account = await readAccount(folder)
  const house = await loadHouse(program, account)
  compose({ template: house.template, findings: blankFindings, tables: tablesOf(blankFindings), charts: [...house.charts.keys()], words: house.words })
  progress.stage('intake')
  const tables = await readIntake(account, { rejects, progress: progress.detail })
  requireSteps(account, tables)
  return tables
}
