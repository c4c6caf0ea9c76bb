import type { Estimate, Findings } from '../findings/schema.ts'
import { quantiles } from '../statistics/quantile.ts'
import { definitionChanges, type Definition, type DefinitionPart } from './definition.ts'
import { latePosts } from './late-posts.ts'
import type { Past, SealedReview } from './past.ts'
import { redefine } from './redefine.ts'
import { levelsOfPast, type PresentReading } from './why-moved.ts'

type Revisions = NonNullable<Findings['revisions']>
type Revised = Revisions['periods'][number]

/** What the present review says of past periods, and by which definition. */
export interface Present {
  readonly periods: Findings['opinion']['periods']
  readonly definition: Definition
  readonly reading: PresentReading
  /** `auditOf` the present review. */
  readonly audit: string
  /** Whether an audit is applied. */
  readonly audited: boolean
}

/**
 * Every sealed period as it was first told, as it stands now, and why it moved.
 *
 *     sealed tables ──by the definition of now──▶ level then ──▶ with what came in late ──▶ with what came after
 *                                     (redefine)             (levelsOfPast, one solve each, the same standard deviations)
 *
 * Parts sum to the whole. What is left beside the posts (another definition, another program, standard deviations learnt anew) is counted as the account's
 * where the account file or the audit changed, else as the program's where that changed, else with what came after.
 */
export function readRevisions(past: Past, present: Present): Revisions {
  const names = [...new Set(past.reviews.map(({ period }) => period))].sort()
  const periods = names.map((name) => readPeriod(past.reviews.filter(({ period }) => period === name), past, present))
  return {
    periods, typical: typicalOf(periods), breaks: breaksOf(past, present),
    late: periods.reduce((sum, { late }) => sum + late, 0), gone: periods.reduce((sum, { gone }) => sum + gone, 0),
  }
}

/** @param reviews - of one period, in the order of sealing */
function readPeriod(reviews: readonly SealedReview[], { program }: Past, present: Present): Revised {
  const [first, last] = [reviews[0], reviews[reviews.length - 1]]
  const now = present.periods.find(({ period }) => period === first.period) ?? null
  const redefined = first.definition === null ? [] : definitionChanges(first.definition, present.definition)
  const then = tablesByNow(first, present)
  const programChanged = first.madeBy.model !== program.model
  const moved = now === null ? null : now.adjusted.mean - first.told.level.mean
  const accountChanged = redefined.some((part) => part !== 'program') || first.definition === null || first.told.audit !== present.audit
  return {
    period: first.period, sealed_on: first.sealedOn, level: first.told.level, change: first.told.change,
    revised: reviews.length === 1 ? null : { review: last.name, revision: last.revision, sealed_on: last.sealedOn, reason: last.reason ?? '', level: last.told.level },
    level_now: now?.adjusted ?? null, change_now: now?.change ?? null, moved,
    moved_change: now?.change == null || first.told.change === null ? null : now.change.mean - first.told.change.mean,
    parts: moved === null ? null : partsOf(moved, then === null ? null : levelsOfPast(present.reading, then, first.period), accountChanged, programChanged),
    outside: now !== null && (now.adjusted.mean < first.told.level.low || now.adjusted.mean > first.told.level.high),
    ...latePosts(then ?? first.tables, present.reading.tables, first.period, then !== null),
    redefined: [...redefined], bridged: then !== null, program_changed: programChanged,
  }
}

/** The tables of then by the definition of now; null where it can't be done. */
function tablesByNow({ definition, tables }: SealedReview, { definition: now, reading, audited }: Present) {
  if (definition === null || (audited && tables.labels === null)) return null
  return redefine(tables, definition, now, reading.tables)
}

function partsOf(moved: number, levels: ReturnType<typeof levelsOfPast>, accountChanged: boolean, programChanged: boolean): NonNullable<Revised['parts']> {
  const none = { late_posts: 0, account: 0, program: 0, later_posts: 0 }
  if (levels === null) return { ...none, late_posts: null, [accountChanged ? 'account' : programChanged ? 'program' : 'later_posts']: moved }
  const [late, later] = [levels.completed - levels.then, levels.now - levels.completed]
  const rest = moved - late - later
  const parts = { ...none, late_posts: late, later_posts: later }
  const takes = accountChanged ? 'account' : programChanged ? 'program' : 'later_posts'
  return { ...parts, [takes]: parts[takes] + rest }
}

function typicalOf(periods: readonly Revised[]): Revisions['typical'] {
  const standing = periods.filter(({ moved }) => moved !== null)
  if (standing.length === 0) return null
  const changes = standing.flatMap(({ moved_change: moved, change }) => (moved === null || change === null ? [] : [{ moved: Math.abs(moved), half: halfOf(change) }]))
  return {
    periods: standing.length, outside: standing.filter(({ outside }) => outside).length,
    level: median(standing.map(({ moved }) => Math.abs(moved ?? 0))), half_width: median(standing.map(({ level }) => halfOf(level))),
    change: changes.length === 0 ? null : median(changes.map(({ moved }) => moved)), change_half_width: changes.length === 0 ? null : median(changes.map(({ half }) => half)),
  }
}

function median(values: readonly number[]): number {
  return quantiles(values, [0.5])[0]
}

function halfOf({ low, high }: Estimate): number {
  return (high - low) / 2
}

/** Where what figures mean changed: between two sealed periods, and between the last of them and the present review. */
function breaksOf({ reviews }: Past, { definition, periods, reading, audited, ...present }: Present): Revisions['breaks'] {
  const latest = [...new Map(reviews.map((review) => [review.period, review])).values()].sort((a, b) => (a.period < b.period ? -1 : 1))
  const current = periods.at(-1)?.period ?? ''
  return latest.flatMap((review, i) => {
    const next = latest[i + 1]
    const [to, before] = next === undefined ? [definition, current] : [next.definition, next.period]
    const parts: readonly DefinitionPart[] = review.definition === null || to === null ? [] : definitionChanges(review.definition, to)
    if (parts.length === 0 || before === review.period) return []
    return [{ after: review.period, before, parts: [...parts], bridged: tablesByNow(review, { definition, periods, reading, audited, ...present }) !== null }]
  })
}
