/** The signals by which a user, or a machine, asks a program to end. */
export const stopSignals = ['SIGINT', 'SIGTERM'] as const
export type StopSignal = (typeof stopSignals)[number]

/** The program was asked to end: what was begun is abandoned. */
export class Stopped extends Error {
  readonly signal: StopSignal
  constructor(signal: StopSignal) {
    super(`stopped by ${signal}`)
    this.name = 'Stopped'
    this.signal = signal
  }
}

/**
 * Wait for work, or until the program is asked to end. Work that is not waited for any more goes on unheard: whoever began it ends the process.
 *
 * @param stop - aborted with a `Stopped`
 * @throws the reason of the abortion, or what the work throws
 */
export async function unlessStopped<T>(stop: AbortSignal | undefined, work: Promise<T>): Promise<T> {
  if (stop === undefined) return work
  work.catch(() => undefined)
  let tell: () => void = () => undefined
  try {
    return await Promise.race([work, new Promise<never>((_, reject) => {
      tell = () => { reject(stop.reason as Error) }
      if (stop.aborted) tell()
      else stop.addEventListener('abort', tell)
    })])
  } finally {
    stop.removeEventListener('abort', tell)
  }
}
