import { spawn } from 'node:child_process'
import { cp, mkdtemp, rm, writeFile } from 'node:fs/promises'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { writeDrawnAccount } from '../support/drawn-account.ts'
import { watchFamily } from './process-family.ts'

/*
 * Many accounts in one run against one alone, the memory of all processes of the run, and sealing and verifying one: npx tsx test/bench/batch.ts [ACCOUNTS] [POSTS]
 * Each of 104 weeks, in four languages, with three to five venues; the last but one is faulty. Runs the compiled program: npm run prepare. Beside the wall clock stands the time on processors:
 * on a machine that does other work only the latter compares.
 */
const accounts = Number(process.argv[2] ?? 24)
const posts = Number(process.argv[3] ?? 20_000)
const program = process.argv[4] ?? 'dist/generator/cli/main.js'
const locales = ['en-GB', 'de-DE', 'fr-FR', 'pt-PT']
const folder = await mkdtemp(join(tmpdir(), 'tareline-bench-'))
const around = join(folder, 'accounts')
const names = Array.from({ length: accounts }, (_, i) => `account-${String(i + 1).padStart(2, '0')}`)

interface Run {
  readonly code: number | null
  readonly seconds: number
  readonly megabytes: number
  readonly processorSeconds: number
  readonly out: string
}

/** Run the program, and look at the memory of all its processes meanwhile. */
async function run(...args: readonly string[]): Promise<Run> {
  const start = performance.now()
  const child = spawn(process.execPath, [program, ...args], { stdio: ['ignore', 'pipe', 'ignore'] })
  const used = watchFamily(child.pid!)
  let out = ''
  child.stdout.on('data', (chunk: Buffer) => { out += String(chunk) })
  const code = await new Promise<number | null>((resolve) => { child.on('close', resolve) })
  const { bytes, processorSeconds } = used()
  return { code, seconds: (performance.now() - start) / 1000, megabytes: bytes / 2 ** 20, processorSeconds, out }
}

function expectCode({ code, out }: Run, expected: number): void {
  if (code !== expected) throw new Error(`expected exit code ${expected}, got ${code}: ${out}`)
}

const say = (text: string) => { process.stdout.write(`${text}\n`) }
const median = (values: readonly number[]) => [...values].sort((a, b) => a - b)[Math.floor(values.length / 2)]

try {
  for (const [i, name] of names.entries()) await writeDrawnAccount(join(around, name), { seed: 100 + i, posts, weeks: 104, venues: 3 + i % 3, locale: locales[i % locales.length] })
  const faulty = names.at(-2)!
  await writeFile(join(around, faulty, 'account.yaml'), 'account: faulty\n')

  const single: Run[] = []
  for (const name of names.slice(0, 3)) {
    await cp(join(around, name), join(folder, name), { recursive: true })
    single.push(await run('build', join(folder, name), '--quiet'))
    expectCode(single.at(-1)!, 0)
  }
  const [alone, aloneOnProcessors] = [median(single.map(({ seconds }) => seconds)), median(single.map(({ processorSeconds }) => processorSeconds))]
  say(`one alone ${alone.toFixed(1)} s (${aloneOnProcessors.toFixed(1)} s of processors), peak ${Math.max(...single.map(({ megabytes }) => megabytes)).toFixed(0)} MB`)

  const batch = await run('build', '--all', around, '--json')
  expectCode(batch, 1)
  const outcomes = (JSON.parse(batch.out) as { readonly accounts: readonly { readonly name: string; readonly outcome: string }[] }).accounts
  const failed = outcomes.filter(({ outcome }) => outcome !== 'built').map(({ name }) => name)
  if (failed.join() !== faulty) throw new Error(`expected ${faulty} alone to fail, got ${failed.join()}`)
  const [each, eachOnProcessors] = [batch.seconds / (accounts - 1), batch.processorSeconds / (accounts - 1)]
  say(`${accounts} accounts of ${posts} posts, one faulty and skipped: ${batch.seconds.toFixed(1)} s, ${each.toFixed(1)} s each (${(each / alone).toFixed(2)} times one alone; ${eachOnProcessors.toFixed(1)} s of processors, ${(eachOnProcessors / aloneOnProcessors).toFixed(2)} times), peak ${batch.megabytes.toFixed(0)} MB`)

  const again = await run('build', '--all', around, '--json')
  say(`the same again, nothing changed: ${again.seconds.toFixed(1)} s, peak ${again.megabytes.toFixed(0)} MB`)

  const one = join(around, names[0])
  for (const args of [['seal', one, '--period', '2025-08'], ['verify', one], ['verify', one, '--rebuild']]) {
    const done = await run(...args)
    expectCode(done, 0)
    say(`${args.filter((arg) => arg !== one).join(' ')} ${done.seconds.toFixed(1)} s`)
  }
} finally {
  await rm(folder, { recursive: true, force: true })
}
