import type { Wording } from './wording.ts'

/** What a value of account.yaml must be: the `Y` of "expected Y". */
export const expectations = {
  accountName: 'letters, digits and hyphens',
  text: 'text',
  shortText: (most: number) => `text of at most ${most} characters: it stands in tables and beside lines`,
  date: 'a date that exists, written 2026-10-31',
  dateOrder: '`to` on or after `from`',
  locale: 'a locale such as en-GB',
  timeZone: 'a time zone such as Europe/Lisbon',
  interval: 'a number from 0.5 to 0.99',
  lags: 'two whole numbers of steps, the smaller first',
  mostLags: (most: number) => `at most ${most} lags from the first to the last`,
  oneMode: 'either `files` with `columns` and `score`, or `cells` alone',
  needsFiles: '`files` or `cells`',
  needsColumns: '`columns` beside `files`',
  needsScore: '`score` beside `files`: `labels` or `range`',
  oneScore: 'either `labels` or `range`',
  labelScore: 'a number from -1 to 1',
  labelTwice: 'each label once, whatever its case and spacing',
  someLabels: 'at least one label',
  range: 'two different numbers: the score that counts as -1, then the one that counts as 1',
  columnNeeded: 'the name of a column: `posted_at`, `venue` and `score` are needed',
  delimiter: 'one character',
  timeFormat: "a strptime form such as '%d.%m.%Y %H:%M'",
  posters: 'whole numbers of at least 1, `regular` above `occasional`',
  share: 'a share from 0 to 1',
  shareSum: 'shares that sum to 1',
  cost: 'a number above 0',
  customers: 'a whole number of at least 1',
  smallestGroup: 'a whole number of at least 10',
  factors: '`venue` first and every factor once',
  factorName: 'a name of lower-case letters, digits and underscores that is no column of a cell table',
  mostCompetitors: (most: number) => `at most ${most} competitors: each is fitted as the brand itself is`,
  competitorOther: 'competitors other than the brand',
  competitorOnce: 'every competitor once',
  someMentions: 'at least one source of mentions',
  reportingCoarser: 'a period no shorter than a step of the grid',
  targetFactor: 'a factor of the account',
  posterLevel: 'occasional, regular, prolific or unknown',
  factorColumn: 'a column mapped to it under `columns` in at least one source',
  valueOnce: 'each value mapped to one name only',
} as const

/** Faults of account.yaml and of the files that it names. */
export const accountWordings = {
  'account-missing': (_: object): Wording => ({
    unexpected: 'absence of account.yaml', expected: 'a folder with an account.yaml',
    mend: 'Name the folder of an account; `tareline start` begins one.',
  }),
  'account-unreadable': (details: { readonly reason: string }): Wording => ({
    unexpected: `text that is no UTF-8 YAML (${details.reason})`, expected: 'YAML in UTF-8',
    mend: 'Mend the file at this place; indent with spaces and quote text that holds a colon or a hash.',
  }),
  'account-alias': (details: { readonly found: string }): Wording => ({
    unexpected: `${details.found}`, expected: 'plain values: an account file has no anchors, aliases or tags',
    mend: 'Write the value out where it is needed; put quotes around one that begins with an asterisk, an ampersand or an exclamation mark.',
  }),
  'account-key-reserved': (details: { readonly key: string }): Wording => ({
    unexpected: `key \`${details.key}\``, expected: 'any other name: this one means something to the program itself',
    mend: 'Rename the key.',
  }),
  'account-key-unknown': (details: { readonly key: string; readonly nearest: string; readonly known: readonly string[] }): Wording => ({
    unexpected: `key \`${details.key}\``, expected: `one of ${details.known.join(', ')}`,
    mend: `Did you mean \`${details.nearest}\`? Otherwise take the key out.`,
  }),
  'account-key-twice': (details: { readonly reason: string }): Wording => ({
    unexpected: `key given twice (${details.reason})`, expected: 'every key once',
    mend: 'Join the two entries or take one of them out.',
  }),
  'account-key-absent': (details: { readonly key: string }): Wording => ({
    unexpected: `absence of \`${details.key}\``, expected: 'it to be given',
    mend: `Add \`${details.key}:\` there.`,
  }),
  'account-value': (details: { readonly actual: string; readonly expected: string }): Wording => ({
    unexpected: details.actual, expected: details.expected, mend: `Give ${details.expected}.`,
  }),
  'account-combination': (details: { readonly actual: string; readonly expected: string }): Wording => ({
    unexpected: details.actual, expected: details.expected, mend: `Keep ${details.expected}.`,
  }),
  'account-path-outside': (details: { readonly path: string }): Wording => ({
    unexpected: `path \`${details.path}\` that leaves the account folder`, expected: 'a relative path inside it',
    mend: 'Put the file into the account folder itself; links that lead out of it count as outside.',
  }),
  'account-file-absent': (details: { readonly path: string; readonly what: string }): Wording => ({
    unexpected: `\`${details.path}\`, which no ${details.what} answers to`, expected: `a ${details.what} of the account folder`,
    mend: 'Put the file there or mend the path; paths are relative to the account folder and mind upper and lower case.',
  }),
  'account-file-kind': (details: { readonly path: string; readonly kinds: readonly string[] }): Wording => ({
    unexpected: `kind of file \`${details.path}\``, expected: details.kinds.join(', '),
    mend: 'Save the file in one of these forms, or make the pattern match only those.',
  }),
} as const
