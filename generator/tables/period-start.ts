/**
 * First day of a period from its name, as an ISO date.
 *
 * @param name - `2026-10`, `2026-Q4` or `2026-W44` (ISO 8601 week, begins on Monday)
 * @throws {RangeError} any other form: periods are named by this program
 */
export function periodStart(name: string): string {
  const month = /^(\d{4})-(\d{2})$/.exec(name)
  if (month) return `${name}-01`
  const quarter = /^(\d{4})-Q([1-4])$/.exec(name)
  if (quarter) return `${quarter[1]}-${String(Number(quarter[2]) * 3 - 2).padStart(2, '0')}-01`
  const week = /^(\d{4})-W(\d{2})$/.exec(name)
  if (week) return mondayOfWeek(Number(week[1]), Number(week[2]))
  throw new RangeError(`Unexpected period name ${name}`)
}

/** Week 1 is the one that holds 4 January (ISO 8601). */
function mondayOfWeek(year: number, week: number): string {
  const fourth = new Date(Date.UTC(year, 0, 4))
  const sinceMonday = (fourth.getUTCDay() + 6) % 7
  return new Date(Date.UTC(year, 0, 4 - sinceMonday + 7 * (week - 1))).toISOString().slice(0, 10)
}
