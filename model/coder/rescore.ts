import type { CellColumns, IntakeTables } from '../intake/intake-tables.ts'
import type { Generator } from '../random/generator.ts'
import { drawConfusion, rescoring } from '../statistics/misclassification.ts'
import type { CoderCorrection } from './audit.ts'

/** Scores of the coded labels of every venue; null where they stay as coded. */
export type VenueWeights = readonly (Float64Array | null)[]

/** One draw of what the coder's errors may be, and so of what each coded label is worth. A venue whose draw can't be inverted keeps the weights of the mean. */
export function drawWeights({ labels, venues, weights }: CoderCorrection, generator: Generator): VenueWeights {
  return venues.map(({ counts }, v) => (weights[v] === null ? null : rescoring(drawConfusion(counts, generator), labels.scores, 0).weights ?? weights[v]))
}

/**
 * The mean of every cell with its coded labels at other scores; other cells as they are.
 *
 * @param target - shape (cells), overwritten
 */
export function fillMeans({ labels }: CoderCorrection, cells: Pick<CellColumns, 'count' | 'mean' | 'mentions' | 'levels'>, weights: VenueWeights, target: Float64Array): void {
  const k = labels.names.length
  const venueOf = cells.levels[0]
  for (let c = 0; c < cells.count; c++) {
    const own = weights[venueOf[c]]
    if (own === null) {
      target[c] = cells.mean[c]
      continue
    }
    let sum = 0
    for (let l = 0; l < k; l++) sum += own[l] * labels.counts[c * k + l]
    target[c] = sum / cells.mentions[c]
  }
}

/** The tables as the fit takes them: means and squares of the cells with the coder's errors undone at the mean of the audit's posterior. */
export function rescoredTables(tables: IntakeTables, correction: CoderCorrection): IntakeTables {
  const { cells } = tables
  const { labels, weights } = correction
  const k = labels.names.length
  const mean = new Float64Array(cells.count)
  fillMeans(correction, cells, weights, mean)
  const squares = cells.squares.map((as, c) => {
    const own = weights[cells.levels[0][c]]
    if (own === null) return as
    let sum = 0
    for (let l = 0; l < k; l++) sum += labels.counts[c * k + l] * (own[l] - mean[c]) ** 2
    return sum
  })
  return { ...tables, cells: { ...cells, mean, squares } }
}

/**
 * What correcting adds to the mean score of some mentions, given their labels.
 *
 * @param counts - shape (venues) of (labels): mentions
 * @param mentions - all of them, labelled or not
 */
export function correctionOf({ labels: { scores } }: CoderCorrection, weights: VenueWeights, counts: readonly Float64Array[], mentions: number): number {
  let sum = 0
  weights.forEach((own, v) => {
    if (own !== null) for (let l = 0; l < scores.length; l++) sum += (own[l] - scores[l]) * counts[v][l]
  })
  return sum / mentions
}

/** Labels of the mentions in some cells, by venue. */
export function labelSums(tables: IntakeTables, { labels }: CoderCorrection, holds: (cell: number) => boolean): readonly Float64Array[] {
  const k = labels.names.length
  const sums = tables.factors[0].levels.map(() => new Float64Array(k))
  for (let c = 0; c < tables.cells.count; c++) {
    if (!holds(c)) continue
    const own = sums[tables.cells.levels[0][c]]
    for (let l = 0; l < k; l++) own[l] += labels.counts[c * k + l]
  }
  return sums
}
