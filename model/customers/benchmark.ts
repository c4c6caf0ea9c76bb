import type { Estimate, Findings } from '../findings/schema.ts'
import type { BenchmarkMargin } from '../inputs/small-inputs.ts'
import type { SegmentTable } from '../intake/intake-tables.ts'
import { points } from '../reading/summarise.ts'
import { dissimilarityIndex } from '../statistics/dissimilarity.ts'
import { rake, type Raking } from '../statistics/raking.ts'
import { twoSidedQuantile } from '../statistics/wilson.ts'

type Benchmark = NonNullable<Findings['benchmark']>
type Margin = Benchmark['margins'][number]
type Level = Margin['levels'][number]

/** No author counts for more than five, or less than a fifth, of the usual one. */
const bounds = { lower: 0.2, upper: 5 } as const
const percent = 100
/** Percentage points below its share of the customers from which a level is named as heard too little: what whole percentages show. templates/sections/customers.md goes by the same. */
const shortFrom = 0.5
/** Levels that are named as the least heard. */
const mostNamed = 3

/** Authors by the levels of the benchmark's margins: the table that is weighted. */
export interface Heard {
  readonly margins: readonly BenchmarkMargin[]
  /** Shape (rows): of each margin the index of the level among the benchmark's; -1 where it is none of them. */
  readonly levels: readonly (readonly number[])[]
  readonly authors: readonly number[]
  readonly sums: readonly number[]
  readonly squares: readonly number[]
}

/** The authors of the period by the benchmark's levels; values that it does not know count as not known. */
export function heardBy(segments: SegmentTable, margins: readonly BenchmarkMargin[]): Heard {
  const placed = margins.map(({ margin, levels }) => {
    const at = segments.margins.indexOf(margin)
    return { at, place: segments.levels[at].map((name) => levels.findIndex(({ level }) => level === name)) }
  })
  return {
    margins,
    levels: segments.rows.map((row) => placed.map(({ at, place }) => (row.levels[at] < 0 ? -1 : place[row.levels[at]]))),
    authors: segments.rows.map(({ authors }) => authors), sums: segments.rows.map(({ sum }) => sum), squares: segments.rows.map(({ squares }) => squares),
  }
}

/** Weights for the authors of whom every margin is known; null where there is none. */
export function rakeHeard({ margins, levels, authors }: Heard): Raking | null {
  const known = authors.map((count, i) => (levels[i].some((level) => level < 0) ? 0 : count))
  const counted = known.some((count) => count > 0)
  const columns = margins.map((_, m) => levels.map((row) => Math.max(0, row[m])))
  return counted ? rake({ levels: columns, counts: known }, margins.map((margin) => margin.levels.map(({ share }) => share)), bounds) : null
}

/** Whom the posts stand for: authors of the period beside customers, and what weighting them to the customers would do (model.md 6). */
export function readBenchmark(heard: Heard, interval: number, smallestGroup: number): Benchmark {
  const raking = rakeHeard(heard)
  const all = heard.authors.reduce((sum, count) => sum + count, 0)
  const sum = heard.sums.reduce((total, value) => total + value, 0)
  return {
    margins: heard.margins.map((margin, m) => readMargin(heard, margin, m, smallestGroup)),
    raking: raking === null ? null : tellRaking(raking),
    unreachable: heard.margins.flatMap(({ margin, levels }, m) => levels.flatMap(({ level, share }, l) => (share > 0 && authorsAt(heard, m, l) === 0 ? [{ margin, level, customers: share }] : []))),
    as_heard: all < smallestGroup ? null : points * sum / all,
    weighted: raking === null || all < smallestGroup ? null : weightedMean(raking, heard, interval),
  }
}

function authorsAt({ levels, authors }: Heard, margin: number, level: number): number {
  return authors.reduce((sum, count, i) => sum + (levels[i][margin] === level ? count : 0), 0)
}

function readMargin(heard: Heard, { margin, levels }: BenchmarkMargin, m: number, smallestGroup: number): Margin {
  const counts = levels.map((_, l) => authorsAt(heard, m, l))
  const known = counts.reduce((sum, count) => sum + count, 0)
  const shownOf = counts.map((count) => known >= smallestGroup && (count === 0 || count >= smallestGroup))
  // of a level that is not shown no number may give its size away: it is taken for unheard
  const told = counts.map((count, l) => (shownOf[l] ? count : 0))
  const jointly = neededJointly(told, levels.map(({ share }) => share))
  return {
    margin, authors: known, all_authors: heard.authors.reduce((sum, count) => sum + count, 0),
    dissimilarity: known < smallestGroup ? null : dissimilarityIndex(counts.map((count) => count / known), levels.map(({ share }) => share)),
    needed_jointly: jointly === null ? null : jointly.reduce((sum, count) => sum + count, 0),
    levels: planned(levels.map(({ level, share }, l) => {
      const shown = shownOf[l]
      return {
        level, customers: share, heard: shown ? counts[l] / known : null, authors: shown ? counts[l] : null,
        gap: shown ? percent * (counts[l] / known - share) : null,
        shortfall: known < smallestGroup ? null : percent * Math.max(0, share - told[l] / known),
        needed: neededAt(told[l], known, share), needed_jointly: jointly === null ? null : jointly[l],
      }
    })),
  }
}

/** The levels with the authors to plan for: where several are heard too little, more are asked of all of them, and each then needs more than it would alone. */
function planned(levels: readonly Omit<Level, 'planned'>[]): Level[] {
  const several = levels.filter(isShort).length > 1
  return levels.map((level) => ({ ...level, planned: several ? level.needed_jointly ?? level.needed : level.needed }))
}

function isShort({ shortfall }: Pick<Level, 'shortfall'>): boolean {
  return shortfall !== null && shortfall >= shortFrom
}

/** The levels, over all margins, that are named as the least heard for their share of the customers: three at most. */
export function leastHeard({ margins }: Pick<Benchmark, 'margins'>): ReadonlySet<Level> {
  const short = margins.flatMap(({ levels }) => levels.filter(isShort))
  return new Set(short.sort((a, b) => (b.shortfall ?? 0) - (a.shortfall ?? 0)).slice(0, mostNamed))
}

/** Authors of a level besides, for its share to be that of customers: (a + x) / (n + x) = share. */
export function neededAt(authors: number, known: number, share: number): number {
  return share >= 1 ? 0 : Math.max(0, Math.ceil((share * known - authors) / (1 - share)))
}

/**
 * Authors of each level besides, the fewest with which no level's share stays below that of customers. Shares that sum to 1 can't all be reached from below unless
 * each is met, so the authors in all must be as many as the most over-heard level's are at its share, max(a / share), and each level fills up to share times that.
 *
 * @param authors - shape (levels), heard now
 * @param shares - shape (levels), of customers, summing to 1
 * @returns shape (levels), rounded up; null where authors were heard of a level that no customer belongs to
 */
export function neededJointly(authors: readonly number[], shares: readonly number[]): readonly number[] | null {
  if (authors.some((count, l) => count > 0 && !(shares[l] > 0))) return null
  const all = Math.max(0, ...authors.map((count, l) => (count > 0 ? count / shares[l] : 0)))
  const rounding = 1e-9 * Math.max(1, all) // a level that is filled already must not need one author more for a last bit
  return authors.map((count, l) => Math.max(0, Math.ceil(shares[l] * all - count - rounding)))
}

function tellRaking({ converged, cycles, lowest, highest, bounded, size, effectiveSize }: Raking): Benchmark['raking'] {
  return { converged, cycles, lowest, highest, bounded, design_effect: Math.max(1, size / effectiveSize), authors: size, effective_authors: effectiveSize }
}

/** Weighted mean over authors of their mean scores, in points; its standard error by linearisation, authors independent. */
function weightedMean({ weights }: Raking, { authors, sums, squares }: Heard, interval: number): Estimate {
  let [total, sum] = [0, 0]
  weights.forEach((weight, i) => {
    total += weight * authors[i]
    sum += weight * sums[i]
  })
  const mean = sum / total
  let variance = 0
  weights.forEach((weight, i) => { variance += weight * weight * (squares[i] - 2 * mean * sums[i] + mean * mean * authors[i]) })
  const sd = points * Math.sqrt(Math.max(0, variance)) / total
  const reach = twoSidedQuantile(interval) * sd
  return { mean: points * mean, low: points * mean - reach, high: points * mean + reach, sd }
}
