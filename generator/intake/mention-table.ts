import type { Account } from '../account/account.ts'
import { midpointDay, stepsBetween } from '../calendar/grid.ts'
import { periodHolding } from '../calendar/periods.ts'
import { faultOf } from '../faults/catalogue.ts'
import { InputFault } from '../faults/fault.ts'
import { literal, type Database } from './database.ts'
import { byText, type LevelReader } from './level-names.ts'
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

/** More levels than this are no factor but free text. */
const mostLevels = 2000

/**
 * The modelled mentions as numbers only: `mention (author, instant, step, period, score, source, factor_0, ...)`, with the
 * author, one handle in one venue, as a hash or NULL; the column of `poster` is filled by `classifyPosters`.
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
  await createSteps(database, steps, periodNames.map((name) => periods.indexOf(name)), span.last)
  const kept = `scanned WHERE ${eligible} AND scanned.rowid NOT IN (SELECT row FROM repeated)`
  const levels: (readonly string[])[] = []
  for (const [index, factor] of account.factors.entries()) levels.push(factor === 'poster' ? posterClasses : await createLevels(database, factor, index, kept, levelOf))
  const coded = account.factors.map((factor, index) => (factor === 'poster' ? `NULL::USMALLINT AS factor_${index}` : `level_${index}.code AS factor_${index}`))
  const joins = account.factors.flatMap((factor, index) => (factor === 'poster' ? [] : [`JOIN level_${index} ON level_${index}.value = factor_${index}`]))
  await database.run(`CREATE TEMP TABLE mention AS SELECT CASE WHEN handle IS NOT NULL THEN hash(handle, level_0.code) END AS author, instant, step.step, step.period, score, source, ${coded.join(', ')}
    FROM (SELECT *, ${zone.instant} AS instant, ${zone.day} AS day FROM ${kept}) JOIN step USING (day) ${joins.join(' ')}`)
  return { steps, periods, levels }
}

/** `step (day, step, period)`: the step and the period that each day belongs to. */
async function createSteps(database: Database, steps: readonly number[], periodOf: readonly number[], lastDay: number): Promise<void> {
  const rows = steps.map((start, index) => `(${start}, ${index}, ${periodOf[index]})`)
  await database.run(`CREATE TEMP TABLE step AS SELECT CAST(day AS INTEGER) AS day, CAST(step AS USMALLINT) AS step, CAST(period AS USMALLINT) AS period FROM (
    SELECT unnest(range(start, coalesce(lead(start) OVER (ORDER BY start), ${lastDay + 1}))) AS day, step, period FROM (VALUES ${rows.join(', ')}) AS v(start, step, period))`)
}

/** `level_N (value, code)`: the account's level of every spelling in the data. */
async function createLevels(database: Database, factor: string, index: number, kept: string, levelOf: LevelReader): Promise<readonly string[]> {
  const values = await database.rows<{ value: string; mentions: bigint }>(`SELECT factor_${index} AS value, count(*) AS mentions FROM ${kept} GROUP BY ALL ORDER BY value LIMIT ${mostLevels + 1}`)
  if (values.length > mostLevels) throw new InputFault([faultOf('too-many-levels', `mentions ${factor}`, { factor, most: mostLevels })])
  const named = values.map(({ value, mentions }) => ({ value, name: levelOf(factor, value, Number(mentions)) }))
  const names = [...new Set(named.map(({ name }) => name))].sort(byText)
  const rows = named.map(({ value, name }) => `(${literal(value)}, ${names.indexOf(name)}::USMALLINT)`)
  await database.run(`CREATE TEMP TABLE level_${index} (value VARCHAR, code USMALLINT)`)
  if (rows.length > 0) await database.run(`INSERT INTO level_${index} VALUES ${rows.join(', ')}`)
  return names
}
