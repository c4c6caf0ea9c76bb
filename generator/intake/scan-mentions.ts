import type { Account, MentionSource } from '../account/account.ts'
import { literal, type Database } from './database.ts'
import type { InputFile } from './input-file.ts'
import { malformedRows, type MalformedRow } from './malformed-rows.ts'
import { relationOf, type Relation } from './relation.ts'
import { scoreSql } from './score-sql.ts'
import { timeSql } from './time-sql.ts'

/** Why a row cannot be read; the order in which they are looked for. The codes stand in `scanned.reason`. */
export const rejectReasons = ['row-malformed', 'time-unreadable', 'score-unreadable', 'score-outside-range', 'venue-missing'] as const

/** Whom a mention is about. The codes stand in `scanned.about`. */
export const aboutOthers = ['other-brand', 'brand-missing'] as const

/** What the scan of one file found. */
export interface ScannedFile {
  readonly file: InputFile
  /** `rowid` of its first row in `scanned`. */
  readonly first: number
  readonly sound: number
  readonly malformed: readonly MalformedRow[]
  readonly cut: Relation['cut']
}

/**
 * Every mention becomes one narrow row of `scanned`, in the order of sources, files and rows: hashes and numbers in the
 * place of ids, handles and texts, which are not kept. `factor_N` is the N-th factor of the account.
 *
 * Hashes have 64 bits: among 5 million ids the chance that any two different ones agree is 7 in 10 million.
 */
export async function createScanned(database: Database, factors: readonly string[]): Promise<void> {
  const levels = factors.map((_, index) => `factor_${index} VARCHAR`).join(', ')
  await database.run(`CREATE TEMP TABLE scanned (source USMALLINT, reason UTINYINT, about UTINYINT, clock BIGINT, zoned BOOLEAN, score INTEGER, id UBIGINT, handle UBIGINT, text UBIGINT, ${levels})`)
}

/** Read one file into `scanned`. */
export async function scanFile(database: Database, account: Account, sourceIndex: number, file: InputFile, first: number): Promise<ScannedFile> {
  const source = account.mentions[sourceIndex] as MentionSource
  const used = usedColumns(source, account.factors)
  const relation = await relationOf(database, file, used.map((ours) => source.columns[ours]!), source)
  await database.run(`INSERT INTO scanned ${scanSql(account, source, sourceIndex, relation)}`)
  const [counted] = await database.rows<{ rows: bigint }>('SELECT count(*) AS rows FROM scanned')
  return { file, first, sound: Number(counted!.rows) - first, malformed: file.kind === 'parquet' ? [] : await malformedRows(database), cut: relation.cut }
}

function usedColumns(source: MentionSource, factors: readonly string[]): readonly string[] {
  const read = new Set(['posted_at', 'score', 'id', 'author', 'brand', 'text', ...factors.filter((factor) => factor !== 'poster')])
  return Object.keys(source.columns).filter((ours) => read.has(ours))
}

function scanSql(account: Account, source: MentionSource, sourceIndex: number, relation: Relation): string {
  const field = (ours: string): string => {
    const theirs = source.columns[ours]
    return theirs === undefined ? 'NULL::VARCHAR' : relation.column(theirs)
  }
  const trimmed = (ours: string): string => `trim(${field(ours)})`
  const filled = (ours: string): string => `nullif(${trimmed(ours)}, '')`
  const time = timeSql('posted', source.timeFormat)
  const score = scoreSql('scored', source.score)
  const sound = relation.header.length === 0 ? 'sound' : 'true'
  const levels = account.factors.map((factor, index) =>
    `${factor === 'poster' ? 'NULL' : factor === 'venue' ? filled(factor) : `coalesce(${filled(factor)}, 'none')`} AS factor_${index}`)
  const brand = `lower(${filled('brand')})`
  const about = source.columns.brand === undefined ? '0' : `CASE ${brand} WHEN ${literal(account.brand.toLowerCase())} THEN 0 ELSE CASE WHEN ${brand} IS NULL THEN 2 ELSE 1 END END`
  const ours = [
    `${trimmed('posted_at')} AS posted`, `${trimmed('score')} AS scored`, `${sound} AS sound`, `${about} AS about`,
    `hash(${filled('id')}, ${sourceIndex}) AS id_hash, ${filled('id')} IS NOT NULL AS has_id`,
    `hash(${filled('author')}) AS handle_hash, ${filled('author')} IS NOT NULL AS has_author`,
    `${source.columns.text === undefined ? 'NULL::VARCHAR' : comparable(field('text'))} AS words`, ...levels,
  ]
  const reason = `CASE WHEN NOT sound THEN 1 WHEN clock IS NULL THEN 2 WHEN score IS NULL THEN CASE WHEN ${score.outside} THEN 4 ELSE 3 END WHEN factor_0 IS NULL THEN 5 ELSE 0 END`
  return `SELECT ${sourceIndex}, ${reason}, about, clock, zoned, score, CASE WHEN has_id THEN id_hash END, CASE WHEN has_author THEN handle_hash END, `
    + `CASE WHEN length(words) >= 40 THEN hash(words) END, ${account.factors.map((_, index) => `factor_${index}`).join(', ')} `
    + `FROM (SELECT *, ${time.clock} AS clock, ${time.zoned} AS zoned, ${score.score} AS score FROM (SELECT ${ours.join(', ')} FROM ${relation.sql}))`
}

/** A text as reposts are compared: lower case, without links, handles and spacing. */
function comparable(text: string): string {
  return `regexp_replace(lower(${text}), '(https?://|www\\.)[^\\s]+|@[\\pL\\pN_.-]+|[\\s\\pZ]+', '', 'g')`
}
