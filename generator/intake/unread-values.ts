import type { MentionSource } from '../account/account.ts'
import type { Database } from './database.ts'
import type { Relation } from './relation.ts'
import { scoreSql } from './score-sql.ts'
import { timeSql, timeText } from './time-sql.ts'

/** A value of `posted_at` or `score` that could not be read, and in how many rows it stands. */
export interface UnreadValue {
  readonly column: 'posted_at' | 'score'
  readonly value: string
  readonly rows: number
}

const most = 5
/** A value is told in so many characters: a mistaken column may hold whole posts. */
const toldCharacters = 40

/** The most frequent values of a file that could not be read: what a mistaken mapping, label or time format looks like. */
export async function unreadValues(database: Database, source: MentionSource, relation: Relation): Promise<readonly UnreadValue[]> {
  const time = timeSql('posted', source.timeFormat)
  const score = scoreSql('scored', source.score, relation.cut?.delimiter !== ',')
  const fields = `SELECT ${timeText(relation.column(source.columns.posted_at!))} AS posted, ${relation.column(source.columns.score!)} AS scored, ${relation.sound} AS sound FROM ${relation.sql}`
  const timed = [time.draft, time.zoned, time.reading, time.clock].reduce((inner, column) => `SELECT *, ${column} FROM (${inner})`, fields)
  const told = (column: string, field: string, unread: string): string =>
    `SELECT '${column}' AS "column", left(coalesce(${field}::VARCHAR, ''), ${toldCharacters}) AS value, count(*) AS rows FROM (${timed}) WHERE sound AND ${unread} GROUP BY value`
  const rows = await database.rows<{ column: UnreadValue['column']; value: string; rows: bigint }>(
    `SELECT * FROM (${told('posted_at', 'posted', 'clock IS NULL')} UNION ALL ${told('score', 'scored', `clock IS NOT NULL AND (${score.score}) IS NULL`)}) ORDER BY rows DESC, "column", value LIMIT ${most}`)
  return rows.map(({ column, value, rows: count }) => ({ column, value, rows: Number(count) }))
}

/** The most frequent ones of all files. */
export function joinUnread(files: readonly (readonly UnreadValue[])[]): readonly UnreadValue[] {
  const sums = new Map<string, UnreadValue>()
  for (const unread of files.flat()) {
    const key = `${unread.column} ${unread.value}`
    sums.set(key, { ...unread, rows: unread.rows + (sums.get(key)?.rows ?? 0) })
  }
  return [...sums.values()].sort((a, b) => b.rows - a.rows || (a.value < b.value ? -1 : 1)).slice(0, most)
}
