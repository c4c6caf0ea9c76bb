import type { Period } from '../../model/intake/intake-tables.ts'
import { dayNumber, firstOfMonth, isoDate, mondayOf, monthOf } from './days.ts'

/** What one review covers. */
export type Reporting = 'month' | 'quarter' | 'week'

/** How a period of each kind is named, for messages. */
export const periodPattern: Readonly<Record<Reporting, string>> = { month: '2026-10', quarter: '2026-Q4', week: '2026-W44' }

/** The period that holds a day. @example periodHolding('week', dayNumber('2027-01-01')).name // => '2026-W53' */
export function periodHolding(reporting: Reporting, day: number): Period {
  if (reporting === 'week') return week(mondayOf(day))
  const { year, month } = monthOf(day)
  if (reporting === 'month') return months(`${digits(year, 4)}-${digits(month + 1, 2)}`, year, month, 1)
  const quarter = Math.floor(month / 3)
  return months(`${digits(year, 4)}-Q${quarter + 1}`, year, quarter * 3, 3)
}

/** The period of that name, or undefined where the name is none of this kind. @example periodNamed('quarter', '2026-Q5') // => undefined */
export function periodNamed(reporting: Reporting, name: string): Period | undefined {
  const found = /^(\d{4})-(?:Q(\d)|W(\d{2})|(\d{2}))$/.exec(name)
  if (!found) return undefined
  const year = Number(found[1])
  const [quarter, weekNumber, month] = [found[2], found[3], found[4]].map((part) => Number(part ?? Number.NaN)) as [number, number, number]
  const day = reporting === 'week'
    ? mondayOf(firstOfMonth(year, 0) + 3) + (weekNumber - 1) * 7
    : firstOfMonth(year, reporting === 'month' ? month - 1 : (quarter - 1) * 3)
  if (!Number.isFinite(day)) return undefined
  const period = periodHolding(reporting, day)
  return period.name === name ? period : undefined
}

/** The period after another. */
export function periodAfter(reporting: Reporting, period: Period): Period {
  return periodHolding(reporting, dayNumber(period.end) + 1)
}

/** The period before another. */
export function periodBefore(reporting: Reporting, period: Period): Period {
  return periodHolding(reporting, dayNumber(period.start) - 1)
}

/** The last period whose last day is not after `day`. @example lastWholePeriod('month', dayNumber('2026-10-30')).name // => '2026-09' */
export function lastWholePeriod(reporting: Reporting, day: number): Period {
  const holding = periodHolding(reporting, day)
  return dayNumber(holding.end) <= day ? holding : periodBefore(reporting, holding)
}

function months(name: string, year: number, month: number, count: number): Period {
  return { name, start: isoDate(firstOfMonth(year, month)), end: isoDate(firstOfMonth(year, month + count) - 1) }
}

/** ISO 8601: a week belongs to the year that holds its Thursday. */
function week(monday: number): Period {
  const { year } = monthOf(monday + 3)
  const number = 1 + (monday - mondayOf(firstOfMonth(year, 0) + 3)) / 7
  return { name: `${digits(year, 4)}-W${digits(number, 2)}`, start: isoDate(monday), end: isoDate(monday + 6) }
}

function digits(value: number, width: number): string {
  return String(value).padStart(width, '0')
}
