#!/usr/bin/env node
import { failureOf } from './outcome.ts'

const args = process.argv.slice(2)

try {
  // loaded here, so that whatever a machine does not let the program load is told like any other fault
  const { runCommandLine } = await import('./command-line.ts')
  process.exitCode = await runCommandLine(args)
  // what was stopped may still be at work, on threads and in the database
  if (process.exitCode > 128) process.exit()
} catch (error) {
  const { exitCode, faults } = failureOf(error)
  process.exitCode = exitCode
  if (args.includes('--json')) process.stdout.write(`${JSON.stringify({ ok: false, faults })}\n`)
  for (const { message, mend } of faults) process.stderr.write(`${message}\n  ${mend}\n`)
}
