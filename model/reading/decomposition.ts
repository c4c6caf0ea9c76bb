import type { Findings } from '../findings/schema.ts'
import { midpointSplit } from '../statistics/kitagawa.ts'
import { twoSidedQuantile } from '../statistics/wilson.ts'
import { average, combine, difference, sum } from './draw-columns.ts'
import { periodCorrection } from './coder.ts'
import { stepsOfPeriod, type Reading } from './context.ts'
import { movementOf } from './movement.ts'
import { rawChangeChance } from './raw-chance.ts'
import { points } from './summarise.ts'

/**
 * What moved the raw average between the period before and the one under review, split exactly and additively in every
 * draw. With w_c the share of a period's mentions in cell c, raw = sum w_c y_c, and the model's
 * fitted value of a cell is mu[t] + alpha[v] + d[v,t] + kappa[k] + ...:
 *
 *   opinion       change of the plain mean of mu over the steps
 *   timing        change of (mu weighted by mentions less its plain mean): mentions crowding into better or worse steps
 *   venue_mix     shares of venues, at the mean of before and after of alpha[v] + d[v]   } midpoint rule (Kitagawa 1955)
 *   venue_drift   drift of venues, at the mean of the shares before and after            }
 *   FACTOR_mix    shares of topics, poster classes, further factors, at their offsets
 *   coding        what the coder's errors did to the raw average, where an audit undoes them
 *   unexplained   raw less fitted
 *
 * The largest part is what a reader is given as the reason. What the model does not explain is none where it lies within the sampling error of the raw
 * average, |unexplained| <= z chance_sd with z the normal deviate of the interval (`rawChangeChance`): few mentions differ from the model by that much anyhow.
 * A smaller part is no reason then either.
 *
 * @param interval - probability inside every interval
 * @returns null where there is no period before or one of the two holds no mention
 */
export function readDecomposition(reading: Reading, interval: number): Findings['decomposition'] {
  const parts = decompose(reading)
  const chance = rawChangeChance(reading)
  if (parts === null || chance === null) return null
  const { tables: { timeline }, summary } = reading
  const found = parts.columns.map(({ part, column, mix }) => {
    const estimate = summary.estimate(column)
    return { part, estimate, movement: movementOf(estimate), leading: mix === null ? null : leadingLevel(reading, mix, estimate.mean) }
  })
  const moved = found.filter(({ part, movement }) => part !== 'opinion' && movement !== 'not-established')
  const largest = moved.reduce<(typeof moved)[number] | null>((a, b) => (a === null || Math.abs(b.estimate.mean) > Math.abs(a.estimate.mean) ? b : a), null)
  const rawChange = points * parts.rawChange
  const reach = twoSidedQuantile(interval) * chance
  const isChance = largest?.part === 'unexplained' && Math.abs(largest.estimate.mean) <= reach
  return {
    from: timeline.periods[timeline.current - 1].name, to: timeline.review.name,
    raw_change: rawChange, chance_sd: chance, raw_movement: movementOf({ mean: rawChange, low: rawChange - reach, high: rawChange + reach, sd: chance }),
    parts: found, largest: isChance ? null : largest?.part ?? null,
  }
}

export interface Decomposition {
  /** On the score's scale. */
  readonly rawChange: number
  /** The parts, draw by draw; they sum to `rawChange` in each. */
  readonly columns: readonly DecompositionPart[]
}

/** Parts that are no factor's mix. */
export const otherParts = ['opinion', 'timing', 'venue_drift', 'coding', 'unexplained'] as const

export interface DecompositionPart {
  readonly part: (typeof otherParts)[number] | `${string}_mix`
  readonly column: Float64Array
  /** Of a mix: what its levels did; null for other parts. */
  readonly mix: MixChange | null
}

interface MixChange {
  readonly factor: number
  readonly before: Float64Array
  readonly after: Float64Array
  /** Rate of each level at the mean of before and after, by draw. */
  readonly rates: readonly Float64Array[]
}

/** The parts as draws; see `readDecomposition`. */
export function decompose(reading: Reading): Decomposition | null {
  const { tables: { timeline, factors }, columns: { count, offset }, previousSteps } = reading
  if (previousSteps === null) return null
  const before = pooled(reading, timeline.current - 1)
  const after = pooled(reading, timeline.current)
  if (before === null || after === null) return null

  const opinion = difference(after.opinion, before.opinion)
  const timing = difference(difference(after.movement, after.opinion), difference(before.movement, before.opinion))
  const venue = splitVenues(offset[0], before, after, count)
  const mixOf = (factor: number, rates: readonly Float64Array[]): MixChange => ({ factor, before: before.shares[factor], after: after.shares[factor], rates })
  const venueRates = offset[0].map((alpha, v) => sum(alpha, average([before.drift[v], after.drift[v]])))
  const others = factors.slice(1).map(({ name }, i): DecompositionPart => ({
    part: `${name}_mix`, mix: mixOf(i + 1, offset[i + 1]),
    column: combine(offset[i + 1], difference(after.shares[i + 1], before.shares[i + 1]), count),
  }))
  const explained: readonly DecompositionPart[] = [
    { part: 'opinion', column: opinion, mix: null }, { part: 'timing', column: timing, mix: null },
    { part: 'venue_mix', column: venue.mix, mix: mixOf(0, venueRates) }, { part: 'venue_drift', column: venue.drift, mix: null }, ...others,
  ]
  const rawChange = after.raw - before.raw
  const coding = codingChange(reading)
  const told: readonly DecompositionPart[] = coding === null ? explained : [...explained, { part: 'coding', column: coding, mix: null }]
  const fitted = told.reduce<Float64Array>((total, { column }) => sum(total, column), new Float64Array(count))
  return { rawChange, columns: [...told, { part: 'unexplained', column: fitted.map((x) => rawChange - x), mix: null }] }
}

/** Change of the raw average that correcting the coder takes away, by draw; null where nothing is corrected. */
function codingChange(reading: Reading): Float64Array | null {
  const { current } = reading.tables.timeline
  const [before, after] = [periodCorrection(reading, current - 1), periodCorrection(reading, current)]
  return before === null || after === null ? null : difference(before, after)
}

/**
 * The level that did most of a mix's part. Each level's own part is its change of share times its rate against the target mix;
 * changes of shares sum to 0, so that these add up to the part whatever the rates are told against.
 */
function leadingLevel({ tables, centre, summary }: Reading, { factor, before, after, rates }: MixChange, part: number) {
  const own = rates.map((rate, l) => summary.estimate(difference(rate, centre[factor]).map((x) => x * (after[l] - before[l]))))
  const leading = own.reduce((best, estimate, l) => (estimate.mean * Math.sign(part) > own[best].mean * Math.sign(part) ? l : best), 0)
  const { name, label } = tables.factors[factor].levels[leading]
  return { level: name, label, share_from: before[leading], share_to: after[leading], estimate: own[leading] }
}

/** One period's pooled average and what it is made of. */
interface Pooled {
  readonly raw: number
  /** Plain mean of mu over the steps, by draw. */
  readonly opinion: Float64Array
  /** Mean of mu weighted by mentions, by draw. */
  readonly movement: Float64Array
  /** Shares of mentions per level, per factor. */
  readonly shares: readonly Float64Array[]
  /** Mean of d[v,t] weighted by the venue's mentions (its plain mean where the venue has none), by venue and draw. */
  readonly drift: readonly Float64Array[]
}

function pooled(reading: Reading, period: number): Pooled | null {
  const { tables, columns } = reading
  const { cells, timeline, factors } = tables
  const steps = stepsOfPeriod(tables, period)
  const venues = factors[0].levels.length
  const perStep = new Float64Array(timeline.steps.length)
  const perVenueStep = Array.from({ length: venues }, () => new Float64Array(timeline.steps.length))
  const shares = factors.map(({ levels }) => new Float64Array(levels.length))
  let mentions = 0
  let total = 0
  for (let c = 0; c < cells.count; c++) {
    const t = cells.step[c]
    if (timeline.periodOf[t] !== period) continue
    const n = cells.mentions[c]
    mentions += n
    total += n * cells.mean[c]
    perStep[t] += n
    perVenueStep[cells.levels[0][c]][t] += n
    shares.forEach((share, f) => { share[cells.levels[f][c]] += n })
  }
  if (mentions === 0 || steps.length === 0) return null
  const drift = perVenueStep.map((weights, v) => {
    const inVenue = shares[0][v]
    const own = steps.map((t) => columns.drift[v][t])
    return inVenue === 0 ? average(own) : combine(own, steps.map((t) => weights[t] / inVenue), columns.count)
  })
  return {
    raw: total / mentions,
    opinion: average(steps.map((t) => columns.mu[t])),
    movement: combine(steps.map((t) => columns.mu[t]), steps.map((t) => perStep[t] / mentions), columns.count),
    shares: shares.map((share) => share.map((n) => n / mentions)),
    drift,
  }
}

/** Mix and drift of venues, split by the midpoint rule draw by draw. */
function splitVenues(alpha: readonly Float64Array[], before: Pooled, after: Pooled, count: number): { mix: Float64Array; drift: Float64Array } {
  const mix = new Float64Array(count)
  const drift = new Float64Array(count)
  for (let i = 0; i < count; i++) {
    const rates = (period: Pooled) => alpha.map((column, v) => column[i] + period.drift[v][i])
    const split = midpointSplit({ shares: before.shares[0], rates: rates(before) }, { shares: after.shares[0], rates: rates(after) })
    mix[i] = split.composition
    drift[i] = split.rate
  }
  return { mix, drift }
}
