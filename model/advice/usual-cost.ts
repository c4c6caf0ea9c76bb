import type { Reading } from '../reading/context.ts'

/** Of one more author wherever people post now: the venues' costs by their mentions in the period. */
export function usualCost({ tables: { factors, cells }, periodSteps }: Reading): { readonly each: number; readonly given: boolean } {
  const now = new Set(periodSteps)
  let [mentions, cost] = [0, 0]
  for (let c = 0; c < cells.count; c++) {
    if (!now.has(cells.step[c])) continue
    mentions += cells.mentions[c]
    cost += cells.mentions[c] * (factors[0].levels[cells.levels[0][c]].costPerAuthor ?? 1)
  }
  return { each: mentions > 0 ? cost / mentions : 1, given: factors[0].levels.some(({ costPerAuthor }) => costPerAuthor !== undefined) }
}
