import { dataDates } from '../calendar/days.ts'
import { shortened, told, type Wording } from './wording.ts'

/** What a value of a small input must be: the `Y` of "expected Y". */
export const inputExpectations = {
  text: 'a name',
  shortText: (most: number) => `a name of at most ${most} characters: it stands in tables and beside lines`,
  date: 'a date that exists, written 2026-10-31',
  dataDate: `a date from ${dataDates.first} to ${dataDates.last}`,
  number: 'a number',
  magnitude: 'a number from -1,000,000,000,000 to 1,000,000,000,000',
  thousands: 'a number without a thousands separator and with no comma, such as 1200',
  percentSign: 'a number without the percent sign: a share of 43 % is written 0.43',
  decimalPoint: 'a number with a decimal point and no comma, such as 0.43',
  fieldEnd: (start: string) => `a date on or after field_start, ${start}`,
  fieldLength: (start: string) => `a date within a year of field_start, ${start}`,
  kind: '`share` or `mean`',
  base: 'a whole number of at least 1',
  effectiveBase: 'a number of at least 1',
  effectiveWithin: (base: number) => `a number no larger than the base, ${base}: weighting never makes a sample worth more interviews than it has`,
  share: 'a share from 0 to 1: shares are written 0.43, not 43',
  sd: 'the standard deviation of the answers, a number of at least 0: a mean needs it',
  positive: 'a number above 0',
  positiveLogarithm: 'a number above 0, from 1e-12 on: growth is of logarithms',
  codings: 'a whole number of posts, 0 or more',
  weight: 'a number of at least 0',
  answer: 'a number, or nothing where there is no answer',
} as const

/** Faults of the small inputs. */
export const inputWordings = {
  'input-columns': (details: { readonly absent: readonly string[]; readonly header: readonly string[]; readonly nearest: string }): Wording => ({
    unexpected: `header ${told(details.header)}`, expected: `the columns ${told(details.absent)} too`,
    mend: `Name a column \`${details.absent[0]}\` (nearest: \`${shortened(details.nearest)}\`); columns that mean nothing here may stay.`,
  }),
  'input-empty': (details: { readonly needed: readonly string[] }): Wording => ({
    unexpected: 'absence of rows', expected: `a header with ${told(details.needed)}, and rows below it`,
    mend: 'Export the file again, or leave it out of the account.',
  }),
  'input-encoding': (_: object): Wording => ({
    unexpected: 'bytes of 0, as in UTF-16 without its mark', expected: 'a text in UTF-8',
    mend: 'Save the file as UTF-8.',
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
  'survey-next-fieldwork-long': (details: { readonly dates: string; readonly most: number }): Wording => ({
    unexpected: `next fieldwork ${details.dates}`, expected: `a fieldwork of at most ${details.most} days that ends by ${dataDates.last}`,
    mend: 'Mend the year, or leave `next_fieldwork` out: then the next wave is expected one usual spacing after the last.',
  }),
  'outcome-twice': (details: { readonly date: string; readonly first: string }): Wording => ({
    unexpected: `second value of ${details.date}`, expected: 'every date once',
    mend: `Keep either this row or the one at ${details.first}.`,
  }),
  'outcome-short': (details: { readonly rows: number }): Wording => ({
    unexpected: `number of values, ${details.rows}`, expected: 'at least 2: growth is from one to the next',
    mend: 'Add earlier values, or leave `outcome` out of the account.',
  }),
  'input-name-unknown': (details: { readonly what: string; readonly actual: string; readonly nearest: string; readonly known: readonly string[]; readonly key: string }): Wording => ({
    unexpected: `${details.what} \`${shortened(details.actual)}\``, expected: `one that the account has: ${told(details.known)}`,
    mend: `Did you mean \`${shortened(details.nearest)}\`? Otherwise add it to \`${details.key}\` of the account.`,
  }),
  'benchmark-twice': (details: { readonly margin: string; readonly level: string; readonly first: string }): Wording => ({
    unexpected: `second row of margin \`${shortened(details.margin)}\`, level \`${shortened(details.level)}\``, expected: 'every level of a margin once',
    mend: `Keep either this row or the one at ${details.first}.`,
  }),
  'benchmark-sum': (details: { readonly margin: string; readonly sum: number }): Wording => ({
    unexpected: `sum of the shares of margin \`${shortened(details.margin)}\`, ${Number(details.sum.toFixed(4))}`, expected: '1, give or take 0.005',
    mend: 'Mend the shares, or add the level that is missing, such as `other`.',
  }),
  'importance-columns': (details: { readonly header: readonly string[]; readonly topics: readonly string[] }): Wording => ({
    unexpected: `header ${told(details.header)}`, expected: `either \`topic\` and \`weight\`, or \`overall\` and a column for each topic, of ${told(details.topics)}`,
    mend: 'Name the columns so; others may stay.',
  }),
  'importance-forms': (details: { readonly first: string }): Wording => ({
    unexpected: 'stated weights beside answers of respondents', expected: `the same form as at ${details.first}`,
    mend: 'Keep the files of one form, and leave the others out of `importance`.',
  }),
  'importance-topics': (details: { readonly header: readonly string[]; readonly topics: readonly string[] }): Wording => ({
    unexpected: `header ${told(details.header)}`, expected: `columns named after at least two topics of the account: ${told(details.topics)}`,
    mend: details.topics.length === 0 ? 'List the topics under `topics` of the account.' : 'Give the columns the names or labels that the topics have in the account.',
  }),
  'importance-differ': (details: { readonly topics: readonly string[]; readonly others: readonly string[]; readonly first: string }): Wording => ({
    unexpected: `columns of the topics ${told(details.topics)}`, expected: `those of the file at ${details.first}: ${told(details.others)}`,
    mend: 'Give all files of respondents a column for the same topics.',
  }),
  'importance-misspelled': (details: { readonly column: string; readonly nearest: string }): Wording => ({
    unexpected: `column \`${shortened(details.column)}\``, expected: `\`${details.nearest}\`, a topic of the account that has no column yet`,
    mend: `Did you mean \`${details.nearest}\`? If the column is about something else, give it a name that is less like it.`,
  }),
  'importance-twice': (details: { readonly topic: string; readonly first: string }): Wording => ({
    unexpected: `second weight of topic \`${shortened(details.topic)}\``, expected: 'every topic once',
    mend: `Keep either this row or the one at ${details.first}.`,
  }),
  'importance-nothing': (_: object): Wording => ({
    unexpected: 'weights that are all 0', expected: 'at least one above 0',
    mend: 'Give the topics their weights, or leave `importance` out of the account.',
  }),
  'importance-short': (details: { readonly complete: number; readonly incomplete: number; readonly needed: number }): Wording => ({
    unexpected: `number of complete rows, ${details.complete} (and ${details.incomplete} with an answer missing)`, expected: `at least ${details.needed}`,
    mend: 'Add respondents, take out the topic that few were asked about, or state weights instead.',
  }),
} as const
