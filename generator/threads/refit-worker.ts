import { meanPath } from '../../model/fit/mean-path.ts'
import type { FitProblem } from '../../model/fit/problem.ts'
import { answerWith } from './answer.ts'

/** One fit of what was known before a wave. */
export interface RefitWork {
  readonly problem: FitProblem
  readonly seed: number
}

answerWith(async ({ problem, seed }: RefitWork) => new Float64Array(await meanPath(problem, seed)))
