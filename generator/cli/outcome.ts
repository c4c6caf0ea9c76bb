import { CommanderError } from 'commander'
import { faultOf } from '../faults/catalogue.ts'
import { InputFault, MachineFault, type Fault } from '../faults/fault.ts'
import { Stopped } from '../review/stopping.ts'

/**
 * 0 done, 1 the input or the archive is at fault, 2 wrong usage, 3 the machine lacks something, 4 a fault of the program itself;
 * 130 and 143 stopped by SIGINT and SIGTERM, as shells count them.
 */
export type ExitCode = 0 | 1 | 2 | 3 | 4 | 130 | 143

/** What went wrong, as the command line reports it. */
export interface Failure {
  readonly exitCode: ExitCode
  readonly faults: readonly Fault[]
}

/** The exit code of several outcomes: the largest. */
export function worstOf(outcomes: readonly { readonly exitCode: ExitCode }[]): ExitCode {
  return outcomes.reduce<ExitCode>((worst, { exitCode }) => (exitCode > worst ? exitCode : worst), 0)
}

/** Sort an error by who must mend it. */
export function failureOf(error: unknown): Failure {
  if (error instanceof InputFault) return { exitCode: 1, faults: error.faults }
  if (error instanceof MachineFault) return { exitCode: 3, faults: [error.fault] }
  if (error instanceof Stopped) return { exitCode: error.signal === 'SIGINT' ? 130 : 143, faults: [faultOf('stopped', 'tareline', { signal: error.signal })] }
  if (error instanceof CommanderError) return { exitCode: error.exitCode === 0 ? 0 : 2, faults: [] }
  const text = error instanceof Error ? (error.stack ?? error.message) : String(error)
  return {
    exitCode: 4,
    faults: [{ code: 'program-fault', place: 'tareline', message: text, mend: 'This is a fault of the program: report it with this text; the data need no change.' }],
  }
}
