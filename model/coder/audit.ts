import type { CellLabels, IntakeTables } from '../intake/intake-tables.ts'
import type { AuditCount } from '../inputs/small-inputs.ts'
import { confusionShares, rescoring } from '../statistics/misclassification.ts'

/** Codings in a venue under which its audit is refused (model.md 4). */
export const leastCodings = 50

/** Why a venue's scores are left as coded. */
export type AuditRefusal = 'too-few' | 'too-poor' | 'ranges' | 'ready-made' | 'no-audit'

/** What a coding audit says of one venue. */
export interface VenueAudit {
  /** Row-major of shape (labels x labels): rows true, columns coded. Zero where nothing was audited. */
  readonly counts: Float64Array
  readonly codings: number
  /** Share of the codings that agree; 0 of none. */
  readonly agreement: number
  readonly smallestSingularValue: number
  /** null: it is applied. */
  readonly refused: AuditRefusal | null
}

/** Labels of cells and, of every venue, what its audit says: everything the correction is made from. */
export interface CoderCorrection {
  readonly labels: CellLabels
  readonly venues: readonly VenueAudit[]
  /** Shape (venues) of (labels): the score of each coded label at the mean of the audit's posterior; null where scores stay as coded. */
  readonly weights: readonly (Float64Array | null)[]
}

/**
 * Read an audit against the labels of the cells.
 *
 * @returns null where cells have no labels at all
 */
export function readAudit(tables: IntakeTables, audit: readonly AuditCount[]): CoderCorrection | null {
  const { labels, factors } = tables
  if (labels === null) return null
  const labelled = factors[0].levels.map((_, v) => isLabelled(tables, labels, v))
  const venues = factors[0].levels.map(({ name }, v) => readVenue(labels, audit.filter(({ venue }) => venue === name), labelled[v]))
  return {
    labels, venues,
    weights: venues.map(({ counts, refused }) => (refused === null ? rescoring(posteriorMean(counts), labels.scores).weights : null)),
  }
}

function readVenue(labels: CellLabels, rows: readonly AuditCount[], labelled: boolean): VenueAudit {
  const k = labels.names.length
  const counts = new Float64Array(k * k)
  for (const { trueLabel, codedLabel, count } of rows) counts[labels.names.indexOf(trueLabel) * k + labels.names.indexOf(codedLabel)] += count
  const codings = counts.reduce((sum, count) => sum + count, 0)
  const agreed = labels.names.reduce((sum, _, l) => sum + counts[l * k + l], 0)
  const { weights, smallestSingularValue } = rescoring(posteriorMean(counts), labels.scores)
  const refused = !labelled ? 'ranges' : codings === 0 ? 'no-audit' : codings < leastCodings ? 'too-few' : weights === null ? 'too-poor' : null
  return { counts, codings, agreement: codings === 0 ? 0 : agreed / codings, smallestSingularValue, refused }
}

/** Mean of the Dirichlet posterior under a uniform prior. */
function posteriorMean(counts: Float64Array): Float64Array {
  return confusionShares(counts.map((count) => count + 1))
}

/** Whether every mention of a venue carries a label. */
function isLabelled({ cells }: IntakeTables, { counts, names }: CellLabels, venue: number): boolean {
  const k = names.length
  for (let c = 0; c < cells.count; c++) {
    if (cells.levels[0][c] !== venue) continue
    let sum = 0
    for (let l = 0; l < k; l++) sum += counts[c * k + l]
    if (sum !== cells.mentions[c]) return false
  }
  return true
}
