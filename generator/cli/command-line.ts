import { Command, InvalidArgumentError } from 'commander'
import { thisProgram } from '../program/program.ts'
import { runBuild, type BuildFlags } from './build-command.ts'
import { runCheck, type CheckFlags } from './check-command.ts'
import { failureOf, type ExitCode } from './outcome.ts'
import { runSeal, type SealFlags } from './seal-command.ts'
import { createSpeaker, type Streams } from './speaker.ts'
import { runStart, type StartFlags } from './start-command.ts'
import { runVerify, type VerifyFlags } from './verify-command.ts'

/**
 * Parse the arguments and run the command they name.
 *
 * @param args - without the program's own name
 * @returns the exit code: 0 done, 1 input at fault, 2 wrong usage, 3 machine lacks something, 4 fault of the program, 130 or 143 stopped
 */
export async function runCommandLine(args: readonly string[], streams: Streams = { out: process.stdout, err: process.stderr }): Promise<ExitCode> {
  let exitCode: ExitCode = 0
  const done = (code: ExitCode) => { exitCode = code }
  try {
    const tareline = describe(streams, done)
    await tareline.parseAsync(args, { from: 'user' })
  } catch (error) {
    const failure = failureOf(error)
    const speaker = createSpeaker({ json: args.includes('--json') }, streams)
    if (failure.exitCode > 2) speaker.give({ ok: false, faults: failure.faults })
    speaker.faults(failure.faults)
    return failure.exitCode
  }
  return exitCode
}

function describe(streams: Streams, done: (code: ExitCode) => void): Command {
  const program = thisProgram()
  const quietly = (command: Command) => command
    .option('--json', 'print one JSON object on stdout, everything else on stderr')
    .option('--quiet', 'say nothing but what is at fault')
    .exitOverride()
    .configureOutput({ writeOut: (text) => streams.out.write(text), writeErr: (text) => streams.err.write(text) })
  const tareline = new Command('tareline')
    .description('Makes brand health reviews from posts: what opinion of the brand itself has done, and how sure that is.')
    .version(program.version)
    .exitOverride()
    .configureOutput({ writeOut: (text) => streams.out.write(text), writeErr: (text) => streams.err.write(text) })

  quietly(tareline.command('start').argument('<folder>', 'folder of the new account: absent or empty'))
    .description('lay out a new account with a commented account.yaml, and check it at once')
    .option('--from <file>', 'file of mentions (.csv, .ndjson, .parquet, ...): propose which of its columns is what, and copy it into the account')
    .action(async (folder: string, flags: StartFlags) => { done(await runStart(program, folder, flags, createSpeaker(flags, streams))) })

  quietly(tareline.command('check').argument('<account>', 'folder with an account.yaml'))
    .description('read the account file, every input and the template; print the accounting of mentions; fit nothing')
    .option('--rejects <dir>', 'write the rows that could not be read, with file, line and reason')
    .option('--audit-sample <number>', 'print the ids of so many posts to code by hand, drawn at random from every venue', wholeNumber)
    .option('--seed <number>', 'seed of that draw; the same seed draws the same posts', wholeNumber, 1)
    .action(async (account: string, flags: CheckFlags) => { done(await runCheck(program, account, flags, createSpeaker(flags, streams))) })

  quietly(tareline.command('build').argument('[account...]', 'folders with an account.yaml'))
    .description('fit the model and make the draft review of a period: review.html, review.pdf, findings.json, tables')
    .option('--period <period>', 'e.g. 2026-10, 2026-Q4, 2026-W44; default: the last whole one that the mentions cover')
    .option('--out <dir>', 'folder of the draft; default: ACCOUNT/drafts/PERIOD')
    .option('--all <folder>', 'every account in a folder: several at once, one browser, a table at the end; drafts that are what would be built stay')
    .option('--no-pdf', 'leave out the PDF')
    .option('--watch', 'stay, and render a page beside the draft anew at each change of template, words, looks or notes')
    .option('--seed <number>', 'seed of the draws; the same seed gives the same review', wholeNumber, 1)
    .option('--threads <number>', 'threads to work with; the review does not depend on it', wholeNumber)
    .option('--browser <file>', 'browser that prints the PDF; default: the first that is found')
    .action(async (accounts: string[], flags: BuildFlags) => { done(await runBuild(program, accounts, flags, createSpeaker(flags, streams))) })

  quietly(tareline.command('seal').argument('<account>', 'folder with an account.yaml'))
    .description('sign the draft of a period off into ACCOUNT/archive, for good')
    .requiredOption('--period <period>', 'whose draft, e.g. 2026-10, 2026-Q4, 2026-W44')
    .option('--revise <reason>', 'why a sealed period is sealed again: the first seal stays, the new one stands beside it', someText)
    .action(async (account: string, flags: SealFlags) => { done(await runSeal(program, account, flags, createSpeaker(flags, streams))) })

  quietly(tareline.command('verify').argument('<account>', 'folder with an archive'))
    .description('hash every sealed file again and walk the chain of seals')
    .option('--rebuild', 'make every sealed review again from its own tables and inputs, and compare')
    .option('--threads <number>', 'threads to work with; the reviews do not depend on it', wholeNumber)
    .option('--browser <file>', 'browser that prints the PDFs again; default: the first that is found')
    .action(async (account: string, flags: VerifyFlags) => { done(await runVerify(program, account, flags, createSpeaker(flags, streams))) })
  return tareline
}

function wholeNumber(text: string): number {
  const value = Number(text)
  if (!/^\d+$/.test(text) || !Number.isSafeInteger(value)) throw new InvalidArgumentError('expected a whole number of 0 or more.')
  return value
}

function someText(text: string): string {
  if (text.trim() === '') throw new InvalidArgumentError('expected a text.')
  return text.trim()
}
