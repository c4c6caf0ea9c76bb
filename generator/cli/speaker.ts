import type { Fault } from '../faults/fault.ts'
import { plainText } from './plain-text.ts'

/** Where a command's words go: with `--json` one object on stdout and everything else on stderr; with `--quiet` faults only. */
export interface Speaker {
  /** The result in words; not with `--json` or `--quiet`. */
  say(text: string): void
  /** The result as data; only with `--json`. */
  give(result: object): void
  /** @param of - the account whose they are, where there are several */
  faults(faults: readonly Fault[], of?: string): void
  /** What is being done; not with `--quiet`. */
  note(text: string): void
  readonly quiet: boolean
}

export interface SpeakerOptions {
  readonly json?: boolean
  readonly quiet?: boolean
}

export interface Streams {
  readonly out: NodeJS.WritableStream
  readonly err: NodeJS.WritableStream
}

export function createSpeaker(options: SpeakerOptions, streams: Streams): Speaker {
  const json = options.json === true
  const quiet = options.quiet === true
  return {
    quiet,
    say: (text) => { if (!json && !quiet) streams.out.write(`${text}\n`) },
    give: (result) => { if (json) streams.out.write(`${JSON.stringify(result)}\n`) },
    note: (text) => { if (!quiet) streams.err.write(`${text}\n`) },
    faults: (faults, of) => {
      const whose = of === undefined ? '' : `${plainText(of)}: `
      for (const { place, message, mend, code } of faults) streams.err.write(`${whose}${message.includes(place) ? message : `${place}: ${message}`}\n  ${mend} [${code}]\n`)
    },
  }
}
