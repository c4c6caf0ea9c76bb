import { buildProblem } from '../fit/build-problem.ts'
import { levelAt } from '../fit/level-at.ts'
import type { FitProblem } from '../fit/problem.ts'
import { conditionalCovariance, createStateWorkspace, stateWidth, type StateWorkspace } from '../fit/states.ts'
import type { FitTables } from '../intake/intake-tables.ts'
import type { ExpectedCells } from './next-period.ts'

/** A problem laid out once for a set of cells, whose precision can be asked again and again. */
export interface Expectation {
  readonly problem: FitProblem
  readonly work: StateWorkspace
}

export function layOut({ tables, variance }: ExpectedCells): Expectation {
  const withoutMeans: FitTables = { ...tables, variation: [] }
  const problem = buildProblem(withoutMeans, variance)
  return { problem, work: createStateWorkspace(problem) }
}

/** The change of opinion from the period under review to the next, as a function of the states: mu over its steps less mu over the others. */
export function nextChange({ problem }: Expectation, { nowSteps, nextSteps }: ExpectedCells): Float64Array {
  const weights = new Float64Array(stateWidth(problem))
  const block = 1 + problem.walks
  for (const t of nextSteps) weights[t * block] += 1 / nextSteps.length
  for (const t of nowSteps) weights[t * block] -= 1 / nowSteps.length
  return weights
}

/**
 * Mix-adjusted opinion of the next period, at given shares of every factor's levels, as a function of the states.
 *
 * @param shares - one array per factor, venue first
 */
export function nextLevel({ problem }: Expectation, { nextSteps, tables }: ExpectedCells, shares: readonly Float64Array[]): Float64Array {
  return levelAt(problem, tables.factors, nextSteps, shares)
}

/** Posterior standard deviation of a function of the states, given the standard deviations: from the precision alone, exactly. On the score's own scale. */
export function expectedSd({ problem, work }: Expectation, sigma: Float64Array, of: Float64Array): number {
  return Math.sqrt(conditionalCovariance(problem, sigma, [of], work)[0])
}
