import { Worker } from 'node:worker_threads'
import { localExecutor, type FitExecutor } from '../../model/fit/executor.ts'
import type { FitProblem } from '../../model/fit/problem.ts'
import type { FitAnswer, FitRequest } from './fit-worker.ts'

/** Batches of fewer rows than this are not worth sending: the search for the mode asks for a few rows at a time. */
const leastRows = 64

export interface FitThreads {
  readonly executor: FitExecutor
  close(): Promise<void>
}

/**
 * The fit's heavy work on several threads. Every row is computed alike wherever it is computed, so that results do not
 * depend on how many there are.
 *
 * @param threads - at least 1; 1 means this thread, and no other is started
 */
export function startFitThreads(problem: FitProblem, threads: number): FitThreads {
  const local = localExecutor(problem)
  if (threads <= 1) return { executor: local, close: () => Promise.resolve() }
  const workers = Array.from({ length: threads }, () => startWorker(problem))
  const scales = problem.scales.length
  const share = async (sigmas: Float64Array, ask: (worker: FitThread, part: Float64Array<ArrayBuffer>, firstRow: number) => Promise<Float64Array>): Promise<Float64Array> => {
    const rows = sigmas.length / scales
    const each = Math.ceil(rows / workers.length)
    const parts = await Promise.all(workers.map((worker, i) => {
      const from = Math.min(rows, i * each)
      const part = new Float64Array(sigmas.subarray(from * scales, Math.min(rows, from + each) * scales))
      return part.length === 0 ? new Float64Array(0) : ask(worker, part, from)
    }))
    return join(parts)
  }
  return {
    executor: {
      evidence: (sigmas) => (sigmas.length < leastRows * scales ? local.evidence(sigmas)
        : share(sigmas, (worker, part) => worker.ask({ kind: 'evidence', sigmas: part }))),
      states: (sigmas, seed, firstStream) => share(sigmas, (worker, part, firstRow) =>
        worker.ask({ kind: 'states', sigmas: part, seed, firstStream: firstStream + firstRow })),
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

type Unnumbered<T> = T extends unknown ? Omit<T, 'id'> : never

interface FitThread {
  ask(request: Unnumbered<FitRequest>): Promise<Float64Array>
  close(): Promise<void>
}

function startWorker(problem: FitProblem): FitThread {
  const worker = openWorker(problem)
  const waiting = new Map<number, { resolve: (rows: Float64Array) => void; reject: (fault: Error) => void }>()
  let next = 0
  worker.on('message', ({ id, result }: FitAnswer) => {
    waiting.get(id)?.resolve(result)
    waiting.delete(id)
  })
  worker.on('error', (fault: Error) => {
    for (const { reject } of waiting.values()) reject(fault)
    waiting.clear()
  })
  return {
    ask: (request) => new Promise((resolve, reject) => {
      const id = next++
      waiting.set(id, { resolve, reject })
      const numbered: FitRequest = { ...request, id }
      worker.postMessage(numbered, [numbered.sigmas.buffer])
    }),
    close: async () => { await worker.terminate() },
  }
}

/** A thread started from TypeScript source does not inherit the loader that runs it: it registers the loader first. */
function openWorker(problem: FitProblem): Worker {
  if (!import.meta.url.endsWith('.ts')) return new Worker(new URL('./fit-worker.js', import.meta.url), { workerData: problem })
  const source = JSON.stringify(new URL('./fit-worker.ts', import.meta.url).href)
  return new Worker(`import('tsx/esm/api').then(({ register }) => { register(); return import(${source}) })`, { eval: true, workerData: problem })
}
