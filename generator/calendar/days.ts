/** Days as whole numbers since 1970-01-01 of the proleptic Gregorian calendar: all date arithmetic is on these. */

const MILLISECONDS = 86_400_000

/** Whether the text is a date that exists, written YYYY-MM-DD. @example isDate('2025-02-29') // => false */
export function isDate(text: string): boolean {
  return /^\d{4}-\d{2}-\d{2}$/.test(text) && isoDate(dayNumber(text)) === text
}

/** The dates that data may bear: one outside is mistyped. */
export const dataDates = { first: '1900-01-01', last: '2199-12-31' } as const

/** Day number of an ISO date; NaN where it cannot be read. @example dayNumber('1970-01-02') // => 1 */
export function dayNumber(date: string): number {
  return Date.parse(`${date}T00:00:00Z`) / MILLISECONDS
}

/** ISO date of a whole day number; empty where there is none. @example isoDate(59) // => '1970-03-01' */
export function isoDate(day: number): string {
  return Number.isFinite(day) ? new Date(day * MILLISECONDS).toISOString().slice(0, 10) : ''
}

/** Day number of the first day of a month; months count from 0 and may run over. @example firstOfMonth(1970, 12) // => 365 */
export function firstOfMonth(year: number, month: number): number {
  const date = new Date(0)
  date.setUTCFullYear(year, month, 1)
  return date.getTime() / MILLISECONDS
}

/** Year and month (from 0) that hold a day. @example monthOf(31) // => { year: 1970, month: 1 } */
export function monthOf(day: number): { readonly year: number; readonly month: number } {
  const date = new Date(day * MILLISECONDS)
  return { year: date.getUTCFullYear(), month: date.getUTCMonth() }
}

/** The Monday on or before a day. @example mondayOf(0) // => -3, since 1970-01-01 was a Thursday */
export function mondayOf(day: number): number {
  return Math.floor((day + 3) / 7) * 7 - 3
}
