import type { MentionSource } from '../account/account.ts'
import { literal, type Database } from './database.ts'
import { byText } from './level-names.ts'
import type { Relation } from './relation.ts'

/**
 * Spellings of a factor that are frequent at the beginning of the files: `scanned.code_N` is their number, and only what
 * is spelled otherwise is kept as text in `other_N`. By factor of the account; empty for `poster`.
 */
export type Spellings = readonly (readonly string[])[]

const sampled = 10_000
/** A row is compared with each in turn. */
const most = 40

/** Look for spellings in the first rows of a file. */
export async function sampleSpellings(database: Database, factors: readonly string[], source: MentionSource, relation: Relation): Promise<Spellings> {
  const spellings: (readonly string[])[] = []
  const columns = factors.map((factor, index) => `${spellingSql(factor, source, relation)} AS factor_${index}`)
  await database.run(`CREATE OR REPLACE TEMP TABLE sample AS SELECT ${columns.join(', ')} FROM ${relation.sql} LIMIT ${sampled}`)
  for (const [index, factor] of factors.entries()) {
    const rows = factor === 'poster' ? [] : await database.rows<{ value: string }>(
      `SELECT factor_${index} AS value FROM sample WHERE factor_${index} IS NOT NULL GROUP BY ALL ORDER BY count(*) DESC, value LIMIT ${most}`)
    spellings.push(rows.map((row) => row.value))
  }
  return spellings
}

/** The field of a factor as it stands in the file; empty where the source has none, but for the venue. */
export function spellingSql(factor: string, source: MentionSource, relation: Relation): string {
  const theirs = factor === 'poster' ? undefined : source.columns[factor]
  const field = theirs === undefined ? 'NULL::VARCHAR' : relation.column(theirs)
  return factor === 'venue' ? field : `coalesce(${field}, '')`
}

/** SQL of the number of a spelling, or NULL. */
export function codeSql(field: string, spellings: readonly string[]): string {
  return spellings.length === 0 ? 'NULL' : `CASE ${field} ${spellings.map((spelling, code) => `WHEN ${literal(spelling)} THEN ${code}`).join(' ')} END`
}

/** The spellings of several samples as one list a factor. */
export function joinSpellings(lists: readonly Spellings[], factors: readonly string[]): Spellings {
  return factors.map((_, index) => [...new Set(lists.flatMap((list) => list[index]!))].sort(byText).slice(0, 250))
}
