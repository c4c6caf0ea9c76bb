import type { CoderCorrection, VenueAudit } from '../coder/audit.ts'
import { correctionOf, labelSums } from '../coder/rescore.ts'
import type { Findings } from '../findings/schema.ts'
import { createGenerator } from '../random/generator.ts'
import { drawConfusion, rescoring } from '../statistics/misclassification.ts'
import { standardDeviation } from '../statistics/moments.ts'
import { twoSidedQuantile } from '../statistics/wilson.ts'
import type { Reading } from './context.ts'
import { movementOf } from './movement.ts'
import { points } from './summarise.ts'

type Coder = Findings['coder']

/**
 * What correcting the coder does to the mean score of a period, by draw, on the score's scale.
 *
 * @param venue - of one venue's mentions only; all if absent
 * @returns null where nothing is corrected, or nobody posted
 */
export function periodCorrection({ tables, posterior: { problem: { coder }, weights } }: Reading, period: number, venue?: number): Float64Array | null {
  const { cells, timeline } = tables
  const holds = (c: number) => timeline.periodOf[cells.step[c]] === period && (venue === undefined || cells.levels[0][c] === venue)
  if (coder === null || weights === null) return null
  const sums = labelSums(tables, coder, holds)
  let mentions = 0
  for (let c = 0; c < cells.count; c++) if (holds(c)) mentions += cells.mentions[c]
  return mentions === 0 ? null : Float64Array.from(weights, (own) => correctionOf(coder, own, sums, mentions))
}

/**
 * What a coding audit says, and what it does.
 *
 * @param audited - null where the account gives none, or cells have no labels
 * @param given - whether the account gives one
 * @param labels - scores of the labels, where mentions are scored by labels
 */
export function readCoder(reading: Reading, audited: CoderCorrection | null, given: boolean, labels: readonly number[] | null, interval: number): Coder {
  const { tables, summary } = reading
  const { factors, timeline, noLabels } = tables
  if (!given) return { status: 'absent', reason: null, venues: [], correction: null, movement: null, audit_size: labels === null ? null : auditSize(labels, factors[0].levels.length, interval) }
  if (audited === null) return { status: 'refused', reason: noLabels ?? 'ranges', venues: [], correction: null, movement: null, audit_size: null }
  const applied = audited.venues.some(({ refused }) => refused === null)
  const correction = periodCorrection(reading, timeline.current)
  const estimate = correction === null ? null : summary.estimate(correction)
  return {
    status: applied ? 'applied' : 'refused', reason: applied ? null : gravest(audited.venues),
    venues: factors[0].levels.map(({ name, label }, v) => {
      const own = audited.venues[v]
      const column = own.refused === null ? periodCorrection(reading, timeline.current, v) : null
      return {
        venue: name, label, codings: own.codings, agreement: own.agreement, smallest_singular_value: own.smallestSingularValue,
        refused: own.refused, correction: column === null ? null : summary.estimate(column),
      }
    }),
    correction: estimate, movement: estimate === null ? null : movementOf(estimate), audit_size: null,
  }
}

/** Of several reasons the one that more coding would mend. */
function gravest(venues: readonly VenueAudit[]): Coder['reason'] {
  const reasons = venues.map(({ refused }) => refused)
  return (['too-few', 'too-poor', 'ranges'] as const).find((reason) => reasons.includes(reason)) ?? 'too-few'
}

/** A coder that is right as often as this is supposed where none was audited; common practice, no source. */
const supposedAccuracy = 0.85
/** Width of the audit's own part of a level's interval that is sought, in points. */
const soughtWidth = 5
const replicates = 400
const triedCodings = 100
const leastPerVenue = 50

/**
 * Codings a venue that bring the audit's own part of a level's interval to five points: at a hundred codings a venue by simulation, and from there by the root
 * of their number. The labels are supposed to be equally frequent, errors to be spread evenly, venues to be equally large.
 */
function auditSize(scores: readonly number[], venues: number, interval: number): NonNullable<Coder['audit_size']> {
  const k = scores.length
  const matrix = Float64Array.from({ length: k * k }, (_, i) => (Math.floor(i / k) === i % k ? supposedAccuracy : (1 - supposedAccuracy) / (k - 1)))
  const counts = matrix.map((share) => share * triedCodings / k)
  const generator = createGenerator(0, 0)
  const means = Float64Array.from({ length: replicates }, () => (rescoring(drawConfusion(counts, generator), Float64Array.from(scores), 0).weights ?? Float64Array.from(scores)).reduce((sum, weight) => sum + weight / k, 0))
  const width = 2 * twoSidedQuantile(interval) * points * standardDeviation(means) / Math.sqrt(venues)
  const each = Math.max(leastPerVenue, 10 * Math.ceil(triedCodings * (width / soughtWidth) ** 2 / 10))
  return { width: soughtWidth, accuracy: supposedAccuracy, codings_per_venue: each, codings: each * venues }
}
