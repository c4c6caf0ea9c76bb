import type { Period } from '../../model/intake/intake-tables.ts'
import type { Account } from '../account/account.ts'
import { dayNumber, isoDate } from '../calendar/days.ts'
import { lastWholePeriod, periodNamed, periodPattern, type Reporting } from '../calendar/periods.ts'
import { faultOf } from '../faults/catalogue.ts'
import { InputFault } from '../faults/fault.ts'

/** The period of a name. @throws {InputFault} `period-unknown` */
export function namedPeriod(account: Account, name: string): Period {
  const period = periodNamed(account.reporting, name)
  if (period === undefined) throw new InputFault([faultOf('period-unknown', '--period', { name, pattern: periodPattern[account.reporting], meant: periodMeant(account.reporting, name) })])
  return period
}

/** The period that a name written otherwise means, of the account's kind; null where it is none. @example periodMeant('month', '2026-1') // => '2026-01' */
function periodMeant(reporting: Reporting, name: string): string | null {
  const [, year, letter = '', number = ''] = /^(\d{4})[-/. ]?([QW]?)(\d{1,2})$/i.exec(name.trim()) ?? []
  const own = { month: '', quarter: 'Q', week: 'W' }[reporting]
  if (year === undefined || letter.toUpperCase() !== own) return null
  const written = `${year}-${own}${reporting === 'quarter' ? Number(number) : number.padStart(2, '0')}`
  return periodNamed(reporting, written) === undefined ? null : written
}

/**
 * The last whole period that mentions cover: the last whose last day is not after the last mention's. The clock has no say.
 *
 * @param first, last - day numbers of the first and the last mention in scope
 * @returns null where they cover none
 */
export function coveredPeriod(reporting: Reporting, first: number, last: number): Period | null {
  const period = lastWholePeriod(reporting, last)
  return dayNumber(period.end) < first ? null : period
}

/** The fault of mentions that cover no period. */
export function noWholePeriod(reporting: Reporting, first: number, last: number): InputFault {
  return new InputFault([faultOf('no-whole-period', 'mentions', { first: isoDate(first), last: isoDate(last), kind: reporting })])
}
