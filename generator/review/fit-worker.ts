import { parentPort, workerData } from 'node:worker_threads'
import { evidenceRows, stateRows } from '../../model/fit/executor.ts'
import type { FitProblem } from '../../model/fit/problem.ts'

/** What a thread of the fit is asked; the answer is the array, under the same id. */
export type FitRequest =
  | { readonly id: number; readonly kind: 'evidence'; readonly sigmas: Float64Array<ArrayBuffer> }
  | { readonly id: number; readonly kind: 'states'; readonly sigmas: Float64Array<ArrayBuffer>; readonly seed: number; readonly firstStream: number }

export interface FitAnswer {
  readonly id: number
  readonly result: Float64Array<ArrayBuffer>
}

const port = parentPort
if (port === null) throw new Error('fit-worker runs as a worker thread')
const problem = workerData as FitProblem

port.on('message', (request: FitRequest) => {
  const rows = request.kind === 'evidence' ? evidenceRows(problem, request.sigmas) : stateRows(problem, request.sigmas, request.seed, request.firstStream)
  const answer: FitAnswer = { id: request.id, result: new Float64Array(rows) }
  port.postMessage(answer, [answer.result.buffer])
})
