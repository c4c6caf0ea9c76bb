import type { Wording } from './wording.ts'

/** What a value of the survey, of the events or of the outcome must be: the `Y` of "expected Y". */
export const inputExpectations = {
  text: 'a name',
  date: 'a date that exists, written 2026-10-31',
  number: 'a number',
  decimalPoint: 'a number with a decimal point and no comma, such as 0.43',
  fieldEnd: (start: string) => `a date on or after field_start, ${start}`,
  fieldLength: (start: string) => `a date within a year of field_start, ${start}`,
  kind: '`share` or `mean`',
  base: 'a whole number of at least 1',
  effectiveBase: 'a number above 0',
  effectiveWithin: (base: number) => `a number no larger than the base, ${base}: weighting never makes a sample worth more interviews than it has`,
  share: 'a share from 0 to 1: shares are written 0.43, not 43',
  sd: 'the standard deviation of the answers, a number of at least 0: a mean needs it',
  positive: 'a number above 0: growth is of logarithms',
} as const

/** Faults of the survey, the events and the outcome. */
export const inputWordings = {
  'input-columns': (details: { readonly absent: readonly string[]; readonly header: readonly string[]; readonly nearest: string }): Wording => ({
    unexpected: `header ${told(details.header)}`, expected: `the columns ${told(details.absent)} too`,
    mend: `Name a column \`${details.absent[0]}\` (nearest: \`${details.nearest}\`); columns that mean nothing here may stay.`,
  }),
  'input-empty': (details: { readonly needed: readonly string[] }): Wording => ({
    unexpected: 'absence of rows', expected: `a header with ${told(details.needed)}, and rows below it`,
    mend: 'Export the file again, or leave it out of the account.',
  }),
  'input-row': (details: { readonly fields: number; readonly columns: number }): Wording => ({
    unexpected: `row of ${details.fields} fields`, expected: `${details.columns}, as many as the header has`,
    mend: 'Mend the row: look for a stray delimiter, a decimal comma, or a line break outside quotes.',
  }),
  'input-quote': (_: object): Wording => ({
    unexpected: 'quote that is never closed', expected: 'a second one that ends the field',
    mend: 'Close the quote, or double it where it is part of the text.',
  }),
  'input-value': (details: { readonly actual: string; readonly expected: string }): Wording => ({
    unexpected: details.actual === '' ? 'empty value' : `\`${shortened(details.actual)}\``, expected: details.expected,
    mend: `Give ${details.expected}.`,
  }),
  'survey-twice': (details: { readonly what: string; readonly first: string }): Wording => ({
    unexpected: `second row of ${details.what}`, expected: 'one row for each wave, metric and segment',
    mend: `Keep either this row or the one at ${details.first}.`,
  }),
  'survey-fieldwork': (details: { readonly wave: string; readonly dates: string; readonly other: string; readonly first: string }): Wording => ({
    unexpected: `fieldwork of wave \`${details.wave}\`, ${details.dates}`, expected: `${details.other}, as at ${details.first}`,
    mend: 'Give all rows of a wave the same field_start and field_end, or give the waves different names.',
  }),
  'survey-kind': (details: { readonly metric: string; readonly kind: string; readonly other: string; readonly first: string }): Wording => ({
    unexpected: `kind \`${details.kind}\` of metric \`${details.metric}\``, expected: `\`${details.other}\`, as at ${details.first}`,
    mend: 'Give all rows of a metric the same kind, or give the two measures different names.',
  }),
  'survey-headline-unknown': (details: { readonly headline: string; readonly nearest: string; readonly known: readonly string[] }): Wording => ({
    unexpected: `metric \`${details.headline}\``, expected: `one that the survey has: ${told(details.known)}`,
    mend: `Did you mean \`${details.nearest}\`?`,
  }),
  'survey-headline-open': (details: { readonly known: readonly string[] }): Wording => ({
    unexpected: 'absence of `headline`', expected: `one metric to compare with opinion, of ${told(details.known)}`,
    mend: `Add \`headline:\` to \`survey\` of the account with the metric that stands for opinion of the brand, such as \`${details.known[0]}\`.`,
  }),
  'survey-headline-everyone': (details: { readonly headline: string; readonly segments: readonly string[] }): Wording => ({
    unexpected: `metric \`${details.headline}\` of the segments ${told(details.segments)} only`, expected: 'rows for everyone, whose segment is empty',
    mend: 'Add the rows for everyone, or leave `segment` empty in those that are.',
  }),
  'survey-label-unknown': (details: { readonly metric: string; readonly nearest: string; readonly known: readonly string[] }): Wording => ({
    unexpected: `label of a metric \`${details.metric}\``, expected: `labels of metrics that the survey has: ${told(details.known)}`,
    mend: `Did you mean \`${details.nearest}\`? Otherwise take the label out.`,
  }),
  'survey-next-fieldwork': (details: { readonly dates: string; readonly wave: string; readonly last: string }): Wording => ({
    unexpected: `next fieldwork ${details.dates}`, expected: `dates after those of the last wave, \`${details.wave}\`, ${details.last}`,
    mend: 'Give the dates of the wave to come, or leave `next_fieldwork` out: then it is expected one usual spacing after the last.',
  }),
  'outcome-twice': (details: { readonly date: string; readonly first: string }): Wording => ({
    unexpected: `second value of ${details.date}`, expected: 'every date once',
    mend: `Keep either this row or the one at ${details.first}.`,
  }),
  'outcome-short': (details: { readonly rows: number }): Wording => ({
    unexpected: `number of values, ${details.rows}`, expected: 'at least 2: growth is from one to the next',
    mend: 'Add earlier values, or leave `outcome` out of the account.',
  }),
} as const

function told(names: readonly string[]): string {
  return names.length === 0 ? 'nothing' : names.map((name) => `\`${shortened(name)}\``).join(', ')
}

/** A mistaken column may hold whole texts. */
function shortened(text: string): string {
  return text.length > 60 ? `${text.slice(0, 57)}...` : text
}
