import type { Accounting } from '../../model/intake/intake-tables.ts'

/** What became of rows, for people; `--json` and the rejects have the codes. */
const reasonWords: Readonly<Record<string, string>> = {
  'row-malformed': 'rows that can\'t be cut into fields', 'time-unreadable': 'times that can\'t be read', 'score-unreadable': 'scores that can\'t be read',
  'score-outside-range': 'scores outside the range', 'venue-missing': 'without a venue', 'other-brand': 'about other brands', 'brand-missing': 'without a brand',
  'after-period': 'posted after the period that would be reviewed', 'same-id': 'the same id again', 'repost': 'the same text again within seven days',
  'time-nonexistent': 'at a time that the clocks skipped, kept', 'time-doubled': 'at a time that the clocks showed twice, kept',
}

/** The accounting of rows as it stands on a terminal. */
export function describeAccounting({ received, rejected, duplicates, outOfScope, modelled, reasons, unread, unmapped }: Accounting): string {
  const rows: readonly (readonly [string, number])[] = [
    ['received', received], ['rejected', rejected], ['duplicates', duplicates], ['out of scope', outOfScope], ['modelled', modelled],
  ]
  const because = Object.entries(reasons).map(([name, count]) => [`  ${reasonWords[name] ?? name}`, count] as const)
  const names = Math.max(...[...rows, ...because].map(([name]) => name.length)) + 2
  const counts = String(received).length
  const line = ([name, count]: readonly [string, number]) => `${name.padEnd(names)}${String(count).padStart(counts)}`
  const unreadable = unread.map(({ column, value, rows: count }) => `  ${column} "${value}": ${count}`)
  const kept = unmapped.map(({ factor, value, mentions }) => `  ${factor} "${value}": ${mentions}`)
  return [
    ...rows.map(line),
    ...(because.length > 0 ? ['reasons', ...because.map(line)] : []),
    ...(unreadable.length > 0 ? ['values that could not be read, the most frequent ones', ...unreadable] : []),
    ...(kept.length > 0 ? ['values the account does not map, kept under their own name', ...kept] : []),
  ].join('\n')
}
