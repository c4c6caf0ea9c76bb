import { plainSpaces } from '../../words/spaces.ts'

/** Figures and dates on axes in the reader's locale, as vega wants them, taken from Intl. */
export function vegaLocale(locale: string) {
  const parts = new Intl.NumberFormat(locale, { useGrouping: true, minimumFractionDigits: 1 }).formatToParts(-1234567.5)
  const part = (type: Intl.NumberFormatPartTypes, otherwise: string): string => plainSpaces(parts.find((candidate) => candidate.type === type)?.value ?? otherwise)
  return {
    number: {
      decimal: part('decimal', '.'), thousands: part('group', ','), grouping: [3], currency: ['', ''] as [string, string], minus: '\u2212', percent: percentSign(locale),
    },
    time: {
      // `%x` on an axis is a day of the month: short, without its year
      dateTime: '%Y-%m-%d %H:%M', date: dayOfMonth(locale), time: '%H:%M', periods: ['AM', 'PM'] as [string, string],
      days: days(locale, 'long'), shortDays: days(locale, 'short'),
      months: months(locale, 'long'), shortMonths: months(locale, 'short'),
    },
  }
}

/** What stands after the digits of a percentage: `%`, or a no-break space and `%`. */
function percentSign(locale: string): string {
  const parts = new Intl.NumberFormat(locale, { style: 'percent' }).formatToParts(0.9)
  const after = parts.slice(parts.findIndex(({ type }) => type === 'integer') + 1)
  return plainSpaces(after.map(({ value }) => value).join(''))
}

/** A day and its month as a specifier of d3's, in the order and with the signs of the locale: `%-d %b`, `%-d. %b`, `%b %-d`. */
function dayOfMonth(locale: string): string {
  const parts = new Intl.DateTimeFormat(locale, { day: 'numeric', month: 'short', timeZone: 'UTC' }).formatToParts(Date.UTC(2000, 10, 5))
  const specifier = parts.map(({ type, value }) => type === 'day' ? '%-d' : type === 'month' ? (/^\d+$/.test(value) ? '%m' : '%b') : value.replaceAll('%', '%%'))
  return plainSpaces(specifier.join(''))
}

type Seven = [string, string, string, string, string, string, string]
type Twelve = [...Seven, string, string, string, string, string]

/** From Sunday on: 4 January 1970 was one. */
function days(locale: string, width: 'long' | 'short'): Seven {
  const format = new Intl.DateTimeFormat(locale, { weekday: width, timeZone: 'UTC' })
  return Array.from({ length: 7 }, (_, index) => format.format(Date.UTC(1970, 0, 4 + index))) as Seven
}

function months(locale: string, width: 'long' | 'short'): Twelve {
  const format = new Intl.DateTimeFormat(locale, { month: width, timeZone: 'UTC' })
  return Array.from({ length: 12 }, (_, index) => format.format(Date.UTC(2000, index, 15))) as Twelve
}
