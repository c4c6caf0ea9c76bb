import { quantiles } from '../../model/statistics/quantile.ts'
import { firstOfMonth, monthOf } from '../calendar/days.ts'

/** First and last day number. */
interface Span {
  readonly first: number
  readonly last: number
}

/**
 * The days that each value of an outcome is of: from its date to the day before the next. The last span is as long as the
 * usual one (the median), in months where every date falls on the same day of a month: else a series by the month would
 * end a day late in June and three in February.
 *
 * @param days - day numbers, ascending, at least two
 */
export function outcomeSpans(days: readonly number[]): readonly Span[] {
  return days.map((first, index) => ({ first, last: (days[index + 1] ?? afterLast(days)) - 1 }))
}

function afterLast(days: readonly number[]): number {
  const last = days.at(-1)!
  const dates = days.map((day) => {
    const { year, month } = monthOf(day)
    return { months: year * 12 + month, ofMonth: day - firstOfMonth(year, month) }
  })
  const { months, ofMonth } = dates.at(-1)!
  // Not every month has a 29th.
  const monthly = ofMonth < 28 && dates.every((date) => date.ofMonth === ofMonth)
  if (!monthly) return last + usual(days)
  return firstOfMonth(0, months + usual(dates.map((date) => date.months))) + ofMonth
}

function usual(values: readonly number[]): number {
  return Math.round(quantiles(values.slice(1).map((value, index) => value - values[index]!), [0.5])[0]!)
}
