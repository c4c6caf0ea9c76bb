import type { Estimate, Findings } from '../findings/schema.ts'
import type { Posterior } from '../fit/posterior.ts'
import type { Reading } from '../reading/context.ts'
import { inPoints, points } from '../reading/summarise.ts'
import { estimateOf } from '../statistics/estimate.ts'
import { twoSidedQuantile } from '../statistics/wilson.ts'
import { expectedSd, layOut, nextChange, nextLevel, type Expectation } from './expected-precision.ts'
import { expectNextPeriod, hearBesides, type ExpectedCells } from './next-period.ts'

type Hearing = NonNullable<Findings['hearing']>

/** Standard deviations, drawn from their posterior, over which a gain is averaged. */
const sigmaDraws = 12
/** Authors heard besides, for the picture. */
const curveAt = [25, 50, 100, 200, 400, 800] as const
/** A piece of advice seeks a fall by this part of the standard deviation, or most of what can be had at all. */
const soughtFall = 0.1
const mostOfAll = 0.8
/** Nobody is asked to hear more than as many again as there are, within these bounds. */
const mostAuthors = { least: 50, most: 2000 } as const
/** Falls by less than this part are not told at all, not even as hardly helping. */
const leastFall = 0.02

/** What hearing more authors somewhere would do. */
export interface Gain {
  readonly authors: number
  /** Fall of the posterior standard deviation, in points. */
  readonly fall: Estimate
  /** Width of the interval as things are, and with them, in points. */
  readonly widthBefore: number
  readonly widthAfter: number
}

/** Which function of the states is to become surer. */
type Target = (expectation: Expectation, expected: ExpectedCells) => Float64Array

/** Everything that gains are worked out from. */
export interface Outlook {
  readonly reading: Reading
  readonly interval: number
  /** Shape (draws) of (scales). */
  readonly sigmas: readonly Float64Array[]
}

export function createOutlook(reading: Reading, interval: number): Outlook {
  return { reading, interval, sigmas: pickSigmas(reading.posterior) }
}

function pickSigmas({ draws, problem }: Posterior): readonly Float64Array[] {
  const d = problem.scales.length
  return Array.from({ length: sigmaDraws }, (_, i) => {
    const row = Math.floor((i + 0.5) * draws.count / sigmaDraws)
    return draws.sigmas.slice(row * d, (row + 1) * d)
  })
}

/** The posterior sd of the target, given each draw of the standard deviations: as many heard as now and `authors` besides; shape (draws), on the score's scale. */
function sdsWith({ reading: { tables, sampling, periodSteps }, sigmas }: Outlook, target: Target, factor: number, level: number, authors: number): Float64Array {
  const besides = authors === 0 ? [] : hearBesides(tables, periodSteps, factor, level, authors)
  const expected = expectNextPeriod(tables, sampling, periodSteps, besides)
  const expectation = layOut(expected)
  const of = target(expectation, expected)
  return Float64Array.from(sigmas, (sigma) => expectedSd(expectation, sigma, of))
}

const mean = (values: Float64Array) => values.reduce((sum, value) => sum + value, 0) / values.length

/**
 * How many authors of one level to hear, and what that would gain: the fewest that bring the standard deviation down by a tenth, or by most of what
 * hearing as many again would. Halving intervals on the number of authors, in which the sd falls.
 *
 * @param heard - authors of the level in the period under review
 * @returns null where even that would gain next to nothing
 */
export function gainOf(outlook: Outlook, target: Target, factor: number, level: number, heard: number): Gain | null {
  const again = Math.max(mostAuthors.least, Math.min(mostAuthors.most, heard))
  const before = sdsWith(outlook, target, factor, level, 0)
  const most = mean(before) - mean(sdsWith(outlook, target, factor, level, again))
  if (most < leastFall * mean(before)) return null
  const sought = Math.min(soughtFall * mean(before), mostOfAll * most)
  let [low, high] = [0, again]
  while (high - low > Math.max(5, 0.05 * high)) {
    const middle = (low + high) / 2
    if (mean(before) - mean(sdsWith(outlook, target, factor, level, middle)) >= sought) high = middle
    else low = middle
  }
  const authors = roundUp(high)
  const after = sdsWith(outlook, target, factor, level, authors)
  const width = 2 * twoSidedQuantile(outlook.interval) * points
  return {
    authors, widthBefore: width * mean(before), widthAfter: width * mean(after),
    fall: inPoints(estimateOf(before.map((sd, i) => sd - after[i]), outlook.interval)),
  }
}

/** To tens below a hundred, to twenty-fives below five hundred, to hundreds above. */
function roundUp(authors: number): number {
  const unit = authors < 100 ? 10 : authors < 500 ? 25 : 100
  return unit * Math.ceil(authors / unit)
}

/** Opinion's change into the next period. */
export const ofNextChange: Target = nextChange

/** Mix-adjusted opinion of the next period, its topics at other shares than the target mix's. */
export function ofLevelAt(reading: Reading, topicShares: Float64Array): Target {
  const topic = reading.tables.factors.findIndex(({ name }) => name === 'topic')
  const shares = reading.mix.shares.map((own, f) => (f === topic ? topicShares : own))
  return (expectation, expected) => nextLevel(expectation, expected, shares)
}

/** Width of the interval of opinion's next change against authors heard besides, venue by venue. */
export function readHearing(outlook: Outlook): Hearing {
  const width = 2 * twoSidedQuantile(outlook.interval) * points
  const now = width * mean(sdsWith(outlook, ofNextChange, 0, 0, 0))
  return {
    width: now,
    venues: outlook.reading.tables.factors[0].levels.map(({ name, label, costPerAuthor }, v) => ({
      venue: name, label, cost_per_author: costPerAuthor ?? 1, cost_given: costPerAuthor !== undefined,
      curve: [{ authors: 0, width: now }, ...curveAt.map((authors) => ({ authors, width: width * mean(sdsWith(outlook, ofNextChange, 0, v, authors)) }))],
    })),
  }
}
