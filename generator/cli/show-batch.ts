import { Listr, type DefaultRenderer, type ListrTaskWrapper, type SimpleRenderer } from 'listr2'
import type { Fault } from '../faults/fault.ts'
import { silent, type Progress } from '../review/stages.ts'
import { deferred } from './deferred.ts'
import { plainText } from './plain-text.ts'
import { progressLines, stageTitles } from './show-progress.ts'
import type { Speaker } from './speaker.ts'

/** How an account of many came out. */
export type BatchOutcome = 'built' | 'unchanged' | 'failed' | 'stopped'

/** What is shown of many accounts that are built side by side; each is known by its place in the list. */
export interface ShownBatch {
  begin(index: number): Progress
  settle(index: number, outcome: BatchOutcome, faults: readonly Fault[]): void
  end(): Promise<void>
}

const words: Readonly<Record<BatchOutcome, string>> = { built: 'built', unchanged: 'unchanged, not built again', failed: 'not built', stopped: 'stopped' }

/** A line for each account on a terminal, lines that begin with its name elsewhere; nothing but faults with `--quiet`. */
export function showBatch(speaker: Speaker, terminal: boolean, names: readonly string[], atOnce: number): ShownBatch {
  if (speaker.quiet || !terminal) return showLines(speaker, names)
  return showLive(speaker, names, atOnce)
}

function showLines(speaker: Speaker, names: readonly string[]): ShownBatch {
  return {
    begin: (index) => (speaker.quiet ? silent : progressLines(speaker, names[index])),
    settle: (index, outcome, faults) => {
      speaker.note(`${plainText(names[index])}: ${words[outcome]}`)
      speaker.faults(faults, names[index])
    },
    end: () => Promise.resolve(),
  }
}

type LiveTask = ListrTaskWrapper<unknown, typeof DefaultRenderer, typeof SimpleRenderer>

/** Faults wait until all is settled: between live lines they would tear the picture. */
function showLive(speaker: Speaker, names: readonly string[], atOnce: number): ShownBatch {
  const tasks: LiveTask[] = []
  const marks = names.map(() => deferred())
  const waiting: { readonly faults: readonly Fault[]; readonly of: string }[] = []
  const list = new Listr<unknown>(names.map((name, index) => ({
    title: plainText(name),
    task: (_, task) => {
      tasks[index] = task
      return marks[index].promise
    },
  })), { concurrent: atOnce, exitOnError: false, registerSignalListeners: false, rendererOptions: { collapseErrors: false, showErrorMessage: false } })
  const shown = list.run().catch(() => undefined)
  const title = (index: number, text: string): void => {
    const task = tasks[index]
    if (task !== undefined) task.title = `${plainText(names[index])}: ${text}`
  }
  const share = (index: number, what: string) => (done: number): void => {
    const task = tasks[index]
    if (task !== undefined) task.output = `${what} ${Math.round(100 * done)} %`
  }
  return {
    begin: (index) => ({
      stage: (stage) => { title(index, stageTitles[stage]) },
      detail: (text) => { if (tasks[index] !== undefined) tasks[index].output = plainText(text) },
      draws: share(index, 'draws'), forecasts: share(index, 'forecasts of the survey'),
    }),
    settle: (index, outcome, faults) => {
      title(index, words[outcome])
      if (faults.length > 0) waiting.push({ faults, of: names[index] })
      if (outcome === 'failed' || outcome === 'stopped') marks[index].reject(new Error(outcome))
      else marks[index].resolve()
    },
    end: async () => {
      await shown
      for (const { faults, of } of waiting) speaker.faults(faults, of)
    },
  }
}
