import { localExecutor, type FitExecutor } from '../../model/fit/executor.ts'
import type { FitProblem } from '../../model/fit/problem.ts'
import type { FitWork } from './fit-worker.ts'
import { startThread, type Thread } from './thread.ts'

/** Batches of fewer rows than this are not worth sending: the search for the mode asks for a few rows at a time. */
const leastRows = 64

export interface FitThreads {
  readonly executor: FitExecutor
  close(): Promise<void>
}

type FitThread = Thread<FitWork, Float64Array>

/**
 * The fit's heavy work on several threads. Every row is computed alike wherever it is computed, so that results do not
 * depend on how many there are.
 *
 * @param threads - at least 1; 1 means this thread, and no other is started
 */
export function startFitThreads(problem: FitProblem, threads: number): FitThreads {
  const local = localExecutor(problem)
  if (threads <= 1) return { executor: local, close: () => Promise.resolve() }
  const workers = Array.from({ length: threads }, (): FitThread => startThread('fit-worker', problem))
  const scales = problem.scales.length
  const share = async (sigmas: Float64Array, workOn: (part: Float64Array<ArrayBuffer>, firstRow: number) => FitWork): Promise<Float64Array> => {
    const rows = sigmas.length / scales
    const each = Math.ceil(rows / workers.length)
    const parts = await Promise.all(workers.map((worker, i) => {
      const from = Math.min(rows, i * each)
      const part = new Float64Array(sigmas.subarray(from * scales, Math.min(rows, from + each) * scales))
      return part.length === 0 ? new Float64Array(0) : worker.ask(workOn(part, from), [part.buffer])
    }))
    return join(parts)
  }
  return {
    executor: {
      evidence: (sigmas) => (sigmas.length < leastRows * scales ? local.evidence(sigmas) : share(sigmas, (part) => ({ kind: 'evidence', sigmas: part }))),
      states: (sigmas, seed, firstStream) => share(sigmas, (part, firstRow) => ({ kind: 'states', sigmas: part, seed, firstStream: firstStream + firstRow })),
    },
    close: async () => { await Promise.all(workers.map((worker) => worker.close())) },
  }
}

function join(parts: readonly Float64Array[]): Float64Array {
  const out = new Float64Array(parts.reduce((total, part) => total + part.length, 0))
  let at = 0
  for (const part of parts) {
    out.set(part, at)
    at += part.length
  }
  return out
}
