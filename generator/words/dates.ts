import type { Words } from './words.ts'

/** A day as the locale writes it: `26 October 2026`. Days are calendar days, so no time zone can move them. */
export function date(iso: string, locale: string): string {
  return calendar(iso, locale, { day: 'numeric', month: 'long', year: 'numeric' })
}

/** From one day to another, no part said twice: `1 – 31 October 2026`, as the locale writes it. */
export function days({ start, end }: { readonly start: string, readonly end: string }, locale: string): string {
  const format = new Intl.DateTimeFormat(locale, { day: 'numeric', month: 'long', year: 'numeric', timeZone: 'UTC', calendar: 'gregory' })
  // Intl parts the dash by thin spaces, which the embedded font lacks
  return format.formatRange(new Date(`${start}T00:00:00Z`), new Date(`${end}T00:00:00Z`)).replace(/\u2009/g, ' ')
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
  const [, year, kind, part] = /^(\d{4})-([QW]?)(\d{1,2})$/.exec(name) ?? []
  if (!year || !part) return name
  if (kind === 'Q') return words.say('period-quarter', { quarter: part, year })
  if (kind === 'W') return words.say('period-week', { week: String(Number(part)), year })
  return calendar(`${name}-01`, words.locale, { month: 'long', year: 'numeric' })
}

function calendar(iso: string, locale: string, style: Intl.DateTimeFormatOptions): string {
  return new Intl.DateTimeFormat(locale, { ...style, timeZone: 'UTC', calendar: 'gregory' }).format(new Date(`${iso}T00:00:00Z`))
}
