import type { AuthorCounts, AuthorVariation, CellColumns, ConcentrationRow, Factor, Hindsight, Timeline } from '../../model/intake/intake-tables.ts'
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
  const [byStep, byPeriod, byPeriodLevel] = [counts.byStep.slice(), counts.byPeriod.slice(), counts.byPeriodLevel.map((column) => column.slice())]
  for (const row of authors.byStep) byStep[indices.step(row.step)]! += row.authors
  for (const row of authors.byPeriodLevel) {
    const period = indices.period(row.period)
    // An author is one handle in one venue: summed over venues, nobody counts twice.
    if (row.factor === 0) byPeriod[period]! += row.authors
    byPeriodLevel[row.factor]![period * factors[row.factor]!.levels.length + indices.level(row.factor, row.level)]! += row.authors
  }
  return { exact, byStep, byStepVenue: counts.byStepVenue, byPeriod, byPeriodLevel }
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
