import type { IntakeTables } from '../intake/intake-tables.ts'
import { drawGamma } from '../random/gamma.ts'
import type { Generator } from '../random/generator.ts'

/** Mentions in one venue and period, and how they cluster in authors. */
export interface VenueCount {
  readonly mentions: number
  /** Kish's b = sum m_a^2 / sum m_a over the authors there, at least 1; a mention without an author is an author's only one. */
  readonly clustering: number
}

/**
 * Mentions of a brand in a period, venue by venue.
 *
 * @param tables - null where there is no mention of the brand
 * @param venues - names; of those that the tables lack there are none
 * @param period - its name; likewise
 * @returns shape (venues)
 */
export function venueCounts(tables: IntakeTables | null, venues: readonly string[], period: string): readonly VenueCount[] {
  const p = tables?.timeline.periods.findIndex(({ name }) => name === period) ?? -1
  if (tables === null || p < 0) return venues.map(() => ({ mentions: 0, clustering: 1 }))
  const mentions = mentionsWhere(tables, venues, (t) => tables.timeline.periodOf[t] === p)
  return venues.map((venue, i) => {
    const v = tables.factors[0].levels.findIndex(({ name }) => name === venue)
    // beyond what each mention counts by itself: n b = sum m_a^2 over known authors + the mentions of unknown ones
    const beyond = tables.concentration.filter((row) => row.period === p && row.venue === v).reduce((sum, row) => sum + row.authors * row.mentionsPerAuthor * (row.mentionsPerAuthor - 1), 0)
    return { mentions: mentions[i], clustering: mentions[i] === 0 ? 1 : 1 + beyond / mentions[i] }
  })
}

/** Mentions of a brand in the base. @returns shape (venues) */
export function baseMentions(tables: IntakeTables | null, venues: readonly string[]): Float64Array {
  return tables === null ? new Float64Array(venues.length) : mentionsWhere(tables, venues, (t) => tables.timeline.inBase[t] === 1)
}

function mentionsWhere({ cells, factors }: IntakeTables, venues: readonly string[], holds: (step: number) => boolean): Float64Array {
  const place = factors[0].levels.map(({ name }) => venues.indexOf(name))
  const sums = new Float64Array(venues.length)
  for (let c = 0; c < cells.count; c++) if (holds(cells.step[c])) sums[place[cells.levels[0][c]]] += cells.mentions[c]
  return sums
}

/**
 * A count as chance may have made it, if each author decided by himself to post or not: compound Poisson, of mean n and variance n b, drawn as a gamma of the same
 * mean and variance.
 */
export function drawCount({ mentions, clustering }: VenueCount, generator: Generator): number {
  return mentions === 0 ? 0 : clustering * drawGamma(mentions / clustering, generator)
}
