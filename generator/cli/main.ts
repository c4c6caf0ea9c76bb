#!/usr/bin/env node
import { failureOf } from './outcome.ts'

const args = process.argv.slice(2)

/** What went wrong outside of any command. */
function tell(error: unknown): void {
  const { exitCode, faults } = failureOf(error)
  process.exitCode = exitCode
  if (args.includes('--json')) process.stdout.write(`${JSON.stringify({ ok: false, faults })}\n`)
  for (const { message, mend, code } of faults) process.stderr.write(`${message}\n  ${mend} [${code}]\n`)
}

process.on('uncaughtException', (error: NodeJS.ErrnoException) => {
  // whoever read what is printed has seen enough
  if (error.code !== 'EPIPE') tell(error)
  process.exit()
})

try {
  // loaded here, so that whatever a machine does not let the program load is told like any other fault
  const { runCommandLine } = await import('./command-line.ts')
  process.exitCode = await runCommandLine(args)
  // what was stopped may still be at work, on threads and in the database
  if (process.exitCode > 128) process.exit()
} catch (error) {
  tell(error)
}
