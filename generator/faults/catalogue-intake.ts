import { shortened, told, type Wording } from './wording.ts'

/** Faults of the data files. */
export const intakeWordings = {
  'columns-absent': (details: { readonly columns: readonly string[]; readonly header: readonly string[]; readonly nearest: string }): Wording => ({
    unexpected: `header ${told(details.header)}`, expected: `the columns ${told(details.columns)}`,
    mend: `Mend \`columns\` of the account (nearest: \`${shortened(details.nearest)}\`), or state \`delimiter\` if the header was cut wrongly.`,
  }),
  'header-twice': (details: { readonly column: string }): Wording => ({
    unexpected: `second column \`${details.column}\``, expected: 'every column of the header once',
    mend: 'Rename one of the two columns.',
  }),
  'file-unreadable': (details: { readonly reason: string }): Wording => ({
    unexpected: `content (${details.reason})`, expected: 'a file of the kind that its name says',
    mend: 'Export the file again, or leave it out of the account.',
  }),
  'no-mentions': (details: { readonly accounting: string; readonly unread: Unread }): Wording => ({
    unexpected: `absence of mentions to model (${details.accounting})`, expected: 'at least one',
    mend: unreadMend(details.unread) ?? 'Look at the reasons: the mapping of time, score, venue or brand, or the period asked for.',
  }),
  'mostly-rejected': (details: { readonly rejected: number; readonly received: number; readonly unread: Unread }): Wording => ({
    unexpected: `number of rows that can't be read, ${details.rejected} of ${details.received}`, expected: 'half of them at the most',
    mend: unreadMend(details.unread) ?? 'Look at the rejected rows (`check --rejects DIR`) and mend the mapping of columns.',
  }),
  'no-whole-period': (details: { readonly first: string; readonly last: string; readonly kind: string }): Wording => ({
    unexpected: `mentions from ${details.first} to ${details.last} only`, expected: `a whole ${details.kind}`,
    mend: 'Name the period to review with --period, or wait until the first one is over.',
  }),
  'period-unknown': (details: { readonly name: string; readonly pattern: string; readonly meant: string | null }): Wording => ({
    unexpected: `period \`${details.name}\``, expected: `a name such as ${details.pattern}`,
    mend: details.meant === null ? 'Name a period of the kind that `reporting` of the account says.' : `Write \`${details.meant}\`.`,
  }),
  'target-mix-level': (details: { readonly level: string; readonly known: readonly string[] }): Wording => ({
    unexpected: `level \`${details.level}\``, expected: `a level that mentions are in: ${details.known.join(', ')}`,
    mend: 'Mend the name, or take a level that nobody has posted in out of the target mix.',
  }),
  'too-many-levels': (details: { readonly factor: string; readonly most: number }): Wording => ({
    unexpected: `more than ${details.most} values of \`${details.factor}\``, expected: 'a column with a few values that repeat',
    mend: 'Map another column to it under `columns`, give its values fewer names, or leave it out of `factors`.',
  }),
  'benchmark-margin-unmapped': (details: { readonly margin: string; readonly known: readonly string[]; readonly nearest: string }): Wording => ({
    unexpected: `margin \`${details.margin}\``, expected: `a factor or a mapped column: ${details.known.join(', ')}`,
    mend: `Did you mean \`${details.nearest}\`? Otherwise map the column that says it under \`columns\`, or leave the margin out of the benchmark.`,
  }),
  'audit-sample-ids': (_: object): Wording => ({
    unexpected: 'absence of ids', expected: '`id` among the `columns` of a source whose scores are labels',
    mend: 'Map the column that identifies a post, so that the posts to code by hand can be named.',
  }),
  'audit-sample-small': (details: { readonly size: number; readonly least: number; readonly each: number }): Wording => ({
    unexpected: `sample of ${details.size}`, expected: `at least ${details.least}: ${details.each} of every venue, or all that it has`,
    mend: `Ask for ${details.least} or more: an audit of fewer in a venue is not applied there.`,
  }),
  'cell-value': (details: { readonly actual: string; readonly expected: string }): Wording => ({
    unexpected: details.actual === '' ? 'empty value' : `\`${details.actual}\``, expected: details.expected,
    mend: `Give ${details.expected}, or leave the row out.`,
  }),
  'cell-twice': (details: { readonly cell: string; readonly first: string }): Wording => ({
    unexpected: `second row of the cell ${details.cell}`, expected: 'one row a cell inside one source',
    mend: `Join it with the one at ${details.first}.`,
  }),
  'cell-row': (details: { readonly reason: string }): Wording => ({
    unexpected: `row (${details.reason})`, expected: 'as many fields as the header has',
    mend: 'Mend the row: look for a stray delimiter or quote.',
  }),
} as const

type Unread = readonly { readonly column: 'posted_at' | 'score'; readonly value: string; readonly rows: number }[]

/** The mend that unread values suggest; null where there are none to show. */
function unreadMend(unread: Unread): string | null {
  const [worst] = unread
  if (worst === undefined) return null
  const values = unread.filter(({ column }) => column === worst.column).map(({ value, rows }) => `\`${value}\` (${rows})`).join(', ')
  return worst.column === 'score'
    ? `Scores that no label or range of the account reads: ${values}. Mend \`score\` or the column mapped to it.`
    : `Times that can't be read: ${values}. Give \`time_format\` beside \`columns\`, such as '%d.%m.%Y %H:%M', or map another column to \`posted_at\`.`
}
