import { plainSpaces } from './spaces.ts'
import type { Words } from './words.ts'

/** A day as the locale writes it: `26 October 2026`. Days are calendar days, so no time zone can move them. */
export function date(iso: string, locale: string): string {
  return calendar(iso, locale, { day: 'numeric', month: 'long', year: 'numeric' })
}

/** From one day to another, no part said twice: `1 – 31 October 2026`, as the locale writes it. */
export function days({ start, end }: { readonly start: string, readonly end: string }, locale: string): string {
  const format = new Intl.DateTimeFormat(locale, { day: 'numeric', month: 'long', year: 'numeric', timeZone: 'UTC', calendar: 'gregory' })
  const range = format.formatRange(new Date(`${start}T00:00:00Z`), new Date(`${end}T00:00:00Z`))
  // a range may break at its dash
  return plainSpaces(range.replace(/\u2009(?=\u2013)|(?<=\u2013)\u2009/g, ' '))
}

/** A day for a column: `26 Oct 2026`. */
export function shortDate(iso: string, locale: string): string {
  return calendar(iso, locale, { day: 'numeric', month: 'short', year: 'numeric' })
}

/**
 * A period's name as people say it.
 *
 * @param name - `2026-10`, `2026-Q4` or `2026-W44`; any other text is returned as it is
 */
export function period(name: string, words: Words): string {
  const { year, kind, part } = partsOf(name)
  if (!year || !part) return name
  if (kind === 'Q') return words.say('period-quarter', { quarter: part, year })
  if (kind === 'W') return words.say('period-week', { week: String(Number(part)), year })
  return calendar(`${name}-01`, words.locale, { month: 'long', year: 'numeric' })
}

/** When something was, as an adverb of time: `in October 2026`; languages differ in the preposition of a month, a quarter and a week. */
export function when(name: string, words: Words): string {
  const { year, kind = '' } = partsOf(name)
  return words.say('when', { kind: year === undefined ? 'other' : kindNames[kind] ?? 'month', period: period(name, words) })
}

const kindNames: Readonly<Record<string, string>> = { Q: 'quarter', W: 'week' }

function partsOf(name: string): { readonly year?: string, readonly kind?: string, readonly part?: string } {
  return /^(?<year>\d{4})-(?<kind>[QW]?)(?<part>\d{1,2})$/.exec(name)?.groups ?? {}
}

function calendar(iso: string, locale: string, style: Intl.DateTimeFormatOptions): string {
  return plainSpaces(new Intl.DateTimeFormat(locale, { ...style, timeZone: 'UTC', calendar: 'gregory' }).format(new Date(`${iso}T00:00:00Z`)))
}
