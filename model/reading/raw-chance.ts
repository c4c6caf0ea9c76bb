import { samplingVariance } from '../cells/sampling-variance.ts'
import { points } from './summarise.ts'
import type { Reading } from './context.ts'

/**
 * Standard error of the change of the raw average by sampling alone, in points: how far the change would move if as many others had posted in the very
 * same cells. With w_c the share of a period's mentions in cell c and V_c the sampling variance of the cell's mean (model.md 1.1; Kish 1965),
 *
 *   chance_sd = 100 sqrt( sum over both periods of w_c^2 V_c )
 *
 * of scores as coded, as the raw average is. Two things are left out, so that it is a lower bound: who happened to post where (told by the parts of the
 * mix), and one author's mentions in several cells.
 *
 * @returns at or above 0; null where one of the two periods holds no mention, or there is none before
 */
export function rawChangeChance({ tables, fitted, sampling, previousSteps }: Reading): number | null {
  const { cells, timeline } = tables
  if (previousSteps === null) return null
  const { variance } = fitted === tables ? sampling : samplingVariance(tables)
  let total = 0
  for (const period of [timeline.current - 1, timeline.current]) {
    let mentions = 0
    let squares = 0
    for (let c = 0; c < cells.count; c++) {
      if (timeline.periodOf[cells.step[c]] !== period) continue
      mentions += cells.mentions[c]
      squares += cells.mentions[c] ** 2 * variance[c]
    }
    if (mentions === 0) return null
    total += squares / mentions ** 2
  }
  return points * Math.sqrt(total)
}
