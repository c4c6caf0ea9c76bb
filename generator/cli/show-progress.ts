import { Listr, type ListrTaskWrapper, type DefaultRenderer, type SimpleRenderer } from 'listr2'
import { silent, type Progress, type Stage } from '../review/stages.ts'
import { deferred } from './deferred.ts'
import { plainText } from './plain-text.ts'
import type { Speaker } from './speaker.ts'

/** What is being done, in words. */
export const stageTitles: Readonly<Record<Stage, string>> = {
  intake: 'Reading the mentions', fit: 'Fitting the model', document: 'Composing the review', print: 'Printing the PDF',
}
const stages = Object.keys(stageTitles) as Stage[]

export interface ShownProgress {
  readonly progress: Progress
  /** The work is over, well or badly: settle what is shown. */
  end(failure?: unknown): Promise<void>
}

/** Live stages on a terminal, plain lines elsewhere, nothing with `--quiet`. */
export function showProgress(speaker: Speaker, terminal: boolean, what: string): ShownProgress {
  if (speaker.quiet) return { progress: silent, end: () => Promise.resolve() }
  return terminal ? showLive(plainText(what)) : { progress: progressLines(speaker, what), end: () => Promise.resolve() }
}

/** A line for each step of the work, for a log. @param given - whose work it is */
export function progressLines(speaker: Speaker, given: string): Progress {
  const what = plainText(given)
  const inQuarters = (name: string) => {
    let told = 0
    return (share: number) => {
      const quarter = Math.floor(share * 4)
      if (quarter > told) speaker.note(`${what}:   ${name} ${25 * quarter} %`)
      told = quarter
    }
  }
  return {
    stage: (stage) => { speaker.note(`${what}: ${stageTitles[stage]}`) },
    detail: (text) => { speaker.note(`${what}:   ${text}`) },
    draws: inQuarters('draws'), forecasts: inQuarters('forecasts of the survey'),
  }
}

type LiveTask = ListrTaskWrapper<unknown, typeof DefaultRenderer, typeof SimpleRenderer>

/** One line per stage; each waits until the work says that the next one begins. */
function showLive(what: string): ShownProgress {
  const marks = new Map(stages.map((stage) => [stage, deferred()]))
  let current: LiveTask | undefined
  const list = new Listr<unknown>(stages.map((stage) => ({
    title: `${what}: ${stageTitles[stage]}`,
    task: (_, task) => {
      current = task
      return marks.get(stage)?.promise
    },
  })), { exitOnError: true, registerSignalListeners: false, rendererOptions: { collapseErrors: false, showErrorMessage: false } })
  const shown = list.run().catch(() => undefined)
  const settleBefore = (stage: Stage) => { for (const earlier of stages.slice(0, stages.indexOf(stage))) marks.get(earlier)?.resolve() }
  return {
    progress: {
      stage: settleBefore,
      detail: (text) => { if (current !== undefined) current.output = text },
      draws: (share) => { if (current !== undefined) current.output = `draws ${Math.round(100 * share)} %` },
      forecasts: (share) => { if (current !== undefined) current.output = `forecasts of the survey ${Math.round(100 * share)} %` },
    },
    end: async (failure) => {
      for (const mark of marks.values()) {
        if (failure === undefined) mark.resolve()
        else mark.reject(new Error('stopped'))
      }
      await shown
    },
  }
}
