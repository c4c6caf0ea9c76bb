import { meanPath } from '../../model/fit/mean-path.ts'
import type { Refit } from '../../model/survey/rolling-forecast.ts'
import type { RefitWork } from './refit-worker.ts'
import { startThread, type Thread } from './thread.ts'

export interface RefitThreads {
  readonly refit: Refit
  close(): Promise<void>
}

/**
 * Whole fits on several threads, each begun when a thread is free; threads start when the first is asked for.
 *
 * @param threads - at least 1; 1 means this thread, and no other is started
 */
export function startRefitThreads(threads: number): RefitThreads {
  if (threads <= 1) return { refit: meanPath, close: () => Promise.resolve() }
  const started: Thread<RefitWork, Float64Array>[] = []
  const free: Thread<RefitWork, Float64Array>[] = []
  const queue: ((thread: Thread<RefitWork, Float64Array>) => void)[] = []
  const take = (): Promise<Thread<RefitWork, Float64Array>> => {
    const thread = free.pop()
    if (thread !== undefined) return Promise.resolve(thread)
    if (started.length < threads) {
      const fresh = startThread<RefitWork, Float64Array>('refit-worker')
      started.push(fresh)
      return Promise.resolve(fresh)
    }
    return new Promise((resolve) => { queue.push(resolve) })
  }
  const giveBack = (thread: Thread<RefitWork, Float64Array>): void => {
    const next = queue.shift()
    if (next === undefined) free.push(thread)
    else next(thread)
  }
  return {
    refit: async (problem, seed) => {
      const thread = await take()
      try {
        return await thread.ask({ problem, seed })
      } finally {
        giveBack(thread)
      }
    },
    close: async () => { await Promise.all(started.map((thread) => thread.close())) },
  }
}
