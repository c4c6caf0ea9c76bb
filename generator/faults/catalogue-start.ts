import { shortened, type Wording } from './wording.ts'

/** Faults of laying out an account. */
export const startWordings = {
  'start-folder-taken': (details: { readonly entry: string }): Wording => ({
    unexpected: details.entry === '' ? 'a file' : `entry \`${shortened(details.entry)}\``, expected: 'a folder that is absent or empty',
    mend: 'Name a new folder: the mentions file is copied into it, and nothing that is there already is touched.',
  }),
  'start-file-absent': (details: { readonly reason: string }): Wording => ({
    unexpected: `absence of a file (${details.reason})`, expected: 'a file of mentions that can be read',
    mend: 'Name the file with --from, or leave --from out and fill in the account by hand.',
  }),
  'start-file-kind': (_: object): Wording => ({
    unexpected: 'kind of file', expected: '.csv, .tsv, .txt, .ndjson or .jsonl, each also with .gz, or .parquet',
    mend: 'Export the mentions in one of these forms; a workbook can be saved as CSV.',
  }),
  'start-no-table': (details: { readonly reason: string }): Wording => ({
    unexpected: `content (${details.reason})`, expected: 'a table with a header of two columns or more',
    mend: 'Export the mentions again, with a first row that names the columns (of NDJSON: one object a line) and a comma, semicolon, tab or bar between fields.',
  }),
  'start-no-header': (details: { readonly value: string }): Wording => ({
    unexpected: `first row with the time \`${shortened(details.value)}\``, expected: 'a header that names the columns',
    mend: 'Put a first row with names above the data, or export the mentions with one.',
  }),
  'start-unwritable': (details: { readonly reason: string }): Wording => ({
    unexpected: `refusal to write (${details.reason})`, expected: 'a place that can be written, with room for a copy of the mentions',
    mend: 'Give this user the right to write there, make room, or name another folder.',
  }),
} as const
