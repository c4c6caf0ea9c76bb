import type { AuthorVariation } from '../../model/intake/intake-tables.ts'
import type { Database } from './database.ts'
import { groupVariation } from './group-variation.ts'
import { stepSql, type MentionNames } from './mention-table.ts'
import { inOpening, type Opening } from './openings.ts'

/** What was not known yet on earlier days, by the numbers of the database. */
export interface GroupedHindsight {
  /** Number of the step that holds the first day as of which a forecast is made. */
  readonly before: number
  /** By number of the venue, of the mentions before that step. */
  readonly variation: ReadonlyMap<number, AuthorVariation>
  /** Steps of a venue whose poster classes look ahead, and the step from which on they are settled. */
  readonly settling: readonly { readonly venue: number; readonly from: number; readonly to: number; readonly settled: number }[]
}

/**
 * @param openings - of the sources; none where mentions are not classed
 * @param day - number of the first day as of which a forecast is made
 */
export async function groupHindsight(database: Database, { steps }: MentionNames, openings: readonly Opening[], day: number): Promise<GroupedHindsight> {
  const before = Math.max(0, steps.filter((start) => start <= day).length - 1)
  const settling: GroupedHindsight['settling'][number][] = []
  for (const opening of openings) {
    const rows = await database.rows<{ venue: number; from: number; to: number }>(
      `SELECT factor_0 AS venue, min(${stepSql}) AS "from", max(${stepSql}) AS "to" FROM mention WHERE ${inOpening(opening)} GROUP BY venue ORDER BY venue`)
    settling.push(...rows.map((row) => ({ ...row, settled: steps.filter((start) => start < opening.settledDay).length })))
  }
  return { before, variation: await groupVariation(database, before), settling }
}
