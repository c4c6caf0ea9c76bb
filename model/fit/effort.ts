import type { FitProblem } from './problem.ts'
import { stateWidth } from './states.ts'

export interface Effort {
  readonly proposals: number
  readonly draws: number
}

/** Multiplications and additions that about fill the time a reader waits for a small fit. */
const budget = 8e8
const proposals = { least: 2500, most: 16000 } as const
const draws = { least: 2000, most: 4000 } as const
/** Numbers that all draws of the states may take together: 256 MB. */
const memory = 32e6

/** How many draws a fit makes: more where they are cheap. Depends on the sizes of the problem alone. */
export function effortFor(problem: FitProblem): Effort {
  const b = 1 + problem.walks
  const s = problem.border
  const each = problem.steps * (b + s) * (b + s) * b + 12 * problem.cells.count
  const within = (count: number, { least, most }: { readonly least: number; readonly most: number }) => Math.max(least, Math.min(most, 500 * Math.round(count / 500)))
  const affordable = within(budget / each, proposals)
  const fits = Math.floor(memory / stateWidth(problem))
  return { proposals: affordable, draws: Math.max(1000, Math.min(fits, within(affordable / 2, draws))) }
}
