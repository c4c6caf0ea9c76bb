import { mkdtemp, rm } from 'node:fs/promises'
import { tmpdir } from 'node:os'
import path from 'node:path'
import type { IntakeTables, Period } from '../../model/intake/intake-tables.ts'
import type { CompetitorTables } from '../../model/competitors/competitor-tables.ts'
import type { Account } from '../account/account.ts'
import { dayNumber } from '../calendar/days.ts'
import { readCompetitors } from './competitors.ts'
import { tablesOf, type Material } from './tables.ts'
import { openDatabase, type Database } from './database.ts'
import { dateMentions } from './dated-mentions.ts'
import { hashOf, lookOver, type InputFile } from './input-file.ts'
import { labelSet } from './labels.ts'
import { levelNames } from './level-names.ts'
import { traitsOf, type MarginWish } from './margins.ts'
import { settleMentions } from './read-mentions.ts'
import { cellsWithin, daysOf, readReadyMade } from './ready-made.ts'
import { countRejects, writeRejects } from './rejects.ts'
import { coveredPeriod, namedPeriod, noWholePeriod } from './review-period.ts'
import { createScanned, sampleFile, scanFile, type ScannedFile, type ScanPlace } from './scan-mentions.ts'
import { joinSpellings, type Spellings } from './spellings.ts'
import { joinUnread } from './unread-values.ts'

export interface IntakeOptions {
  /** Name of the period under review; default: the last whole one that the mentions cover. */
  readonly period?: string | undefined
  /** Folder to write `mentions.csv` into: file, line and reason of every row that could not be read. */
  readonly rejects?: string | undefined
  readonly progress?: ((message: string) => void) | undefined
  readonly threads?: number | undefined
  /** ISO date of the first day as of which a forecast is to be made; null or absent: none is. */
  readonly hindsightFrom?: string | null | undefined
  /** Count the labels of every cell, for a coding audit. */
  readonly labels?: boolean | undefined
  /** Count the authors of the period under review by these traits together, for a benchmark. */
  readonly margins?: readonly MarginWish[] | undefined
  /** Read the competitors of the account as well. */
  readonly competitors?: boolean | undefined
}

/**
 * From the account's files to the intake tables:
 *
 *   files ──look over──▶ UTF-8 ──scan──▶ `scanned`, one narrow row a mention ──date──▶ the period under review
 *     ──settle──▶ out of scope, duplicates ──class and group──▶ cells and counts ──▶ tables, with ready-made cells
 *
 * Mentions stay inside the database, which can reach the account's files and nothing else. The tables do not depend on
 * the number of threads: whole numbers are summed, everything is ordered.
 *
 * @throws {InputFault} see the catalogues of faults
 */
export async function readIntake(account: Account, options: IntakeOptions = {}): Promise<IntakeTables> {
  return (await readIntakeAndCover(account, options)).tables
}

/** What was read, and what the mentions cover, whatever period was asked for. */
export interface IntakeAndCover {
  readonly tables: IntakeTables
  /** The last whole period that the mentions cover; null where they cover none. */
  readonly covered: Period | null
  /** null where the account gives none, or nobody asks for them. */
  readonly competitors: CompetitorTables | null
}

/** As `readIntake`. */
export async function readIntakeAndCover(account: Account, options: IntakeOptions = {}): Promise<IntakeAndCover> {
  return withFiles(account, options, async (place, files) => {
    // Files are hashed while the database works.
    const hashing = hashAll(account, files.keys())
    try {
      const [material, hashes] = await Promise.all([gather(place, files, options), hashing])
      const inputs = material.inputs.map(({ path: file, rows }) => ({ path: file, sha256: hashes.get(file)!, rows }))
      const tables = tablesOf(account, { ...material, inputs })
      const after = { ...material, zone: material.dated.zone, progress: options.progress ?? ((): void => undefined) }
      return { tables, covered: material.covered, competitors: options.competitors === true ? await readCompetitors(place.database, account, tables, after) : null }
    } finally {
      await hashing.catch(() => undefined)
    }
  })
}

/** Where intake works: a database that reaches the files, and a folder of its own. */
export interface IntakePlace {
  readonly database: Database
  readonly account: Account
  readonly scratch: string
}

/** Open a database on the account's files, and take it away again after use. */
export async function withFiles<T>(
  account: Account, options: Pick<IntakeOptions, 'threads' | 'progress'>, use: (place: IntakePlace, files: ReadonlyMap<string, InputFile>) => Promise<T>,
): Promise<T> {
  const scratch = await mkdtemp(path.join(tmpdir(), 'tareline-intake-'))
  try {
    const files = await lookOverAll(account, scratch, options)
    const database = await openDatabase({ readable: [...files.values()].map((file) => file.readable), scratch, threads: options.threads })
    try {
      return await use({ database, account, scratch }, files)
    } finally {
      database.close()
    }
  } finally {
    await rm(scratch, { recursive: true, force: true })
  }
}

async function lookOverAll(account: Account, scratch: string, options: Pick<IntakeOptions, 'progress'>): Promise<ReadonlyMap<string, InputFile>> {
  const files = new Map<string, InputFile>()
  for (const file of account.mentions.flatMap((source) => source.files)) {
    if (files.has(file)) continue
    options.progress?.(`Looking over ${file}`)
    files.set(file, await lookOver(account.folder, file, scratch))
  }
  return files
}

async function hashAll(account: Account, files: Iterable<string>): Promise<ReadonlyMap<string, string>> {
  const hashes = new Map<string, string>()
  for (const file of files) hashes.set(file, await hashOf(account.folder, file))
  return hashes
}

/** Everything but the hashes of the files. The tables that mentions were gathered in stay in the database. */
export async function gather(place: IntakePlace, files: ReadonlyMap<string, InputFile>, options: IntakeOptions): Promise<Gathered> {
  const { database, account } = place
  const margins = options.margins ?? []
  const traits = traitsOf(account, margins)
  const counted = options.labels === true ? labelSet(account) : null
  const labels = typeof counted === 'string' ? null : counted
  const widened = { ...account, factors: [...account.factors, ...traits] }
  const progress = options.progress ?? ((): void => undefined)
  const hindsightFrom = options.hindsightFrom == null ? null : dayNumber(options.hindsightFrom)
  const asked = options.period === undefined ? null : namedPeriod(account, options.period)
  const names = levelNames(account)
  const ready = await readReadyMade(database, account, files, names.levelOf)
  const { scanned, spellings } = await scanAll({ ...place, account: widened, labels }, files, progress)
  const rejected = await countRejects(database, scanned)
  if (options.rejects !== undefined) await writeRejects(database, scanned, options.rejects)
  const dated = await dateMentions(database, account)
  const span = joined([dated.span, daysOf(ready.parts, account.grid)])
  const covered = span === null ? null : coveredPeriod(account.reporting, span.first, span.last)
  if (asked === null && span !== null && covered === null) throw noWholePeriod(account.reporting, span.first, span.last)
  const review = asked ?? covered
  const settled = review === null ? null : await settleMentions(database, widened, dated,
    { fate: 0, review, hindsightFrom, naming: { spellings, levelOf: names.levelOf, traits }, labels, margins, progress })
  return {
    covered, review, scanned, spellings, received: receivedOf(scanned) + ready.parts.length, unread: joinUnread(scanned.map((file) => file.unread)), rejected, dated, settled, unmapped: names.unmapped(), labels: counted, margins,
    ready: review === null ? [] : cellsWithin(ready.parts, account.grid, review),
    readyAfter: review === null ? 0 : ready.parts.length - cellsWithin(ready.parts, account.grid, review).length,
    inputs: [...files.values()].map(({ path: name }) => ({ path: name, rows: ready.rows.get(name) ?? rowsOf(scanned, name) })),
  }
}

type Gathered = Omit<Material, 'inputs'> & Scan & { readonly covered: Period | null; readonly inputs: readonly { readonly path: string; readonly rows: number }[] }

interface DaySpan {
  readonly first: number
  readonly last: number
}

function joined(spans: readonly (DaySpan | null)[]): DaySpan | null {
  const some = spans.filter((span) => span !== null)
  return some.length === 0 ? null : { first: Math.min(...some.map(({ first }) => first)), last: Math.max(...some.map(({ last }) => last)) }
}

interface Scan {
  readonly scanned: readonly ScannedFile[]
  readonly spellings: Spellings
}

async function scanAll(place: ScanPlace, files: ReadonlyMap<string, InputFile>, progress: (message: string) => void): Promise<Scan> {
  const { database, account } = place
  const sources = account.mentions.flatMap((source, index) => (source.kind === 'mentions' ? [{ source, index }] : []))
  const samples: Spellings[] = []
  for (const { source } of sources) samples.push(await sampleFile(database, account, source, files.get(source.files[0]!)!))
  const spellings = joinSpellings(samples, account.factors)
  const scanned: ScannedFile[] = []
  await createScanned(place)
  for (const { source, index } of sources) {
    for (const file of source.files) {
      progress(`Reading ${file}`)
      scanned.push(await scanFile(place, index, files.get(file)!, spellings))
    }
  }
  return { scanned, spellings }
}

function rowsOf(scanned: readonly ScannedFile[], name: string): number {
  return receivedOf(scanned.filter(({ file }) => file.path === name))
}

function receivedOf(scanned: readonly ScannedFile[]): number {
  return scanned.reduce((total, { sound, malformed }) => total + sound + malformed.length, 0)
}
