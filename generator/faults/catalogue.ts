import { accountWordings } from './catalogue-account.ts'
import { archiveWordings } from './catalogue-archive.ts'
import { buildWordings } from './catalogue-build.ts'
import { inputWordings } from './catalogue-inputs.ts'
import { intakeWordings } from './catalogue-intake.ts'
import { startWordings } from './catalogue-start.ts'
import { templateWordings } from './catalogue-template.ts'
import { themeWordings } from './catalogue-theme.ts'
import { wordWordings } from './catalogue-words.ts'
import type { Fault } from './fault.ts'
import type { Wording } from './wording.ts'

const wordings = { ...accountWordings, ...intakeWordings, ...inputWordings, ...buildWordings, ...archiveWordings, ...templateWordings, ...themeWordings, ...wordWordings, ...startWordings }

type Wordings = typeof wordings
export type FaultCode = keyof Wordings
type Details<C extends FaultCode> = Parameters<Wordings[C]>[0]

/**
 * The fault of a code at a place, worded.
 *
 * @param place - `account.yaml:12:3 venues.boards`, `mentions/2026.csv:17`, `mentions/2026.csv:17 score`
 * @param details - what the wording of that code speaks of
 */
export function faultOf<C extends FaultCode>(code: C, place: string, details: Details<C>): Fault {
  const say = wordings[code] as (details: Details<C>) => Wording
  const { unexpected, expected, mend } = say(details)
  return { code, place, message: `Unexpected ${unexpected} at ${place}, expected ${expected}.`, mend }
}
