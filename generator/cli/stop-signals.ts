import { Stopped, stopSignals } from '../review/stopping.ts'

/** Whether the process was asked to end. */
export interface StopSignals {
  /** Aborted with a `Stopped` when the first signal comes; a second one of the same kind ends the process at once. */
  readonly stop: AbortSignal
  /** Leave signals to the process again. */
  close(): void
}

export function listenForStop(): StopSignals {
  const controller = new AbortController()
  const listeners = stopSignals.map((signal) => [signal, () => { controller.abort(new Stopped(signal)) }] as const)
  for (const [signal, listener] of listeners) process.once(signal, listener)
  return { stop: controller.signal, close: () => { for (const [signal, listener] of listeners) process.off(signal, listener) } }
}
