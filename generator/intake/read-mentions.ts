import type { AuthorVariation, Period, SegmentTable } from '../../model/intake/intake-tables.ts'
import type { Account } from '../account/account.ts'
import { dayNumber } from '../calendar/days.ts'
import type { CellPart } from './cell-part.ts'
import type { Database } from './database.ts'
import { keptSpan, type Dated, type Span } from './dated-mentions.ts'
import { findDuplicates, type Duplicates } from './duplicates.ts'
import { groupAuthors, type AuthorGroups } from './group-authors.ts'
import { groupCells, sumCells } from './group-cells.ts'
import { groupExtremes, type GroupedExtremes } from './group-extremes.ts'
import { groupHindsight, type GroupedHindsight } from './group-hindsight.ts'
import { groupPull, type GroupedPull } from './group-pull.ts'
import { groupSegments } from './group-segments.ts'
import { groupVariation } from './group-variation.ts'
import type { LabelSet } from './labels.ts'
import type { MarginWish } from './margins.ts'
import { viewMentions, type MentionNames, type Naming } from './mention-table.ts'
import { findOpenings } from './openings.ts'
import { classifyPosters } from './poster-classes.ts'
import { filledColumns, lastReject, otherBrandReason } from './scan-mentions.ts'

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
  readonly extremes: readonly GroupedExtremes[]
  /** Empty where no thread is mapped. */
  readonly pull: readonly GroupedPull[]
  /** null where no margin is asked for. */
  readonly segments: SegmentTable | null
}

export interface SettledMentions {
  readonly duplicates: Duplicates
  /** Rows by reason. */
  readonly outOfScope: Readonly<Record<string, number>>
  /** null where no mention is left. */
  readonly grouped: GroupedMentions | null
}

/** What is to be settled and counted. */
export interface SettleOptions {
  /** Of the rows that are settled: 0 is the brand itself, see `competitorFate`. */
  readonly fate: number
  readonly review: Period
  /** Day number of the first day as of which a forecast is to be made; null where none is. */
  readonly hindsightFrom: number | null
  readonly naming: Naming
  /** null where nobody asks for labels by cell. */
  readonly labels: LabelSet | null
  readonly margins: readonly MarginWish[]
  readonly progress: (message: string) => void
}

/**
 * Decide about every row of `scanned` and group what is left.
 *
 * @param account - its factors followed by the columns that only margins ask for, which are the traits of `naming`
 */
export async function settleMentions(
  database: Database, account: Account, { zone, span }: Dated, { fate, review, hindsightFrom, naming, labels, margins, progress }: SettleOptions,
): Promise<SettledMentions> {
  const filled = filledColumns(account)
  const end = dayNumber(review.end)
  const eligible = `fate = ${fate} AND ${zone.until(end)}`
  progress('Looking for duplicates')
  const duplicates = await findDuplicates(database, zone, eligible, filled)
  const outOfScope = await countOutOfScope(database, fate, `NOT (${zone.until(end)})`)
  if (span === null || span.first > end) return { duplicates, outOfScope, grouped: null }
  progress('Naming and classing mentions')
  const threaded = filled.thread ? ['thread', ...(filled.place ? ['place'] : [])] : []
  const extras = [...threaded, ...(labels === null ? [] : ['label'])]
  const names = await viewMentions(database, account, { zone, eligible, span: { first: span.first, last: Math.min(span.last, end) }, period: review.name, extras, naming })
  const openings = account.factors.includes('poster') ? await findOpenings(database, zone) : []
  await classifyPosters(database, account, openings, filled.thread ? [...extras, 'moment'] : extras)
  progress('Grouping cells')
  const factors = account.factors.filter((factor) => !naming.traits.includes(factor))
  await sumCells(database, factors, labels?.names.length ?? 0)
  const parts = await groupCells(database, factors, names, labels?.names.length ?? 0)
  progress('Counting authors')
  const grouped = {
    names, parts, span: await keptSpan(database, zone), variation: await groupVariation(database), authors: await groupAuthors(database, { ...names, levels: names.levels.slice(0, factors.length) }),
    hindsight: hindsightFrom === null ? null : await groupHindsight(database, names, openings, hindsightFrom),
    extremes: await groupExtremes(database),
    pull: filled.thread ? await groupPull(database, factors, filled.place, account.smallestGroup) : [],
    segments: margins.length === 0 ? null : await groupSegments(database, names, account.factors, naming.traits, margins),
  }
  return { duplicates, outOfScope, grouped }
}

/** Rows that are not modelled by reason: of the brand itself, those of other brands among them; of a competitor, its own alone. */
async function countOutOfScope(database: Database, fate: number, after: string): Promise<Readonly<Record<string, number>>> {
  const others = fate === 0 ? `fate > ${lastReject} OR ` : ''
  const rows = await database.rows<{ other: number | null; rows: bigint }>(
    `SELECT CASE WHEN fate <> ${fate} THEN fate END AS other, count(*) AS rows FROM scanned WHERE ${others}(fate = ${fate} AND ${after}) GROUP BY other ORDER BY other`)
  const counts: Record<string, number> = {}
  for (const { other, rows: count } of rows) {
    const reason = other === null ? 'after-period' : otherBrandReason(other)
    counts[reason] = (counts[reason] ?? 0) + Number(count)
  }
  return counts
}
