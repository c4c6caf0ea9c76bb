import { Worker } from 'node:worker_threads'

/** What a thread is sent and what comes back: the work under a number, and its result under the same. */
export interface Numbered<T> {
  readonly id: number
  readonly work: T
}

export interface Answer<T> {
  readonly id: number
  readonly result: T
}

export interface Thread<Work, Result> {
  /** @param handed - buffers that the thread takes over instead of copying */
  ask(work: Work, handed?: readonly ArrayBuffer[]): Promise<Result>
  close(): Promise<void>
}

/**
 * Start a thread that runs a worker of this folder.
 *
 * @param name - of the file without its ending
 * @param data - what the worker finds as `workerData`
 */
export function startThread<Work, Result>(name: string, data?: unknown): Thread<Work, Result> {
  const worker = openWorker(name, data)
  const waiting = new Map<number, { resolve: (result: Result) => void; reject: (fault: Error) => void }>()
  let next = 0
  worker.on('message', ({ id, result }: Answer<Result>) => {
    waiting.get(id)?.resolve(result)
    waiting.delete(id)
  })
  worker.on('error', (fault: Error) => {
    for (const { reject } of waiting.values()) reject(fault)
    waiting.clear()
  })
  return {
    ask: (work, handed = []) => new Promise((resolve, reject) => {
      const id = next++
      waiting.set(id, { resolve, reject })
      const numbered: Numbered<Work> = { id, work }
      worker.postMessage(numbered, handed)
    }),
    close: async () => { await worker.terminate() },
  }
}

/** A thread started from TypeScript source does not inherit the loader that runs it: it registers the loader first. */
function openWorker(name: string, data: unknown): Worker {
  if (!import.meta.url.endsWith('.ts')) return new Worker(new URL(`./${name}.js`, import.meta.url), { workerData: data })
  const source = JSON.stringify(new URL(`./${name}.ts`, import.meta.url).href)
  return new Worker(`import('tsx/esm/api').then(({ register }) => { register(); return import(${source}) })`, { eval: true, workerData: data })
}
