import type { Account } from '../account/account.ts'
import { zoneClock } from '../calendar/time-zone.ts'
import type { Database } from './database.ts'
import { lastReject } from './scan-mentions.ts'
import { zoneSql, type ZoneSql } from './time-sql.ts'

/** Day numbers of the first and the last mention. */
export interface Span {
  readonly first: number
  readonly last: number
}

/** When mentions were posted, as far as the account's zone can tell. */
export interface Dated {
  readonly zone: ZoneSql
  /** Of the mentions in scope, duplicates included; null where there is none. */
  readonly span: Span | null
  /** Times read by a rule. */
  readonly nonexistent: number
  readonly doubled: number
}

const second = 1_000_000
const margin = 3 * 86_400
const readable = `(fate = 0 OR fate > ${lastReject})`

interface Clocks {
  readonly low: bigint | null
  readonly high: bigint | null
}

/** Read the clocks of the account's zone over the stretch of time that `scanned` covers. */
export async function dateMentions(database: Database, account: Account): Promise<Dated> {
  const range = await clocksOf(database, `scanned WHERE ${readable}`)
  const zone = zoneSql(zoneClock(account.timeZone, Number(range.low ?? 0) / second - margin, Number(range.high ?? 0) / second + margin))
  const [ruled] = await database.rows<{ nonexistent: bigint; doubled: bigint }>(
    `SELECT count(*) FILTER (${zone.nonexistent}) AS nonexistent, count(*) FILTER (${zone.doubled}) AS doubled FROM scanned WHERE ${readable}`)
  return { zone, span: await spanOfFate(database, zone, 0), nonexistent: Number(ruled!.nonexistent), doubled: Number(ruled!.doubled) }
}

/** Day numbers of the first and the last mention of a fate, duplicates included; null where there is none. */
export async function spanOfFate(database: Database, zone: ZoneSql, fate: number): Promise<Span | null> {
  const which = `scanned WHERE fate = ${fate}`
  return spanOf(database, zone, which, await clocksOf(database, which))
}

/** Day numbers of the first and the last mention of `kept`, of which there is at least one. */
export async function keptSpan(database: Database, zone: ZoneSql): Promise<Span> {
  return (await spanOf(database, zone, 'kept WHERE true', await clocksOf(database, 'kept')))!
}

async function clocksOf(database: Database, which: string): Promise<Clocks> {
  const [clocks] = await database.rows<Clocks>(`SELECT min(clock) AS low, max(clock) AS high FROM ${which}`)
  return clocks!
}

/** A clock is less than `margin` from its day in the zone, whatever the offset: only mentions near the ends are looked at. */
async function spanOf(database: Database, zone: ZoneSql, which: string, { low, high }: Clocks): Promise<Span | null> {
  if (low === null || high === null) return null
  const near = (bound: string): string => `FROM ${which} AND clock ${bound}`
  const [span] = await database.rows<Span>(`SELECT (SELECT min(${zone.day}) ${near(`<= ${low + BigInt(margin * second)}`)}) AS first,
    (SELECT max(${zone.day}) ${near(`>= ${high - BigInt(margin * second)}`)}) AS last`)
  return span!
}
