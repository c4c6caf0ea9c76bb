import { workerData } from 'node:worker_threads'
import { evidenceRows, stateRows } from '../../model/fit/executor.ts'
import type { FitProblem } from '../../model/fit/problem.ts'
import { answerWith } from './answer.ts'

/** A batch of rows of one fit, whose problem the thread was started with. */
export type FitWork =
  | { readonly kind: 'evidence'; readonly sigmas: Float64Array<ArrayBuffer> }
  | { readonly kind: 'states'; readonly sigmas: Float64Array<ArrayBuffer>; readonly seed: number; readonly firstStream: number }

const problem = workerData as FitProblem

answerWith((work: FitWork) => Promise.resolve(new Float64Array(
  work.kind === 'evidence' ? evidenceRows(problem, work.sigmas) : stateRows(problem, work.sigmas, work.seed, work.firstStream),
)))
