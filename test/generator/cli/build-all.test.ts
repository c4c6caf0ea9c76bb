import { spawn } from 'node:child_process'
import { appendFile, cp, mkdir, mkdtemp, readdir, readFile, rm, stat, symlink, utimes, writeFile } from 'node:fs/promises'
import { hostname, tmpdir } from 'node:os'
import { join } from 'node:path'
import { afterAll, beforeAll, beforeEach, describe, expect, test, vi } from 'vitest'
import type * as browsers from '../../../generator/print/open-browser.ts'
import { openBrowser } from '../../../generator/print/open-browser.ts'
import { lockName } from '../../../generator/review/account-lock.ts'
import { runCommand } from '../../support/run-command.ts'
import { writeDrawnAccount } from '../../support/drawn-account.ts'

vi.mock('../../../generator/print/open-browser.ts', async (load) => {
  const original = await load<typeof browsers>()
  return { ...original, openBrowser: vi.fn(original.openBrowser) }
})

const root = join(import.meta.dirname, '../../..')
let scratch: string
beforeAll(async () => { scratch = await mkdtemp(join(tmpdir(), 'all-')) })
afterAll(() => rm(scratch, { recursive: true, force: true }))
beforeEach(() => { vi.mocked(openBrowser).mockClear() })

/** A folder of small accounts. */
async function accountsIn(name: string, names: readonly string[]): Promise<string> {
  const around = join(scratch, name)
  for (const [i, account] of names.entries()) await writeDrawnAccount(join(around, account), { seed: i + 1, posts: 400, weeks: 20, venues: 2 })
  return around
}

interface AllResult {
  readonly ok: boolean
  readonly accounts: readonly { readonly name: string; readonly outcome: string; readonly draft: { readonly folder: string } | null; readonly faults: readonly { readonly code: string }[] }[]
  readonly drafts: readonly object[]
  readonly faults: readonly { readonly code: string }[]
}
const outcomesOf = (out: string): Readonly<Record<string, string>> => Object.fromEntries((JSON.parse(out) as AllResult).accounts.map(({ name, outcome }) => [name, outcome]))
const draftFile = (around: string, name: string) => join(around, name, 'drafts/2025-08/review.html')

describe('a folder of accounts, one of them faulty', () => {
  let around: string
  beforeAll(async () => {
    around = await accountsIn('mixed', ['b', 'a', 'd'])
    await mkdir(join(around, 'c'))
    await writeFile(join(around, 'c', 'account.yaml'), 'account: c\n')
    await mkdir(join(around, 'no-account'))
    await writeFile(join(around, 'readme.txt'), 'no account either')
    await symlink(join(around, 'no-account'), join(around, 'link'))
  })

  test('the others are built with one browser; it is told with its name and in the table, which is in their order; exit code 1', async () => {
    const { code, out, err } = await runCommand('build', '--all', around)
    expect(code).toBe(1)
    expect(openBrowser).toHaveBeenCalledTimes(1)
    for (const name of ['a', 'b', 'd']) expect((await stat(join(around, name, 'drafts/2025-08/review.pdf'))).size).toBeGreaterThan(10_000)
    expect(err).toMatch(/^c: Unexpected absence of `brand`.*\n.*\[account-key-absent\]$/m)
    expect(err).toMatch(/^a: Fitting the model$/m)
    const rows = out.split('\n').flatMap((line) => /^([abcd]) +(\S+)/.exec(line)?.slice(1, 3).join(' ') ?? [])
    expect(rows).toEqual(['a 2025-08:', 'b 2025-08:', 'c not', 'd 2025-08:'])
    expect(out).toContain('4 accounts, 3 built, 1 not built')
    for (const name of ['a', 'b', 'c', 'd']) expect(await readdir(join(around, name))).not.toContain(lockName)
  }, 240_000)

  test('again: nothing is built, and nothing touched; with --no-pdf the same drafts do', async () => {
    const before = await Promise.all(['a', 'b', 'd'].map(async (name) => (await stat(draftFile(around, name))).mtimeMs))
    for (const more of [[], ['--no-pdf'], ['--no-pdf', '--period', '2025-08']]) {
      const { code, out } = await runCommand('build', '--all', around, '--json', '--quiet', ...more)
      expect([code, outcomesOf(out)]).toEqual([1, { a: 'unchanged', b: 'unchanged', c: 'failed', d: 'unchanged' }])
      expect(JSON.parse(out)).toMatchObject({ ok: false, faults: [{ code: 'account-key-absent' }, { code: 'account-key-absent' }], drafts: [{ account: 'drawn-2' }, { account: 'drawn-1' }, { account: 'drawn-3' }] })
    }
    expect(await Promise.all(['a', 'b', 'd'].map(async (name) => (await stat(draftFile(around, name))).mtimeMs))).toEqual(before)
  }, 120_000)

  test('what has changed is built again, and only that; once all are sound the exit code is 0', async () => {
    await rm(join(around, 'c'), { recursive: true })
    await appendFile(join(around, 'b', 'account.yaml'), '# later\n')
    const { code, out, err } = await runCommand('build', '--all', around, '--no-pdf')
    expect([code, err.match(/^\w: (unchanged|built).*$/gm)?.sort()]).toEqual([0, ['a: unchanged, not built again', 'b: built', 'd: unchanged, not built again']])
    expect(out).toContain('3 accounts, 1 built, 2 unchanged')
    expect(openBrowser).not.toHaveBeenCalled()
  }, 120_000)

  test('the draft is the one that is built alone, to the byte', async () => {
    await cp(join(around, 'b'), join(scratch, 'alone'), { recursive: true, filter: (path) => !/cache|drafts/.test(path) })
    expect((await runCommand('build', join(scratch, 'alone'), '--no-pdf', '--quiet', '--threads', '1')).code).toBe(0)
    for (const file of ['findings.json', 'review.html', 'record.json']) {
      expect(await readFile(join(scratch, 'alone/drafts/2025-08', file), 'utf8')).toBe(await readFile(join(around, 'b/drafts/2025-08', file), 'utf8'))
    }
  }, 120_000)
})

test('an account that another is at work on is refused, and the others are built; a build alone is refused as well, and a seal', async () => {
  const around = await accountsIn('locked', ['a', 'b'])
  const holder = { command: 'build', pid: process.ppid, host: hostname(), since: '2026-12-01T09:00:00.000Z', started: null, token: 'aaaaaaaa' }
  await writeFile(join(around, 'a', lockName), JSON.stringify(holder))
  const { code, out } = await runCommand('build', '--all', around, '--no-pdf', '--json', '--quiet')
  expect([code, outcomesOf(out)]).toEqual([1, { a: 'failed', b: 'built' }])
  for (const args of [['build', join(around, 'a'), '--no-pdf'], ['seal', join(around, 'a'), '--period', '2025-08']]) {
    const refused = await runCommand(...args, '--json')
    expect([refused.code, JSON.parse(refused.out)]).toMatchObject([1, { ok: false, faults: [{ code: 'account-busy' }] }])
  }
  expect(await readdir(join(around, 'a'))).not.toContain('drafts')
}, 120_000)

/** Run the program as a process of its own, and end it by a signal once a line of what it says has come. */
function endedAt(around: string, line: RegExp, signal: NodeJS.Signals): Promise<{ readonly code: number | null; readonly err: string; readonly out: string }> {
  const child = spawn(process.execPath, ['--import', 'tsx', join(root, 'generator/cli/main.ts'), 'build', '--all', around, '--no-pdf', '--json'], { cwd: root })
  let [out, err] = ['', '']
  child.stdout.on('data', (chunk: Buffer) => { out += String(chunk) })
  child.stderr.on('data', (chunk: Buffer) => {
    const told = line.test(err)
    err += String(chunk)
    if (!told && line.test(err)) child.kill(signal)
  })
  return new Promise((resolve) => { child.on('close', (code) => { resolve({ code, err, out }) }) })
}

test('a run that was killed leaves whole drafts and old locks; the next one takes those over and does only what is left', async () => {
  const around = await accountsIn('killed', ['a', 'b', 'c', 'd', 'e'])
  const { code, err } = await endedAt(around, /^\w: built$/m, 'SIGKILL')
  expect(code).toBeNull()
  const finished = err.match(/^\w(?=: built$)/gm) ?? []
  expect(finished.length).toBeGreaterThan(0)
  const locked = (await Promise.all(['a', 'b', 'c', 'd', 'e'].map(async (name) => ((await readdir(join(around, name))).includes(lockName) ? [name] : [])))).flat()
  expect(locked.length).toBeGreaterThan(0)
  const long = new Date('2026-01-01')
  for (const name of finished) await utimes(draftFile(around, name), long, long)
  const again = await runCommand('build', '--all', around, '--no-pdf', '--json', '--quiet')
  const outcomes = outcomesOf(again.out)
  expect([again.code, Object.keys(outcomes)]).toEqual([0, ['a', 'b', 'c', 'd', 'e']])
  for (const name of finished) {
    expect(outcomes[name]).toBe('unchanged')
    expect((await stat(draftFile(around, name))).mtimeMs).toBe(long.getTime())
  }
  for (const name of locked.filter((one) => !(finished as readonly string[]).includes(one))) expect(['built', 'unchanged']).toContain(outcomes[name])
  expect(Object.values(outcomes)).toContain('built')
  for (const name of Object.keys(outcomes)) expect((await readdir(join(around, name))).filter((entry) => entry.startsWith(lockName))).toEqual([])
}, 240_000)

test('a run that is told to end: exit code 143, no lock is left, and what was not begun is said to be stopped', async () => {
  const around = await accountsIn('stopped', ['a', 'b', 'c', 'd'])
  const { code, out, err } = await endedAt(around, /: Fitting the model$/m, 'SIGTERM')
  expect(code).toBe(143)
  expect(Object.values(outcomesOf(out))).toEqual(['stopped', 'stopped', 'stopped', 'stopped'])
  expect((JSON.parse(out) as AllResult).faults).toMatchObject([{ code: 'stopped' }])
  expect(err.match(/\[stopped\]/g)).toHaveLength(1)
  for (const name of ['a', 'b', 'c', 'd']) expect((await readdir(join(around, name))).filter((entry) => entry.startsWith('.'))).toEqual([])
}, 120_000)

test('a machine without the browser is told once, before anything is built: exit code 3', async () => {
  const around = await accountsIn('browserless', ['a', 'b'])
  const { code, out, err } = await runCommand('build', '--all', around, '--json', '--browser', join(scratch, 'no-browser'))
  expect([code, JSON.parse(out)]).toMatchObject([3, { ok: false, accounts: [], faults: [{}] }])
  expect(err.match(/no-browser/g)?.length).toBeLessThanOrEqual(2)
  expect(await readdir(join(around, 'a'))).not.toContain('drafts')
})

test('a folder without accounts, and none at all: exit code 1', async () => {
  for (const folder of [await accountsIn('empty', []).then(async (around) => { await mkdir(around); return around }), join(scratch, 'not-there')]) {
    const { code, err } = await runCommand('build', '--all', folder)
    expect([code, err]).toEqual([1, expect.stringContaining('[accounts-absent]')])
  }
})

test.each([[['--all', 'x', 'y']], [['--all', 'x', '--out', 'y']], [['--all', 'x', '--watch']], [['--all']]])('%j: exit code 2', async (args) => {
  expect((await runCommand('build', ...args)).code).toBe(2)
})
