import type { Estimate } from '../findings/schema.ts'
import { estimateOf } from '../statistics/estimate.ts'

/** Points per unit of score. */
export const points = 100

/** Turns draws on the score's scale into an estimate in points, and counts the draws above or below zero. */
export interface Summariser {
  estimate(column: Float64Array): Estimate
  probabilityAbove(column: Float64Array): number
}

/** @param interval - probability inside the interval, e.g. 0.9 */
export function createSummariser(interval: number, draws: number): Summariser {
  const scratch = new Float64Array(draws)
  return {
    estimate: (column) => inPoints(estimateOf(column, interval, scratch)),
    probabilityAbove: (column) => {
      let above = 0
      for (const x of column) if (x > 0) above += 1
      return above / column.length
    },
  }
}

/** An estimate on the score's scale, in points. */
export function inPoints({ mean, low, high, sd }: Estimate): Estimate {
  return { mean: mean * points, low: low * points, high: high * points, sd: sd * points }
}

/** A plain figure on the score's scale, in points; null stays null. */
export function scaled(score: number | null): number | null {
  return score === null ? null : score * points
}
