import { samplingVariance } from '../../model/cells/sampling-variance.ts'
import type { Account, MentionSource } from '../account/account.ts'
import { placeOf } from '../account/yaml-places.ts'
import { faultOf } from '../faults/catalogue.ts'
import { InputFault } from '../faults/fault.ts'
import { auditAllocation, leastTotal } from './audit-allocation.ts'
import type { Database } from './database.ts'
import { periodSql, type MentionNames } from './mention-table.ts'
import { gather, withFiles, type IntakeOptions } from './read-intake.ts'
import { relationOf } from './relation.ts'
import { idSql, type ScannedFile } from './scan-mentions.ts'
import { tablesOf } from './tables.ts'

/** A post to be coded by hand. */
export interface AuditPost {
  /** Name of the venue in the account. */
  readonly venue: string
  /** As it stands in the file. */
  readonly id: string
  /** Path of the file, relative to the account folder. */
  readonly file: string
}

export interface AuditSampleOptions extends Pick<IntakeOptions, 'period' | 'threads' | 'progress'> {
  /** Posts in all. */
  readonly size: number
  readonly seed: number
}

/** An audit of fewer codings in a venue is not applied (model.md 4). */
const leastOfVenue = 50

/**
 * A stratified random sample of the posts of the period under review, for a coding audit: from each venue by its size times
 * the standard deviation inside its cells (Neyman 1934), and at least 50 of it. Only posts whose source scores by labels, which
 * are what an audit compares, and only those with an id. The order in a venue is that of the draw: any number of the
 * first ones is a random sample as well.
 *
 * @returns by venue; all posts where there are fewer than asked for
 * @throws {InputFault} `audit-sample-ids`, `audit-sample-small`, and those of intake
 */
export async function sampleForAudit(account: Account, options: AuditSampleOptions): Promise<readonly AuditPost[]> {
  const sources = auditedSources(account)
  return withFiles(account, options, async (place, files) => {
    const { database } = place
    const material = await gather(place, files, options)
    const { factors, ...tables } = tablesOf(account, { ...material, inputs: [] })
    const names = material.settled?.grouped?.names
    if (names === undefined) return []
    await database.run(`CREATE TEMP TABLE auditable AS SELECT factor_0 AS venue, mention.row, id FROM mention JOIN scanned ON scanned.rowid = mention.row
      WHERE id IS NOT NULL AND mention.source IN (${sources.join(', ')}) AND ${periodSql} = ${names.review}`)
    const within = samplingVariance({ factors, ...tables }).withinCell
    const sdOf = (venue: string): number => Math.sqrt(within[factors[0]!.levels.findIndex((level) => level.name === venue)]!)
    const drawn = await drawPosts(database, names, sdOf, options)
    const posts = new Map<bigint, AuditPost>()
    for (const file of material.scanned) for (const [row, post] of await postsOf(database, account, file, names)) posts.set(row, post)
    return drawn.map((row) => posts.get(row)!)
  })
}

/** Sources that an audit can speak of. @throws {InputFault} `audit-sample-ids` where none of them has ids */
function auditedSources(account: Account): readonly number[] {
  const sources = account.mentions.flatMap((source, index) => (source.kind === 'mentions' && source.score.kind === 'labels' && source.columns.id !== undefined ? [index] : []))
  if (sources.length === 0) throw new InputFault([faultOf('audit-sample-ids', placeOf(account.places, ['mentions']), {})])
  return sources
}

/** `drawn (row, id, venue)` of `auditable`. @returns the numbers of its rows, by venue and in the order of the draw */
async function drawPosts(database: Database, names: MentionNames, sdOf: (venue: string) => number, { size, seed }: AuditSampleOptions): Promise<readonly bigint[]> {
  const venues = await database.rows<{ venue: number; posts: bigint }>('SELECT venue, count(*) AS posts FROM auditable GROUP BY venue ORDER BY venue')
  const sizes = venues.map(({ posts }) => Number(posts))
  const least = leastTotal(sizes, leastOfVenue)
  if (size < least) throw new InputFault([faultOf('audit-sample-small', '--audit-sample', { size, least, each: leastOfVenue })])
  const counts = auditAllocation({ sizes, sds: venues.map(({ venue }) => sdOf(names.levels[0]![venue]!)) }, Math.min(size, sizes.reduce((sum, posts) => sum + posts, 0)), leastOfVenue)
  const wanted = venues.map(({ venue }, index) => `(${venue}, ${counts[index]!})`)
  await database.run(`CREATE TEMP TABLE drawn AS SELECT row, id, venue, turn FROM (
    SELECT *, row_number() OVER (PARTITION BY venue ORDER BY hash(xor(id, hash(${seed}::BIGINT))), row) AS turn FROM auditable)
    JOIN (VALUES ${['(-1, 0)', ...wanted].join(', ')}) AS wanted(venue, posts) USING (venue) WHERE turn <= posts`)
  return (await database.rows<{ row: bigint }>('SELECT row FROM drawn ORDER BY venue, turn')).map(({ row }) => row)
}

/** The drawn posts of a file by number of their row. Ids are kept as hashes only: they are read again from the file. */
async function postsOf(database: Database, account: Account, { file, source, first, sound }: ScannedFile, { levels }: MentionNames): Promise<ReadonlyMap<bigint, AuditPost>> {
  const inFile = `drawn WHERE row >= ${first} AND row < ${first + sound}`
  const rows = await database.rows<{ row: bigint; venue: number; id: bigint }>(`SELECT row, venue, id FROM ${inFile}`)
  if (rows.length === 0) return new Map()
  const reading = account.mentions[source] as MentionSource
  const { sql, column } = await relationOf(database, file, [reading.columns.id!], reading)
  const field = column(reading.columns.id!)
  const ids = await database.rows<{ hash: bigint; id: string }>(`SELECT DISTINCT ${idSql(field, source)} AS hash, ${field} AS id FROM ${sql} WHERE ${idSql(field, source)} IN (SELECT id FROM ${inFile})`)
  const idOf = new Map(ids.map(({ hash, id }) => [hash, id]))
  return new Map(rows.map(({ row, venue, id }) => [row, { venue: levels[0]![venue]!, id: idOf.get(id)!, file: file.path }]))
}
