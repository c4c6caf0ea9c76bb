import type { Account, MentionSource } from '../account/account.ts'
import { literal, type Database } from './database.ts'
import type { InputFile } from './input-file.ts'
import { malformedRows, type MalformedRow } from './malformed-rows.ts'
import { relationOf, type Relation } from './relation.ts'
import { labelSql, type LabelSet } from './labels.ts'
import { scoreSql } from './score-sql.ts'
import { codeSql, sampleSpellings, spellingSql, type Spellings } from './spellings.ts'
import { unreadValues, type UnreadValue } from './unread-values.ts'
import { withoutUnclosedQuote } from './unclosed-quotes.ts'
import { timeSql, timeText } from './time-sql.ts'

/** Why a row cannot be read, in the order in which reasons are looked for; `scanned.fate` is 1 for the first. */
export const rejectReasons = ['row-malformed', 'time-unreadable', 'score-unreadable', 'score-outside-range', 'venue-missing'] as const

/** Why a readable row is not about the brand; `scanned.fate` goes on from the reasons of rejection. Fates after these are competitors, other brands too. */
const otherBrandReasons = ['other-brand', 'brand-missing'] as const

/** Fates up to this one are rejections; 0 is none. */
export const lastReject = rejectReasons.length

/** The fate of rows of the N-th competitor of the account. */
export const competitorFate = (competitor: number): number => lastReject + otherBrandReasons.length + 1 + competitor

/** Why a row of a fate is out of scope. */
export const otherBrandReason = (fate: number): (typeof otherBrandReasons)[number] => otherBrandReasons[fate - lastReject - 1] ?? 'other-brand'

/** What the scan of one file found. */
export interface ScannedFile {
  readonly file: InputFile
  /** Index into the sources of the account. */
  readonly source: number
  /** `rowid` of its first row in `scanned`. */
  readonly first: number
  readonly sound: number
  readonly malformed: readonly MalformedRow[]
  readonly cut: Relation['cut']
  /** The most frequent values that could not be read, where they are more than a few. */
  readonly unread: readonly UnreadValue[]
}

/**
 * Every mention becomes one narrow row of `scanned`, in the order of sources, files and rows: hashes and numbers in the
 * place of ids, handles and texts, which are not kept. `code_N` and `other_N` are the N-th factor of the account, see
 * spellings.ts; columns that no source fills are left out.
 *
 * Hashes have 64 bits: among 5 million ids the chance that any two different ones agree is 7 in 10 million.
 */
export async function createScanned({ database, account, labels }: ScanPlace): Promise<void> {
  await database.run(`CREATE TEMP TABLE scanned (${scannedColumns(account, labels).map(({ name, type }) => `${name} ${type}`).join(', ')})`)
}

/** Which of the columns that only some accounts fill are there. */
export function filledColumns(account: Account): FilledColumns {
  const sources = account.mentions.filter((source): source is MentionSource => source.kind === 'mentions')
  const filled = (ours: string): boolean => sources.some((source) => source.columns[ours] !== undefined)
  return { id: filled('id'), author: filled('author'), text: filled('text'), thread: filled('thread'), place: filled('thread') && filled('thread_position') }
}

export interface FilledColumns {
  readonly id: boolean
  readonly author: boolean
  readonly text: boolean
  readonly thread: boolean
  /** In the thread. */
  readonly place: boolean
}

function scannedColumns(account: Account, labels: LabelSet | null): readonly { readonly name: string; readonly type: string }[] {
  const { id, author, text, thread, place } = filledColumns(account)
  return [
    { name: 'source', type: 'USMALLINT' }, { name: 'fate', type: 'UTINYINT' }, { name: 'clock', type: 'BIGINT' }, { name: 'zoned', type: 'BOOLEAN' }, { name: 'score', type: 'INTEGER' },
    ...(id ? [{ name: 'id', type: 'UBIGINT' }] : []), ...(author ? [{ name: 'handle', type: 'UBIGINT' }] : []), ...(text ? [{ name: 'text', type: 'UBIGINT' }] : []),
    ...(thread ? [{ name: 'thread', type: 'UBIGINT' }] : []), ...(place ? [{ name: 'place', type: 'DOUBLE' }] : []), ...(labels === null ? [] : [{ name: 'label', type: 'USMALLINT' }]),
    ...account.factors.flatMap((factor, index) => (factor === 'poster' ? [] : [{ name: `code_${index}`, type: 'UTINYINT' }, { name: `other_${index}`, type: 'VARCHAR' }])),
  ]
}

/** Where `scanFile` reads from and writes to. */
export interface ScanPlace {
  readonly database: Database
  /** Its factors are followed by the columns that only a benchmark asks for. */
  readonly account: Account
  readonly scratch: string
  /** null where nobody asks which label a mention was given. */
  readonly labels: LabelSet | null
}

/** Read one file into `scanned`. */
export async function scanFile(place: ScanPlace, sourceIndex: number, file: InputFile, spellings: Spellings, attempt = 0): Promise<ScannedFile> {
  const { database, account } = place
  const source = account.mentions[sourceIndex] as MentionSource
  const relation = await mentionRelation(database, account, source, file)
  const before = await extentOf(database)
  await database.run(`INSERT INTO scanned ${scanSql(place, sourceIndex, relation, spellings)}`)
  const after = await extentOf(database)
  const malformed = file.kind === 'parquet' ? [] : await malformedRows(database)
  const first = after.end - (after.rows - before.rows)
  const closed = malformed.length === 0 || relation.cut === null ? null : await withoutUnclosedQuote(file, relation.cut, place.scratch, attempt)
  if (closed !== null) {
    await database.run(`DELETE FROM scanned WHERE rowid >= ${first}`)
    return scanFile(place, sourceIndex, closed, spellings, attempt + 1)
  }
  const sound = after.rows - before.rows
  return { file, source: sourceIndex, first, sound, malformed, cut: relation.cut, unread: await manyUnread(database, first, sound) ? await unreadValues(database, source, relation) : [] }
}

/** Share of a file's rows without a readable time or score above which their values are looked at, in a second reading. */
const worthALook = 0.01

async function manyUnread(database: Database, first: number, rows: number): Promise<boolean> {
  const [unread] = await database.rows<{ rows: bigint }>(`SELECT count(*) AS rows FROM scanned WHERE rowid >= ${first} AND fate BETWEEN 2 AND 4`)
  return Number(unread!.rows) > worthALook * rows
}

/** How many rows `scanned` has, and the number of the next: rows that were deleted leave a gap. */
async function extentOf(database: Database): Promise<{ readonly rows: number; readonly end: number }> {
  const [extent] = await database.rows<{ rows: bigint; end: bigint }>('SELECT count(*) AS rows, coalesce(max(rowid), -1) + 1 AS "end" FROM scanned')
  return { rows: Number(extent!.rows), end: Number(extent!.end) }
}

/** The spellings at the beginning of a file. */
export async function sampleFile(database: Database, account: Account, source: MentionSource, file: InputFile): Promise<Spellings> {
  const spellings = await sampleSpellings(database, account.factors, source, await mentionRelation(database, account, source, file))
  // The rows will be read again, and those that cannot be cut reported then.
  if (file.kind !== 'parquet') await malformedRows(database)
  return spellings
}

function mentionRelation(database: Database, account: Account, source: MentionSource, file: InputFile): Promise<Relation> {
  return relationOf(database, file, usedColumns(source, account.factors).map((ours) => source.columns[ours]!), source)
}

function usedColumns(source: MentionSource, factors: readonly string[]): readonly string[] {
  const read = new Set(['posted_at', 'score', 'id', 'author', 'brand', 'text', 'thread', 'thread_position', ...factors.filter((factor) => factor !== 'poster')])
  return Object.keys(source.columns).filter((ours) => read.has(ours))
}

/** SQL of the hash that stands for an id: a source has ids of its own. */
export function idSql(field: string, source: number): string {
  return `xor(hash(${field}), hash(${source}))`
}

function scanSql({ account, labels }: ScanPlace, sourceIndex: number, relation: Relation, spellings: Spellings): string {
  const source = account.mentions[sourceIndex] as MentionSource
  const time = timeSql('posted', source.timeFormat)
  const score = scoreSql('scored', source.score, relation.cut?.delimiter !== ',')
  const read = `SELECT ${fieldsSql(account, source, relation).join(', ')} FROM ${relation.sql}`
  const factors = account.factors.flatMap((factor, index) => (factor === 'poster' ? [] : [index]))
  const timed = [[time.draft, ...factors.map((index) => `${codeSql(`factor_${index}`, spellings[index]!)} AS code_${index}`)], [time.zoned, `${score.score} AS score`, ...(labels === null ? [] : [`${labelSql('scored', source.score, labels)} AS label`])], [time.reading], [time.clock]]
    .reduce((inner, columns) => `SELECT *, ${columns.join(', ')} FROM (${inner})`, read)
  const unscored = `CASE WHEN ${score.outside} THEN 4 ELSE 3 END`
  const columns: Readonly<Record<string, string>> = {
    source: String(sourceIndex),
    fate: `CASE WHEN NOT sound THEN 1 WHEN clock IS NULL THEN 2 WHEN score IS NULL THEN ${unscored} WHEN ${blank('factor_0')} THEN 5 ELSE other END`,
    id: `CASE WHEN id <> '' THEN ${idSql('id', sourceIndex)} END`,
    thread: `CASE WHEN thread <> '' THEN ${idSql('thread', sourceIndex)} END`,
    place: 'TRY_CAST(place AS DOUBLE)',
    handle: "CASE WHEN handle <> '' THEN hash(handle) END",
    text: 'CASE WHEN length(words) >= 40 THEN hash(words) END',
    ...Object.fromEntries(factors.map((index) => [`other_${index}`, `CASE WHEN code_${index} IS NULL THEN factor_${index} END`])),
  }
  return `SELECT ${scannedColumns(account, labels).map(({ name }) => columns[name] ?? name).join(', ')} FROM (${timed})`
}

/** The fields of a row as they stand in the file; values of factors are tidied when they are named, not here. */
function fieldsSql(account: Account, source: MentionSource, relation: Relation): readonly string[] {
  const field = (ours: string): string => {
    const theirs = source.columns[ours]
    return theirs === undefined ? 'NULL::VARCHAR' : relation.column(theirs)
  }
  const brand = `lower(trim(${field('brand')}))`
  const competitors = account.competitors.map((name, index) => `WHEN ${literal(name.toLowerCase())} THEN ${competitorFate(index)} `).join('')
  const other = source.columns.brand === undefined ? '0'
    : `CASE ${brand} WHEN ${literal(account.brand.toLowerCase())} THEN 0 ${competitors}ELSE CASE WHEN ${brand} <> '' THEN ${lastReject + 1} ELSE ${lastReject + 2} END END`
  return [
    `${timeText(field('posted_at'))} AS posted`, `${field('score')} AS scored`, `${relation.sound} AS sound`, `${other} AS other`, `${field('id')} AS id`, `${field('author')} AS handle`,
    `${field('thread')} AS thread`, `${field('thread_position')} AS place`,
    `${source.columns.text === undefined ? 'NULL::VARCHAR' : comparable(field('text'))} AS words`,
    ...account.factors.flatMap((factor, index) => (factor === 'poster' ? [] : [`${spellingSql(factor, source, relation)} AS factor_${index}`])),
  ]
}

/** Whether a field holds nothing but spaces and control characters, all of which sort before an exclamation mark. */
function blank(field: string): string {
  return `(${field} IS NULL OR (${field} < '!' AND regexp_full_match(${field}, '[\\x00-\\x20]*')))`
}

/** A text as reposts are compared: lower case, without links, handles and spacing. */
function comparable(text: string): string {
  return `regexp_replace(lower(${text}), '(https?://|www\\.)[^\\s]+|@[\\pL\\pN_.-]+|[\\s\\pZ]+', '', 'g')`
}
