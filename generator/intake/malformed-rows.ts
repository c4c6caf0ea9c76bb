import type { Database } from './database.ts'

/** A row of a CSV that could not be cut into the header's fields. */
export interface MalformedRow {
  /** Byte at which it begins, possibly the line break before it. */
  readonly offset: number
  readonly reason: string
}

/** The malformed rows of the files read since the last call, in their order in the file; a row counts once, whatever is wrong with it. */
export async function malformedRows(database: Database): Promise<readonly MalformedRow[]> {
  const rows = await database.rows<{ start: bigint; reason: string }>(
    'SELECT line_byte_position AS start, min(lower(CAST(error_type AS VARCHAR))) AS reason FROM reject_errors GROUP BY scan_id, file_id, line_byte_position ORDER BY scan_id, file_id, line_byte_position')
  await database.run('DELETE FROM reject_errors; DELETE FROM reject_scans')
  return rows.map((row) => ({ offset: Number(row.start), reason: row.reason }))
}
