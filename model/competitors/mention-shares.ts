import type { Estimate, Findings } from '../findings/schema.ts'
import type { IntakeTables } from '../intake/intake-tables.ts'
import { difference } from '../reading/draw-columns.ts'
import { movementOf } from '../reading/movement.ts'
import type { Generator } from '../random/generator.ts'
import { estimateOf } from '../statistics/estimate.ts'
import { baseMentions, drawCount, venueCounts } from './venue-counts.ts'

type Competitors = NonNullable<Findings['competitors']>
type ShareOverTime = NonNullable<Competitors['own']['share']>
type ShareDifference = Competitors['brands'][number]['share_difference']

/** Shares of the mentions of all brands together, in percent. */
export interface MentionShares {
  /** Shape (brands): as counted, and at one mix of venues. */
  readonly raw: readonly (ShareOverTime | null)[]
  readonly equal: readonly (ShareOverTime | null)[]
  /** Shape (brands): the first brand's share less this one's; nothing for the first. */
  readonly differences: readonly ShareDifference[]
}

export const noDifference: ShareDifference = { raw: null, raw_movement: null, equal: null, equal_movement: null }

const percent = 100
const replicates = 4000

/**
 * Which part of the mentions of all brands is each brand's: as counted, and standardised directly to one mix of venues, so that a venue which grows for all
 * brands moves nothing: the sum over venues of weight x the brand's part of the venue's mentions. Only venues are held, not topics or poster classes. Venues
 * without a mention of any brand drop out, and the weights of the others are scaled up.
 *
 * Counts are no sample of anything. Their intervals say how far chance alone would move them if each author decided by himself to post or not (`drawCount`).
 * Brands, venues and periods are taken to be independent: authors who post again in the next period make the interval of a change too wide rather than too
 * narrow; one storm about two brands makes that of a difference too wide as well.
 *
 * @param brands - the account's own first; null where there is no mention of one
 * @param venues - names of the venues of any brand
 * @param weights - shape (venues), see `venueWeights`
 * @param interval - probability inside the intervals
 * @param generator - moved on
 */
export function readMentionShares(brands: readonly [IntakeTables, ...(IntakeTables | null)[]], venues: readonly string[], weights: Float64Array, interval: number, generator: Generator): MentionShares {
  const { current, periods } = brands[0].timeline
  const now = spanOf(brands, venues, periods[current].name, generator)
  const previous = current < 1 ? null : spanOf(brands, venues, periods[current - 1].name, generator)
  const base = brands.map((tables) => baseMentions(tables, venues))
  const equal: ShareOf = (counts, b) => standardised(counts, b, weights)
  const overTimes = (shareOf: ShareOf) => brands.map((_, b) => overTime(now, previous, base, shareOf, b, interval))
  return {
    raw: overTimes(pooled), equal: overTimes(equal),
    differences: brands.map((_, b) => {
      if (b === 0) return noDifference
      const [raw, even] = [pooled, equal].map((shareOf) => estimateIn(now, (counts) => shareOf(counts, 0) - shareOf(counts, b), interval))
      return { raw, raw_movement: raw && movementOf(raw), equal: even, equal_movement: even && movementOf(even) }
    }),
  }
}

/** Each venue's part of the mentions of all brands in the base; all 0 where that holds none. @returns shape (venues) */
export function venueWeights(brands: readonly (IntakeTables | null)[], venues: readonly string[]): Float64Array {
  const counts = brands.map((tables) => baseMentions(tables, venues))
  const byVenue = Float64Array.from(venues, (_, v) => counts.reduce((sum, of) => sum + of[v], 0))
  const all = byVenue.reduce((sum, n) => sum + n, 0)
  return all === 0 ? byVenue : byVenue.map((n) => n / all)
}

/** Shape (brands) of (venues). */
type Counts = readonly Float64Array[]

/** Counts of a period, and so many as chance may have made them. */
interface Span {
  readonly counts: Counts
  readonly drawn: readonly Counts[]
}

/** A brand's share, in [0, 1]; NaN where there is no mention of any brand. */
type ShareOf = (counts: Counts, brand: number) => number

function spanOf(brands: readonly (IntakeTables | null)[], venues: readonly string[], period: string, generator: Generator): Span {
  const counted = brands.map((tables) => venueCounts(tables, venues, period))
  return {
    counts: counted.map((of) => Float64Array.from(of, ({ mentions }) => mentions)),
    drawn: Array.from({ length: replicates }, () => counted.map((of) => Float64Array.from(of, (count) => drawCount(count, generator)))),
  }
}

/** The brand's part of all mentions, whatever the venue. */
function pooled(counts: Counts, brand: number): number {
  const totals = counts.map((venues) => venues.reduce((sum, n) => sum + n, 0))
  return totals[brand] / totals.reduce((sum, n) => sum + n, 0)
}

/** The brand's part of each venue's mentions, weighted. */
function standardised(counts: Counts, brand: number, weights: Float64Array): number {
  let [share, heard] = [0, 0]
  for (let v = 0; v < weights.length; v++) {
    let all = 0
    for (const venues of counts) all += venues[v]
    if (all === 0) continue
    share += weights[v] * counts[brand][v] / all
    heard += weights[v]
  }
  return share / heard
}

function overTime(now: Span, previous: Span | null, base: Counts, shareOf: ShareOf, b: number, interval: number): ShareOverTime | null {
  const of = (counts: Counts) => shareOf(counts, b)
  const current = estimateIn(now, of, interval)
  if (current === null) return null
  const before = previous && estimateIn(previous, of, interval)
  const change = previous && before && around(of(now.counts) - of(previous.counts), difference(drawsIn(now, of), drawsIn(previous, of)), interval)
  const inBase = of(base)
  return { now: current, previous: before, base: Number.isNaN(inBase) ? null : percent * inBase, change, movement: change && movementOf(change) }
}

/** null where there is no mention. */
function estimateIn(span: Span, of: (counts: Counts) => number, interval: number): Estimate | null {
  const counted = of(span.counts)
  return Number.isNaN(counted) ? null : around(counted, drawsIn(span, of), interval)
}

function drawsIn({ drawn }: Span, of: (counts: Counts) => number): Float64Array {
  return Float64Array.from(drawn, of)
}

/** What was counted, with the interval and standard deviation of the draws, in percent. */
function around(counted: number, drawn: Float64Array, interval: number): Estimate {
  const { low, high, sd } = estimateOf(drawn, interval)
  return { mean: percent * counted, low: percent * low, high: percent * high, sd: percent * sd }
}
