import type { Account } from '../account/account.ts'
import { zoneClock } from '../calendar/time-zone.ts'
import type { Database } from './database.ts'
import { lastReject } from './scan-mentions.ts'
import { zoneSql, type ZoneSql } from './time-sql.ts'

/** When mentions were posted, as far as the account's zone can tell. */
export interface Dated {
  readonly zone: ZoneSql
  /** Day numbers of the first and the last mention in scope, duplicates included; null where there is none. */
  readonly span: { readonly first: number; readonly last: number } | null
  /** Times read by a rule. */
  readonly nonexistent: number
  readonly doubled: number
}

const second = 1_000_000
const margin = 3 * 86_400
const readable = `(fate = 0 OR fate > ${lastReject})`

/** Read the clocks of the account's zone over the stretch of time that `scanned` covers. */
export async function dateMentions(database: Database, account: Account): Promise<Dated> {
  const [range] = await database.rows<{ low: bigint | null; high: bigint | null }>(`SELECT min(clock) AS low, max(clock) AS high FROM scanned WHERE ${readable}`)
  const [low, high] = [Number(range!.low ?? 0) / second, Number(range!.high ?? 0) / second]
  const zone = zoneSql(zoneClock(account.timeZone, low - margin, high + margin))
  const [dated] = await database.rows<{ first: number | null; last: number | null; nonexistent: bigint; doubled: bigint }>(
    `SELECT min(${zone.day}) FILTER (fate = 0) AS first, max(${zone.day}) FILTER (fate = 0) AS last, `
    + `count(*) FILTER (${zone.nonexistent}) AS nonexistent, count(*) FILTER (${zone.doubled}) AS doubled FROM scanned WHERE ${readable}`)
  const { first, last, nonexistent, doubled } = dated!
  return { zone, span: first === null || last === null ? null : { first, last }, nonexistent: Number(nonexistent), doubled: Number(doubled) }
}
