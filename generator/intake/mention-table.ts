import type { Account } from '../account/account.ts'
import { midpointDay, stepsBetween } from '../calendar/grid.ts'
import { periodHolding } from '../calendar/periods.ts'
import { faultOf } from '../faults/catalogue.ts'
import { InputFault } from '../faults/fault.ts'
import { literal, type Database } from './database.ts'
import { byText, mostSpellings, tidyValue, type LevelReader } from './level-names.ts'
import { filledColumns } from './scan-mentions.ts'
import type { Spellings } from './spellings.ts'
import type { ZoneSql } from './time-sql.ts'

/** Names of the numbers in `mention`. */
export interface MentionNames {
  /** Day number on which each step begins. */
  readonly steps: readonly number[]
  /** Name of each period. */
  readonly periods: readonly string[]
  /** One list of level names per factor of the account. */
  readonly levels: readonly (readonly string[])[]
  /** Index of the period under review; -1 where no mention's step belongs to it. */
  readonly review: number
}

/** How the numbers and texts of a factor in `scanned` become levels of the account. */
export interface Naming {
  readonly spellings: Spellings
  readonly levelOf: LevelReader
  /** Columns that are no factor: an empty field is no level of theirs but the name ''. */
  readonly traits: readonly string[]
}

/** What `viewMentions` is made of. */
export interface ViewOptions {
  readonly zone: ZoneSql
  /** SQL condition on `scanned`: readable and in scope. */
  readonly eligible: string
  /** Day numbers of the first and last mention that can be eligible. */
  readonly span: { readonly first: number; readonly last: number }
  /** Name of the period under review. */
  readonly period: string
  /** Further columns of `scanned` that `mention` has. */
  readonly extras: readonly string[]
  readonly naming: Naming
}

/** Poster classes, in the order of their numbers. */
const posterClasses = ['occasional', 'prolific', 'regular', 'unknown'] as const

/** `moment` is seconds since 1900 above this many bits of the row's number: it orders mentions by time, then as they stand in the files. */
export const momentBits = 30

/** `slot` is the period's number above this many bits of the step's. */
export const slotBits = 16
/** SQL of the two. */
export const stepSql = `(slot & ${2 ** slotBits - 1})::USMALLINT`
export const periodSql = `(slot >> ${slotBits})::USMALLINT`

const secondsTo1970 = -Date.UTC(1900, 0, 1) / 1000

/**
 * The modelled mentions as numbers only, as views of `scanned`: `kept` are its rows that are modelled, `mention (author,
 * moment, slot, score, source, clock, row, extras, factor_0, ...)` what they say. The author, one handle in one venue, is a hash or
 * NULL; the factor `poster` is still to come. Views, since writing a row a mention costs as much as working it out.
 *
 * @throws {InputFault} `too-many-levels`
 */
export async function viewMentions(
  database: Database, account: Account, { zone, eligible, span, period, extras, naming }: ViewOptions,
): Promise<MentionNames> {
  const steps = stepsBetween(account.grid, span.first, span.last)
  const periodNames = steps.map((start) => periodHolding(account.reporting, midpointDay(account.grid, start)).name)
  const periods = [...new Set(periodNames)]
  await createDays(database, steps, periodNames.map((name) => periods.indexOf(name)), span.last)
  const [repeated] = await database.rows<{ rows: bigint }>('SELECT count(*) AS rows FROM repeated')
  await database.run(`CREATE TEMP VIEW kept AS SELECT *, rowid AS row FROM scanned WHERE ${eligible}${repeated!.rows === 0n ? '' : ' AND scanned.rowid NOT IN (SELECT row FROM repeated)'}`)
  const coded: FactorSql[] = []
  for (const [index, factor] of account.factors.entries()) coded.push(factor === 'poster' ? { levels: posterClasses, level: '', joins: '' } : await nameLevels(database, factor, index, naming))
  const read = account.factors.flatMap((factor, index) => (factor === 'poster' ? [] : [index]))
  const author = filledColumns(account).author ? `CASE WHEN handle IS NOT NULL THEN hash(xor(handle, hash(${coded[0]!.level}))) END` : 'NULL::UBIGINT'
  await database.run(`CREATE TEMP VIEW mention AS
    SELECT ${author} AS author, ${secondsSql('instant')} * ${2 ** momentBits} + row::UBIGINT AS moment, slot, score, source, clock, row, ${extras.map((column) => `${column}, `).join('')}${read.map((index) => `${coded[index]!.level} AS factor_${index}`).join(', ')}
    FROM (SELECT *, ${zone.instant} AS instant, ${zone.day} AS day FROM kept) JOIN step_day USING (day) ${coded.map((factor) => factor.joins).join(' ')}`)
  return { steps, periods, levels: coded.map((factor) => factor.levels), review: periods.indexOf(period) }
}

/** Whole seconds since 1900 of an instant in microseconds since 1970. */
export function secondsSql(instant: string): string {
  return `((${instant} + ${secondsTo1970 * 1_000_000}) // 1000000)::UBIGINT`
}

/** `step_day (day, slot)`: the step and the period that each day belongs to. */
async function createDays(database: Database, steps: readonly number[], periodOf: readonly number[], lastDay: number): Promise<void> {
  const rows = steps.map((start, index) => `(${start}, ${periodOf[index]! * 2 ** slotBits + index})`)
  await database.run(`CREATE TEMP TABLE step_day AS SELECT CAST(day AS INTEGER) AS day, CAST(slot AS UINTEGER) AS slot FROM (
    SELECT unnest(range(start, coalesce(lead(start) OVER (ORDER BY start), ${lastDay + 1}))) AS day, slot FROM (VALUES ${rows.join(', ')}) AS v(start, slot))`)
}

interface FactorSql {
  readonly levels: readonly string[]
  /** SQL of the level's number, and the joins that it needs. */
  readonly level: string
  readonly joins: string
}

/** Name every spelling of a factor; `code_level_N (code, level)` and `other_level_N (other, level)` hold the numbers. */
async function nameLevels(database: Database, factor: string, index: number, { spellings, levelOf, traits }: Naming): Promise<FactorSql> {
  const found = await database.rows<{ code: number | null; other: string | null; mentions: bigint }>(
    `SELECT code_${index} AS code, other_${index} AS other, count(*) AS mentions FROM kept GROUP BY ALL ORDER BY ALL LIMIT ${mostSpellings + 1}`)
  if (found.length > mostSpellings) throw new InputFault([faultOf('too-many-levels', `mentions ${factor}`, { factor, most: mostSpellings })])
  const named = found.map(({ code, other, mentions }) => {
    const spelling = code === null ? other ?? '' : spellings[index]![code]!
    return { code, other, name: levelOf(factor, tidyValue(spelling) || (traits.includes(factor) ? '' : 'none'), Number(mentions)) }
  })
  const levels = [...new Set(named.map(({ name }) => name))].sort(byText)
  const coded = named.filter(({ code }) => code !== null).map(({ code, name }) => `(${code}, ${levels.indexOf(name)})`)
  const others = named.filter(({ code }) => code === null).map(({ other, name }) => `(${literal(other ?? '')}, ${levels.indexOf(name)})`)
  await database.run(`CREATE TEMP TABLE code_level_${index} (code UTINYINT, level USMALLINT)`)
  await database.run(`CREATE TEMP TABLE other_level_${index} (other VARCHAR, level USMALLINT)`)
  if (coded.length > 0) await database.run(`INSERT INTO code_level_${index} VALUES ${coded.join(', ')}`)
  if (others.length > 0) await database.run(`INSERT INTO other_level_${index} VALUES ${others.join(', ')}`)
  const byCode = `LEFT JOIN code_level_${index} ON code_level_${index}.code = code_${index}`
  if (others.length === 0) return { levels, level: `code_level_${index}.level`, joins: byCode }
  return {
    levels, level: `coalesce(code_level_${index}.level, other_level_${index}.level)`,
    joins: `${byCode} LEFT JOIN other_level_${index} ON other_level_${index}.other = other_${index}`,
  }
}
