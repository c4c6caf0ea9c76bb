import { dayNumber, isoDate } from '../../generator/calendar/days.ts'
import { periodHolding } from '../../generator/calendar/periods.ts'
import { timeline as timelineOf } from '../../generator/calendar/timeline.ts'
import type { AuditCount } from '../../model/inputs/small-inputs.ts'
import { createGenerator, type Generator } from '../../model/random/generator.ts'
import { analyseHere, noInputs } from '../support/analyse-reference.ts'
import { tablesOfCells } from '../support/simulated-tables.ts'

const steps = 17
const venues = 2
const mentionsPerCell = 60
const offsets = [-0.1, 0.1]

/** A coder: of posts that are truly of a label, the share that it calls each; rows true, per venue. */
export type Coder = readonly (readonly (readonly number[])[])[]

/** Kind in both venues, in one of them more. */
export const coders: Readonly<Record<2 | 3, Coder>> = {
  2: [[[0.75, 0.25], [0.05, 0.95]], [[0.85, 0.15], [0.05, 0.95]]],
  3: [[[0.7, 0.2, 0.1], [0.05, 0.75, 0.2], [0.02, 0.08, 0.9]], [[0.8, 0.15, 0.05], [0.05, 0.8, 0.15], [0.02, 0.08, 0.9]]],
}

export interface CoderRun {
  /** Whether the interval of mix-adjusted opinion in the period holds the truth. */
  readonly covered: boolean
  /** Estimate less truth, in points. */
  readonly error: number
  readonly status: string
}

/**
 * Posts whose true labels follow a walk of opinion, coded by a coder that errs, and an audit of some codings a venue.
 *
 * @param codings - audited a venue; 0: no audit
 * @param perfect - the coder does not err
 */
export async function runCoderScenario(labels: 2 | 3, codings: number, perfect: boolean, seed: number, run: number): Promise<CoderRun> {
  const generator = createGenerator(seed, run)
  const scores = labels === 2 ? [-1, 1] : [-1, 0, 1]
  const identity = scores.map((_, i) => scores.map((__, j) => (i === j ? 1 : 0)))
  const coder = perfect ? [identity, identity] : coders[labels]
  let mu = 0.1 * generator.normal()
  const truth: number[] = []
  const counts: number[] = []
  const cells = Array.from({ length: steps }, (_, step) => {
    mu += 0.03 * generator.normal()
    truth.push(mu)
    return Array.from({ length: venues }, (__, venue) => {
      const coded = new Array<number>(labels).fill(0)
      for (let i = 0; i < mentionsPerCell; i++) coded[pick(coder[venue][pick(sharesAt(mu + offsets[venue], labels), generator)], generator)]++
      counts.push(...coded)
      const mean = coded.reduce((sum, count, l) => sum + count * scores[l], 0) / mentionsPerCell
      return { step, levels: [venue, 0, 0], mentions: mentionsPerCell, mean, squares: coded.reduce((sum, count, l) => sum + count * (scores[l] - mean) ** 2, 0) }
    })
  }).flat()
  const first = dayNumber('2024-01-01')
  const lastDay = first + 7 * steps - 1
  const timeline = timelineOf({ grid: 'week', reporting: 'month', base: { from: '2024-01-01', to: isoDate(first + 55) }, firstDay: first, lastDay, review: periodHolding('month', lastDay - 3) })
  const plain = tablesOfCells({ steps, venues, topics: 1, posters: 1 }, timeline, cells as unknown as Parameters<typeof tablesOfCells>[2])
  const tables = { ...plain, labels: { names: scores.map(String), scores: Float64Array.from(scores), counts: Float64Array.from(counts) } }
  const audit = codings === 0 ? null : Array.from({ length: venues }, (_, venue) => auditOf(plain.factors[0].levels[venue].name, coder[venue], codings, scores, generator)).flat()
  const found = await analyseHere(tables, { seed: run }, { ...noInputs, audit })
  const inPeriod = truth.filter((_, t) => timeline.periodOf[t] === timeline.current)
  // venues post alike, so that offsets of -0.1 and 0.1 cancel at the target mix
  const level = 100 * inPeriod.reduce((sum, value) => sum + value, 0) / inPeriod.length
  const { mean, low, high } = found.opinion.period
  return { covered: low <= level && level <= high, error: mean - level, status: found.coder.status }
}

/** Shares of labels whose mean score is m. */
function sharesAt(m: number, labels: 2 | 3): readonly number[] {
  return labels === 2 ? [(1 - m) / 2, (1 + m) / 2] : [(0.7 - m) / 2, 0.3, (0.7 + m) / 2]
}

function pick(shares: readonly number[], generator: Generator): number {
  let left = generator.uniform()
  for (let i = 0; i < shares.length - 1; i++) {
    left -= shares[i]
    if (left < 0) return i
  }
  return shares.length - 1
}

/** Posts drawn at random and coded by hand. */
function auditOf(venue: string, confusion: readonly (readonly number[])[], codings: number, scores: readonly number[], generator: Generator): AuditCount[] {
  const shares = sharesAt(0, scores.length as 2 | 3)
  const table = scores.map(() => scores.map(() => 0))
  for (let i = 0; i < codings; i++) {
    const label = pick(shares, generator)
    table[label][pick(confusion[label], generator)]++
  }
  return table.flatMap((row, t) => row.map((count, c) => ({ venue, trueLabel: String(scores[t]), codedLabel: String(scores[c]), count })))
}
