/** Accounts in flight, and the threads of each. */
export interface Shares {
  readonly atOnce: number
  readonly threads: number
}

/** Several times what an account of 20,000 posts takes with its browser: for small machines. */
const memoryOfOne = 2 * 2 ** 30
/** All documents are composed and drawn on the program's one main thread: more accounts than this would wait for each other there. */
const mostAtOnce = 4

/**
 * How a machine is shared out among accounts. While one is fitted on its threads, another is read, composed or printed: so there are two in flight even on
 * two cores, each with two threads, since a fit on a single thread would hold up all others.
 *
 * @param accounts - 1 or more
 * @param threads - to work with in all, 1 or more; with 1 it is one account after the other
 * @param memory - of the machine, in bytes
 */
export function sharesOf(accounts: number, threads: number, memory: number): Shares {
  if (threads <= 1) return { atOnce: 1, threads: 1 }
  const atOnce = Math.max(1, Math.min(accounts, mostAtOnce, Math.max(2, Math.floor(threads / 2)), Math.floor(memory / memoryOfOne)))
  return { atOnce, threads: Math.max(2, Math.ceil(threads / atOnce)) }
}
