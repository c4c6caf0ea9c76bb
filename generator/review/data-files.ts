import { basename } from 'node:path'
import type { Findings } from '../../model/findings/schema.ts'
import type { Attachment } from '../print/attach-files.ts'
import { toCsv } from '../tables/csv.ts'
import type { Table } from '../tables/table.ts'
import type { Words } from '../words/words.ts'

/** A file of figures: it stands in the draft, and the same bytes are attached to its PDF. */
export interface DataFile {
  /** Below the draft's folder, e.g. `tables/opinion.csv`. */
  readonly path: string
  readonly mime: string
  readonly bytes: Uint8Array
}

/** All figures of a review: the findings, and every table as CSV. */
export function dataFiles(findings: Findings, tables: readonly Table[]): readonly DataFile[] {
  const encoder = new TextEncoder()
  return [
    { path: 'findings.json', mime: 'application/json', bytes: encoder.encode(`${JSON.stringify(findings, null, 2)}\n`) },
    ...tables.map((table) => ({ path: `tables/${table.name}.csv`, mime: 'text/csv', bytes: encoder.encode(toCsv(table)) })),
  ]
}

/** Files as they go into the PDF: what its text, pictures and tables were made from, so that each is its `Data`. */
export function attachmentsOf(files: readonly DataFile[], words: Words): readonly Attachment[] {
  return files.map(({ path, mime, bytes }) => ({
    name: basename(path), mime, bytes, relationship: 'Data',
    description: path === 'findings.json' ? words.say('attached-findings') : words.say('attached-table', { table: basename(path, '.csv') }),
  }))
}
