import { heardBy, leastHeard, rakeHeard, type Heard } from '../customers/benchmark.ts'
import type { BenchmarkMargin } from '../inputs/small-inputs.ts'
import type { Reading } from '../reading/context.ts'
import { points } from '../reading/summarise.ts'
import { twoSidedQuantile } from '../statistics/wilson.ts'
import type { Grounds } from './read-advice.ts'
import { helpsBy, type RuledAdvice } from './ruled-advice.ts'
import { usualCost } from './usual-cost.ts'

/** Segments heard so much less than they are customers are worth asking for; as a share. */
const littleHeard = 0.03

/**
 * Which customers to hear: for every segment heard too little, the authors to plan for, and what they do to the standard error of the mean weighted to
 * customers, sd / sqrt(effective authors). To hear a segment that is among the least heard is worth it whatever they do to that: it is otherwise not heard.
 */
export function adviseSegments(reading: Reading, margins: readonly BenchmarkMargin[] | null, { benchmark, interval }: Grounds, smallestGroup: number): RuledAdvice[] {
  const { segments } = reading.tables
  if (segments === null || margins === null || benchmark === null) return []
  const heard = heardBy(segments, margins)
  const before = effectiveOf(heard)
  const sd = spreadOf(heard)
  const cost = usualCost(reading)
  const least = leastHeard(benchmark)
  return margins.flatMap(({ margin, levels }, m) => levels.flatMap(({ level, share }, l): RuledAdvice[] => {
    const counts = levels.map((_, of) => heard.authors.reduce((sum, count, i) => sum + (heard.levels[i][m] === of ? count : 0), 0))
    const known = counts.reduce((sum, count) => sum + count, 0)
    if (known === 0 || share - counts[l] / known < littleHeard) return []
    const told = benchmark.margins[m].levels[l]
    const authors = told.planned
    const after = effectiveOf(withMore(heard, m, l, authors))
    const fall = points * sd * (1 / Math.sqrt(Math.max(1, before)) - 1 / Math.sqrt(Math.max(1, after)))
    if (fall <= 0) return []
    const gainShare = 1 - Math.sqrt(Math.max(1, before) / Math.max(1, after))
    // a group too small to be shown is told as if it were as large as may be shown
    const shown = counts[l] < smallestGroup ? Math.min(smallestGroup, known) : counts[l]
    // of a standard deviation known from so many authors
    const spread = fall / Math.sqrt(2 * Math.max(1, known - 1))
    const reach = twoSidedQuantile(interval) * spread
    return [{
      code: 'hear-segment', where: level, where_kind: 'segment', how_many: authors, helps: least.has(told) ? 'clearly' : helpsBy(gainShare), gain_share: gainShare, gain: { mean: fall, low: fall - reach, high: fall + reach, sd: spread }, gain_of: 'customer-mean',
      cost: authors * cost.each, cost_given: cost.given, gain_per_cost: fall / (authors * cost.each),
      figures: { margin, segment: level, authors, alone: told.needed < authors ? told.needed : 0, heard: shown / known, customers: share, effective_before: Math.round(before), effective_after: Math.round(after), cost: authors * cost.each },
    }]
  }))
}

function effectiveOf(heard: Heard): number {
  return rakeHeard(heard)?.effectiveSize ?? 0
}

/** Standard deviation of the authors' mean scores. */
function spreadOf({ authors, sums, squares }: Heard): number {
  const total = (values: readonly number[]) => values.reduce((sum, value) => sum + value, 0)
  const [n, sum, square] = [total(authors), total(sums), total(squares)]
  return n < 2 ? 0 : Math.sqrt(Math.max(0, square - sum * sum / n) / (n - 1))
}

/** As many more authors of one level, spread over the other margins as those heard are (all heard, where none of the level is). */
function withMore(heard: Heard, margin: number, level: number, more: number): Heard {
  const whole = (i: number) => heard.levels[i].every((place, m) => m === margin || place >= 0)
  const own = heard.authors.map((count, i) => (heard.levels[i][margin] === level && whole(i) ? count : 0))
  const from = own.some((count) => count > 0) ? own : heard.authors.map((count, i) => (whole(i) ? count : 0))
  const total = from.reduce((sum, count) => sum + count, 0)
  const rows = from.flatMap((count, i) => (count > 0 ? [{ i, authors: more * count / total }] : []))
  return {
    ...heard,
    levels: [...heard.levels, ...rows.map(({ i }) => heard.levels[i].map((place, m) => (m === margin ? level : place)))],
    authors: [...heard.authors, ...rows.map(({ authors }) => authors)],
    sums: [...heard.sums, ...rows.map(() => 0)], squares: [...heard.squares, ...rows.map(() => 0)],
  }
}
