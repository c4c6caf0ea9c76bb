import type { Factor } from '../intake/intake-tables.ts'
import type { FitProblem } from './problem.ts'
import { stateWidth } from './states.ts'

/**
 * Mix-adjusted opinion, mean over some steps, as a function of the states: mu there and the offsets at given shares of every factor's levels.
 *
 * @param factors - of the problem, venue first
 * @param shares - one array per factor
 * @returns shape (stateWidth): its product with the states is the level
 */
export function levelAt(problem: FitProblem, factors: readonly Pick<Factor, 'name' | 'levels'>[], steps: readonly number[], shares: readonly Float64Array[]): Float64Array {
  const weights = new Float64Array(stateWidth(problem))
  const block = 1 + problem.walks
  const fixedFrom = problem.steps * block
  for (const t of steps) weights[t * block] += 1 / steps.length
  // a walking venue's offset is its walk's first step
  problem.venueWalk.forEach((w, v) => { if (w > 0) weights[w] += shares[0][v] })
  problem.venueFixed.forEach((column, v) => { if (column >= 0) weights[fixedFrom + column] += shares[0][v] })
  factors.slice(1).forEach(({ name, levels }, i) => {
    const group = problem.groups.find((candidate) => candidate.name === name)
    if (group !== undefined) levels.forEach((_, l) => { weights[fixedFrom + group.from + l] += shares[i + 1][l] })
  })
  return weights
}
