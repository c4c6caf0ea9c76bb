import { Writable } from 'node:stream'
import { runCommandLine } from '../../generator/cli/command-line.ts'

/** A command run in this process: its exit code and what it wrote. */
export interface CommandRun {
  readonly code: number
  readonly out: string
  readonly err: string
}

/** Run `tareline` with these arguments. */
export async function runCommand(...args: string[]): Promise<CommandRun> {
  const [out, err] = [collector(), collector()]
  const code = await runCommandLine(args, { out: out.stream, err: err.stream })
  return { code, out: out.text(), err: err.text() }
}

function collector(): { readonly stream: Writable; readonly text: () => string } {
  const chunks: string[] = []
  return {
    stream: new Writable({ write: (chunk: Buffer, _, done) => { chunks.push(String(chunk)); done() } }),
    text: () => chunks.join(''),
  }
}
