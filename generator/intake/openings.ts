import type { Database } from './database.ts'
import { momentBits, secondsSql } from './mention-table.ts'
import type { ZoneSql } from './time-sql.ts'

/** Ninety days in seconds: how far back a poster class looks. */
export const classWindow = 90 * 86_400
/** A clock without offset is less than this many microseconds from its instant. */
const clockMargin = 2 * 86_400 * 1_000_000
const secondsFrom1900To1970 = -Date.UTC(1900, 0, 1) / 1000

/** The first 90 days of a source, whose mentions are classed by those days whole. */
export interface Opening {
  readonly source: number
  /** The first moment after them. */
  readonly until: bigint
  /** A clock that all of their mentions are before, in microseconds: narrows a search. */
  readonly clock: bigint
  /** Number of the first day that is wholly after them in every zone. */
  readonly settledDay: number
}

/** The opening of every source that has a mention left, by the number of the source. */
export async function findOpenings(database: Database, zone: ZoneSql): Promise<readonly Opening[]> {
  // The earliest clock has the earliest instant, among those with and those without an offset: only these few are converted.
  const rows = await database.rows<{ source: number; until: bigint; clock: bigint }>(`
    SELECT source, (min(${secondsSql(zone.instant)}) + ${classWindow}) << ${momentBits} AS until, min(${zone.instant}) + ${classWindow * 1_000_000 + clockMargin} AS clock
    FROM (SELECT source, zoned, min(clock) AS clock FROM kept GROUP BY source, zoned) GROUP BY source ORDER BY source`)
  return rows.map((row) => ({ ...row, settledDay: Math.ceil((Number(row.until >> BigInt(momentBits)) - secondsFrom1900To1970) / 86_400) + 1 }))
}

/** SQL condition on `mention`: in an opening. */
export function inOpening({ source, clock, until }: Opening): string {
  return `source = ${source} AND clock < ${clock} AND moment < ${until}`
}
