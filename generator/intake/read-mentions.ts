import type { AuthorVariation } from '../../model/intake/intake-tables.ts'
import type { Account } from '../account/account.ts'
import type { CellPart } from './cell-part.ts'
import type { Database } from './database.ts'
import { keptSpan, type Dated, type Span } from './dated-mentions.ts'
import { findDuplicates, type Duplicates } from './duplicates.ts'
import { groupAuthors, type AuthorGroups } from './group-authors.ts'
import { groupCells, sumCells } from './group-cells.ts'
import { groupHindsight, type GroupedHindsight } from './group-hindsight.ts'
import { groupVariation } from './group-variation.ts'
import { viewMentions, type MentionNames, type Naming } from './mention-table.ts'
import { findOpenings } from './openings.ts'
import { classifyPosters } from './poster-classes.ts'
import { filledColumns, lastReject, otherBrandReasons } from './scan-mentions.ts'

/** Everything that is grouped from mentions: no row of it stands for a person. */
export interface GroupedMentions {
  readonly names: MentionNames
  /** Of the modelled mentions. */
  readonly span: Span
  readonly parts: readonly CellPart[]
  readonly variation: ReadonlyMap<number, AuthorVariation>
  readonly authors: AuthorGroups
  /** null where no forecast as of an earlier day is asked for. */
  readonly hindsight: GroupedHindsight | null
}

export interface SettledMentions {
  readonly duplicates: Duplicates
  /** Rows by reason. */
  readonly outOfScope: Readonly<Record<string, number>>
  /** null where no mention is left. */
  readonly grouped: GroupedMentions | null
}

/**
 * Decide about every row of `scanned` and group what is left.
 *
 * @param end - day number of the last day of the period under review
 * @param hindsightFrom - day number of the first day as of which a forecast is to be made; null where none is
 */
export async function settleMentions(
  database: Database, account: Account, { zone, span }: Dated, end: number, hindsightFrom: number | null, naming: Naming, progress: (message: string) => void,
): Promise<SettledMentions> {
  const eligible = `fate = 0 AND ${zone.until(end)}`
  progress('Looking for duplicates')
  const duplicates = await findDuplicates(database, zone, eligible, filledColumns(account))
  const outOfScope = await countOutOfScope(database, `NOT (${zone.until(end)})`)
  if (span === null || span.first > end) return { duplicates, outOfScope, grouped: null }
  progress('Naming and classing mentions')
  const names = await viewMentions(database, account, zone, eligible, { first: span.first, last: Math.min(span.last, end) }, naming)
  const openings = account.factors.includes('poster') ? await findOpenings(database, zone) : []
  await classifyPosters(database, account, openings)
  progress('Grouping cells')
  await sumCells(database, account.factors)
  const parts = await groupCells(database, account.factors, names)
  progress('Counting authors')
  const grouped = {
    names, parts, span: await keptSpan(database, zone), variation: await groupVariation(database), authors: await groupAuthors(database, names),
    hindsight: hindsightFrom === null ? null : await groupHindsight(database, names, openings, hindsightFrom),
  }
  return { duplicates, outOfScope, grouped }
}

async function countOutOfScope(database: Database, after: string): Promise<Readonly<Record<string, number>>> {
  const rows = await database.rows<{ fate: number; rows: bigint }>(
    `SELECT fate, count(*) AS rows FROM scanned WHERE fate > ${lastReject} OR (fate = 0 AND ${after}) GROUP BY fate ORDER BY fate`)
  return Object.fromEntries(rows.map(({ fate, rows: count }) => [fate === 0 ? 'after-period' : otherBrandReasons[fate - lastReject - 1]!, Number(count)]))
}
