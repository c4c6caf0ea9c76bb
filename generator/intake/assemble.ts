import type { AuthorCounts, AuthorVariation, CellColumns, ConcentrationRow, ExtremeRow, Factor, Hindsight, PullRow, StayingRow, Timeline } from '../../model/intake/intake-tables.ts'
import { isoDate } from '../calendar/days.ts'
import type { GroupedMentions } from './read-mentions.ts'

/** From numbers inside the database to indices of the tables. */
export interface Indices {
  readonly step: (step: number) => number
  readonly period: (period: number) => number
  readonly level: (factor: number, level: number) => number
}

/** How a level, step or period that was grouped from mentions is found in the tables. */
export function indicesOf({ names }: GroupedMentions, axis: Timeline, factors: readonly Factor[]): Indices {
  const lookUp = (known: readonly string[], wanted: readonly string[]): readonly number[] => {
    const at = new Map(known.map((name, index) => [name, index]))
    return wanted.map((name) => at.get(name) ?? -1)
  }
  const steps = lookUp(axis.steps, names.steps.map(isoDate))
  const periods = lookUp(axis.periods.map((period) => period.name), names.periods)
  const levels = factors.map((factor, index) => lookUp(factor.levels.map((level) => level.name), names.levels[index]!))
  return { step: (step) => steps[step]!, period: (period) => periods[period]!, level: (factor, level) => levels[factor]![level]! }
}

/** Distinct authors of the mentions, added to those of ready-made cells if there are any. */
export function addAuthors(counts: AuthorCounts, { authors }: GroupedMentions, indices: Indices, factors: readonly Factor[], exact: boolean): AuthorCounts {
  const [byStep, byStepVenue, byPeriod, byPeriodLevel] = [counts.byStep.slice(), counts.byStepVenue.slice(), counts.byPeriod.slice(), counts.byPeriodLevel.map((column) => column.slice())]
  for (const row of authors.byStepVenue) {
    const step = indices.step(row.step)
    byStep[step]! += row.authors
    byStepVenue[step * factors[0]!.levels.length + indices.level(0, row.venue)]! += row.authors
  }
  for (const row of authors.byPeriodLevel) {
    const period = indices.period(row.period)
    // An author is one handle in one venue: summed over venues, nobody counts twice.
    if (row.factor === 0) byPeriod[period]! += row.authors
    byPeriodLevel[row.factor]![period * factors[row.factor]!.levels.length + indices.level(row.factor, row.level)]! += row.authors
  }
  return { exact, byStep, byStepVenue, byPeriod, byPeriodLevel }
}

/** The counts of counts by period: of every venue, and of all together as venue -1. */
export function concentrationRows({ authors }: GroupedMentions, indices: Indices): readonly ConcentrationRow[] {
  const together = new Map<string, ConcentrationRow>()
  const byVenue = authors.concentration.map((row): ConcentrationRow => ({ ...row, period: indices.period(row.period), venue: indices.level(0, row.venue) }))
  for (const row of byVenue) {
    const key = `${row.period} ${row.mentionsPerAuthor}`
    together.set(key, { ...row, venue: -1, authors: row.authors + (together.get(key)?.authors ?? 0) })
  }
  return [...together.values(), ...byVenue].sort((a, b) => a.period - b.period || a.venue - b.venue || a.mentionsPerAuthor - b.mentionsPerAuthor)
}

/** Authors by stance of every period up to the one under review; of that, who stayed is not known yet. */
export function stayingRows({ authors }: GroupedMentions, indices: Indices, { periods, review }: Timeline): readonly StayingRow[] {
  const rows = new Map<string, StayingRow>()
  for (const row of authors.staying) {
    const period = indices.period(row.period)
    if (periods[period]!.end > review.end) continue
    const key = `${period} ${row.stance}`
    const stayed = periods[period]!.name === review.name ? 0 : row.stayed
    rows.set(key, { period, stance: row.stance as StayingRow['stance'], authors: row.authors + (rows.get(key)?.authors ?? 0), stayed: stayed + (rows.get(key)?.stayed ?? 0) })
  }
  return [...rows.values()].sort((a, b) => a.period - b.period || a.stance - b.stance)
}

export function extremeRows({ extremes }: GroupedMentions, indices: Indices): readonly ExtremeRow[] {
  return extremes.map((row) => ({ ...row, period: indices.period(row.period), venue: indices.level(0, row.venue) })).sort((a, b) => a.period - b.period || a.venue - b.venue)
}

export function pullRows({ pull }: GroupedMentions, indices: Indices, factors: readonly Factor[]): readonly PullRow[] {
  const poster = factors.findIndex((factor) => factor.name === 'poster')
  return pull.map((row) => ({ ...row, venue: indices.level(0, row.venue), poster: row.poster < 0 ? -1 : indices.level(poster, row.poster) }))
    .sort((a, b) => a.venue - b.venue || a.poster - b.poster)
}

/** Author variation in the order of the venues. */
export function variationRows(variation: GroupedMentions['variation'], indices: Indices, venues: number): readonly (AuthorVariation | null)[] {
  const rows: (AuthorVariation | null)[] = Array.from({ length: venues }, () => null)
  for (const [venue, sums] of variation) rows[indices.level(0, venue)] = sums
  return rows
}

/** What was not known yet earlier, by indices of the tables; a step that no mention left in them is counted on from the last. */
export function hindsightOf({ hindsight }: GroupedMentions, indices: Indices, axis: Timeline, venues: number): Hindsight | null {
  if (hindsight === null) return null
  const stepAt = (step: number): number => {
    const found = indices.step(step)
    return found >= 0 ? found : axis.steps.length
  }
  return {
    before: stepAt(hindsight.before),
    variation: variationRows(hindsight.variation, indices, venues),
    settling: hindsight.settling.map(({ venue, from, to, settled }) => ({ venue: indices.level(0, venue), from: indices.step(from), to: indices.step(to), settled: stepAt(settled) })),
  }
}

/** Mentions with a known author by venue; a ready-made cell has one unless its poster class is `unknown`. */
export function authoredMentions(grouped: GroupedMentions | null, indices: Indices | null, ready: CellColumns, factors: readonly Factor[]): Float64Array {
  const counts = new Float64Array(factors[0]!.levels.length)
  const poster = factors.findIndex((factor) => factor.name === 'poster')
  for (let cell = 0; cell < ready.count; cell++) {
    const known = poster >= 0 && factors[poster]!.levels[ready.levels[poster]![cell]!]!.name !== 'unknown'
    if (known) counts[ready.levels[0]![cell]!]! += ready.mentions[cell]!
  }
  for (const row of grouped?.authors.withAuthor ?? []) counts[indices!.level(0, row.venue)]! += row.mentions
  return counts
}
