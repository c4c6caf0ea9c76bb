import type { Account } from '../account/account.ts'
import { midpointDay, stepsBetween } from '../calendar/grid.ts'
import { periodHolding } from '../calendar/periods.ts'
import { faultOf } from '../faults/catalogue.ts'
import { InputFault } from '../faults/fault.ts'
import { literal, type Database } from './database.ts'
import { byText, type LevelReader } from './level-names.ts'
import { filledColumns } from './scan-mentions.ts'
import type { ZoneSql } from './time-sql.ts'

/** Names of the numbers in the table `mention`. */
export interface MentionNames {
  /** Day number on which each step begins. */
  readonly steps: readonly number[]
  /** Name of each period. */
  readonly periods: readonly string[]
  /** One list of level names per factor of the account. */
  readonly levels: readonly (readonly string[])[]
}

/** Poster classes, in the order of their numbers. */
export const posterClasses = ['occasional', 'prolific', 'regular', 'unknown'] as const

/** `moment` is seconds since 1900 above this many bits of the row's number: it orders mentions by time, then as they stand in the files. */
export const momentBits = 30

/** `slot` is the period's number above this many bits of the step's. */
export const slotBits = 16

const secondsTo1970 = -Date.UTC(1900, 0, 1) / 1000
/** More levels than this are no factor but free text. */
const mostLevels = 2000

/**
 * The modelled mentions as numbers only: `mention (author, moment, slot, score, source, factor_0, ...)`, sorted by author
 * and moment. The author, one handle in one venue, is a hash or NULL; the factor `poster` is still to come.
 *
 * @param eligible - SQL condition on `scanned`: readable and in scope
 * @param span - day numbers of the first and last mention that can be eligible
 * @throws {InputFault} `too-many-levels`
 */
export async function createMentions(
  database: Database, account: Account, zone: ZoneSql, eligible: string, span: { readonly first: number; readonly last: number }, levelOf: LevelReader,
): Promise<MentionNames> {
  const steps = stepsBetween(account.grid, span.first, span.last)
  const periodNames = steps.map((start) => periodHolding(account.reporting, midpointDay(account.grid, start)).name)
  const periods = [...new Set(periodNames)]
  await createDays(database, steps, periodNames.map((name) => periods.indexOf(name)), span.last)
  const [repeated] = await database.rows<{ rows: bigint }>('SELECT count(*) AS rows FROM repeated')
  const kept = `scanned WHERE ${eligible}${repeated!.rows === 0n ? '' : ' AND scanned.rowid NOT IN (SELECT row FROM repeated)'}`
  const read = account.factors.map((factor, index) => ({ factor, index })).filter(({ factor }) => factor !== 'poster')
  const values = await database.rows<FactorValue>(`SELECT ${read.map(({ index }) => `factor_${index}`).join(', ')}, count(*) AS mentions
    FROM ${kept} GROUP BY GROUPING SETS (${read.map(({ index }) => `(factor_${index})`).join(', ')}) ORDER BY ALL LIMIT ${mostLevels * read.length}`)
  const levels: (readonly string[])[] = account.factors.map(() => posterClasses)
  for (const { factor, index } of read) {
    const own = values.flatMap((row) => { const value = row[`factor_${index}`]; return value === null || value === undefined ? [] : [{ value, mentions: Number(row.mentions) }] })
    if (own.length >= mostLevels) throw new InputFault([faultOf('too-many-levels', `mentions ${factor}`, { factor, most: mostLevels })])
    levels[index] = await createLevels(database, factor, index, own, levelOf)
  }
  const seconds = `((instant + ${secondsTo1970 * 1_000_000}) // 1000000)::UBIGINT`
  const author = filledColumns(account).author ? 'CASE WHEN handle IS NOT NULL THEN hash(xor(handle, hash(level_0.code))) END' : 'NULL::UBIGINT'
  await database.run(`CREATE TEMP TABLE mention AS
    SELECT ${author} AS author, ${seconds} * ${2 ** momentBits} + row::UBIGINT AS moment, slot, score, source, ${read.map(({ index }) => `level_${index}.code AS factor_${index}`).join(', ')}
    FROM (SELECT *, ${zone.instant} AS instant, ${zone.day} AS day, rowid AS row FROM ${kept}) JOIN step_day USING (day)
    ${read.map(({ index }) => `JOIN level_${index} ON level_${index}.value = factor_${index}`).join(' ')} ORDER BY author, moment`)
  return { steps, periods, levels }
}

interface FactorValue {
  readonly mentions: bigint
  readonly [factor: `factor_${number}`]: string | null
}

/** `step_day (day, slot)`: the step and the period that each day belongs to. */
async function createDays(database: Database, steps: readonly number[], periodOf: readonly number[], lastDay: number): Promise<void> {
  const rows = steps.map((start, index) => `(${start}, ${periodOf[index]! * 2 ** slotBits + index})`)
  await database.run(`CREATE TEMP TABLE step_day AS SELECT CAST(day AS INTEGER) AS day, CAST(slot AS UINTEGER) AS slot FROM (
    SELECT unnest(range(start, coalesce(lead(start) OVER (ORDER BY start), ${lastDay + 1}))) AS day, slot FROM (VALUES ${rows.join(', ')}) AS v(start, slot))`)
}

/** `level_N (value, code)`: the account's level of every spelling in the data. */
async function createLevels(
  database: Database, factor: string, index: number, values: readonly { readonly value: string; readonly mentions: number }[], levelOf: LevelReader,
): Promise<readonly string[]> {
  const named = values.map(({ value, mentions }) => ({ value, name: levelOf(factor, value.replace(/^ +| +$/g, '') || 'none', mentions) }))
  const names = [...new Set(named.map(({ name }) => name))].sort(byText)
  await database.run(`CREATE TEMP TABLE level_${index} (value VARCHAR, code USMALLINT)`)
  const rows = named.map(({ value, name }) => `(${literal(value)}, ${names.indexOf(name)})`)
  if (rows.length > 0) await database.run(`INSERT INTO level_${index} VALUES ${rows.join(', ')}`)
  return names
}
