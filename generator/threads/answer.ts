import { parentPort } from 'node:worker_threads'
import type { Answer, Numbered } from './thread.ts'

/** In a worker: answer every piece of work, and hand the result over. */
export function answerWith<Work>(compute: (work: Work) => Promise<Float64Array<ArrayBuffer>>): void {
  const port = parentPort
  if (port === null) throw new Error('a worker runs as a thread')
  port.on('message', ({ id, work }: Numbered<Work>) => {
    void compute(work).then((result) => {
      const answer: Answer<Float64Array> = { id, result }
      port.postMessage(answer, [result.buffer])
    })
  })
}
