import type { Database } from '../intake/database.ts'
import type { InputFile } from '../intake/input-file.ts'
import { malformedRows } from '../intake/malformed-rows.ts'
import { relationOf, type Relation } from '../intake/relation.ts'
import { timeSql, timeText } from '../intake/time-sql.ts'
import type { Role } from './column-names.ts'
import type { ColumnProposals } from './propose-columns.ts'
import type { Tally } from './score-forms.ts'
import type { CsvCut } from './table-head.ts'

/** What a whole file holds in the columns that were proposed. */
export interface FileTally {
  /** That could be cut into fields. */
  readonly rows: number
  /** null where no time is proposed or none can be read. */
  readonly times: TimeTally | null
  /** The most frequent values of the columns with few of them, for those that are proposed. */
  readonly values: ReadonlyMap<Role, ValueTally>
}

export interface TimeTally {
  /** strptime form; null for what needs none. */
  readonly format: string | null
  /** The form with day and month changed over, where it reads as many rows. */
  readonly rival: string | null
  readonly read: number
  /** Of the rows read, those that say their offset from UTC. */
  readonly withOffset: number
  /** Dates, of the clocks as they stand in the file. */
  readonly first: string
  readonly last: string
  /** Between which 99 % of them lie: a mistyped year stretches no time axis. */
  readonly most: { readonly first: string; readonly last: string }
}

export interface ValueTally {
  readonly tally: Tally
  /** How many different values there are; the tally may hold fewer. */
  readonly distinct: number
}

const tallied: readonly Role[] = ['venue', 'score', 'topic', 'brand']
const mostValues = 500

/** Read the proposed columns of the whole file. */
export async function tallyColumns(database: Database, file: InputFile, { columns }: ColumnProposals, form: CsvCut | null): Promise<FileTally> {
  const relation = await relationOf(database, file, columns.map(({ column }) => column.name), form ?? { delimiter: null, quote: null })
  const field = (role: Role): string | null => {
    const proposal = columns.find((candidate) => candidate.role === role)
    return proposal === undefined ? null : relation.column(proposal.column.name)
  }
  const [all] = await database.rows<{ rows: bigint }>(`SELECT count(*) AS rows FROM ${relation.sql} WHERE ${relation.sound}`)
  const values = new Map<Role, ValueTally>()
  for (const role of tallied) {
    const column = field(role)
    if (column !== null) values.set(role, await tallyOf(database, relation, column))
  }
  const posted = columns.find(({ role }) => role === 'posted_at')
  const times = posted === undefined ? null : await timesOf(database, relation, relation.column(posted.column.name), [posted.column.time?.format ?? null, posted.column.time?.rival ?? null])
  // malformed rows are counted when the account is checked
  if (file.kind !== 'parquet') await malformedRows(database)
  return { rows: Number(all!.rows), times, values }
}

async function tallyOf(database: Database, relation: Relation, column: string): Promise<ValueTally> {
  const grouped = `SELECT trim(${column}) AS value, count(*) AS rows FROM ${relation.sql} WHERE ${relation.sound} GROUP BY value`
  const rows = await database.rows<{ value: string; rows: bigint; distinct_values: bigint }>(
    `SELECT value, rows, count(*) OVER () AS distinct_values FROM (${grouped}) WHERE value <> '' ORDER BY rows DESC, value LIMIT ${mostValues}`)
  return { tally: rows.map(({ value, rows: count }) => ({ value, rows: Number(count) })), distinct: Number(rows[0]?.distinct_values ?? 0) }
}

/** Of a form and its rival, the one that reads more rows of the whole file. */
async function timesOf(database: Database, relation: Relation, column: string, [format, rival]: readonly [string | null, string | null]): Promise<TimeTally | null> {
  const one = await timeTally(database, relation, column, format)
  if (rival === null) return one
  const other = await timeTally(database, relation, column, rival)
  if (one === null || other === null) return one ?? other
  return one.read === other.read ? { ...one, rival } : one.read > other.read ? one : other
}

async function timeTally(database: Database, relation: Relation, column: string, format: string | null): Promise<TimeTally | null> {
  const time = timeSql('posted', format)
  const timed = [time.draft, time.zoned, time.reading, time.clock].reduce((inner, level) => `SELECT *, ${level} FROM (${inner})`, `SELECT ${timeText(column)} AS posted FROM ${relation.sql} WHERE ${relation.sound}`)
  const date = (clock: string): string => `strftime(make_timestamp(${clock}), '%Y-%m-%d')`
  const [found] = await database.rows<{ read: bigint; zoned: bigint; first: string | null; last: string | null; early: string | null; late: string | null }>(
    `SELECT count(clock) AS read, count(*) FILTER (clock IS NOT NULL AND zoned) AS zoned, ${date('min(clock)')} AS first, ${date('max(clock)')} AS last,
    ${date('quantile_disc(clock, 0.005)')} AS early, ${date('quantile_disc(clock, 0.995)')} AS late FROM (${timed})`)
  const { read, zoned, first, last, early, late } = found!
  return first === null || last === null ? null : { format, rival: null, read: Number(read), withOffset: Number(zoned), first, last, most: { first: early ?? first, last: late ?? last } }
}
