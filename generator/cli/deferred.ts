/** A promise that is settled from outside. */
export interface Deferred {
  readonly promise: Promise<void>
  resolve: () => void
  reject: (error: Error) => void
}

/** That nobody waits for a rejection is no fault. */
export function deferred(): Deferred {
  let resolve: () => void = () => undefined
  let reject: (error: Error) => void = () => undefined
  const promise = new Promise<void>((yes, no) => {
    resolve = yes
    reject = no
  })
  promise.catch(() => undefined)
  return { promise, resolve, reject }
}
