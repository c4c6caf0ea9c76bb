import { spawn } from 'node:child_process'
import { cp, mkdir, mkdtemp, readdir, rm, writeFile } from 'node:fs/promises'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { afterAll, beforeAll, describe, expect, test } from 'vitest'

const root = join(import.meta.dirname, '../../..')
let scratch: string
beforeAll(async () => { scratch = await mkdtemp(join(tmpdir(), 'main-')) })
afterAll(() => rm(scratch, { recursive: true, force: true }))

interface Ended { readonly code: number | null; readonly out: string; readonly err: string }

/** Run the program as a process of its own; once it says `when`, it is sent a signal. */
function run(args: readonly string[], { preload = [], signal, when }: { readonly preload?: readonly string[]; readonly signal?: NodeJS.Signals; readonly when?: string } = {}): Promise<Ended> {
  const child = spawn(process.execPath, ['--import', 'tsx', ...preload.flatMap((file) => ['--import', file]), join(root, 'generator/cli/main.ts'), ...args], { cwd: root })
  let [out, err] = ['', '']
  child.stdout.on('data', (chunk: Buffer) => { out += String(chunk) })
  child.stderr.on('data', (chunk: Buffer) => {
    const told = err.includes(when ?? '\0')
    err += String(chunk)
    if (!told && when !== undefined && err.includes(when)) child.kill(signal)
  })
  return new Promise((resolve) => { child.on('close', (code) => { resolve({ code, out, err }) }) })
}

/** A module that changes what node offers before the program is loaded. */
function preload(code: string): string {
  return `data:text/javascript,${encodeURIComponent(`${code}; import { syncBuiltinESMExports } from 'node:module'; syncBuiltinESMExports()`)}`
}

describe('a build that is told to end', () => {
  test.each([['SIGINT', 130, 'Reading the mentions'], ['SIGTERM', 143, 'Fitting the model']] as const)('by %s: exit code %i, the draft abandoned', async (signal, exitCode, when) => {
    const folder = join(scratch, signal)
    await cp(join(root, 'test/generator/intake/fixtures/open-cells'), folder, { recursive: true })
    await mkdir(join(folder, 'drafts/2025-08'), { recursive: true })
    await writeFile(join(folder, 'drafts/2025-08/review.html'), 'earlier')
    const { code, out, err } = await run(['build', folder, folder, '--no-pdf', '--json'], { signal, when })
    expect(code).toBe(exitCode)
    expect(JSON.parse(out)).toMatchObject({ ok: false, drafts: [], faults: [{ code: 'stopped', message: expect.stringContaining(signal) as string }] })
    expect(err).toContain('[stopped]')
    expect(await readdir(join(folder, 'drafts'))).toEqual(['2025-08'])
    expect(await readdir(join(folder, 'drafts/2025-08'))).toEqual(['review.html'])
  })

  test('it can fail: one that is not ends well', async () => {
    const { code, out } = await run(['check', join(root, 'test/generator/intake/fixtures/open-cells'), '--json'], { when: 'Fitting' })
    expect([code, JSON.parse(out)]).toMatchObject([0, { ok: true }])
  })
})

test('a check that is told to end: exit code 143', async () => {
  const { code, out } = await run(['check', join(root, 'sample-data/skerrow-ferries'), '--json'], { signal: 'SIGTERM', when: 'Reading the mentions' })
  expect([code, JSON.parse(out)]).toMatchObject([143, { ok: false, faults: [{ code: 'stopped' }] }])
})

describe('a machine without a home', () => {
  const homeless = preload("import os from 'node:os'; os.homedir = () => { throw new Error('no home') }")

  test('does all but print', async () => {
    const cells = join(scratch, 'homeless')
    await cp(join(root, 'test/generator/intake/fixtures/open-cells'), cells, { recursive: true })
    expect((await run(['check', cells, '--json'], { preload: [homeless] })).code).toBe(0)
    const { code, out } = await run(['build', cells, '--out', join(scratch, 'printed'), '--json'], { preload: [homeless] })
    expect([code, JSON.parse(out)]).toMatchObject([3, { ok: false, faults: [{ code: 'printer-unusable', message: expect.stringContaining('no home') as string, mend: expect.stringContaining('HOME') as string }] }])
  })
})

test('what the machine does not let the program load is told as a fault, as data too', async () => {
  const barred = preload("import fs from 'node:fs'; const read = fs.readdirSync; fs.readdirSync = (path, ...rest) => { if (String(path).endsWith('model')) throw new Error('barred'); return read(path, ...rest) }")
  const { code, out, err } = await run(['check', 'anything', '--json'], { preload: [barred] })
  expect([code, JSON.parse(out)]).toMatchObject([4, { ok: false, faults: [{ code: 'program-fault', message: expect.stringContaining('barred') as string }] }])
  expect(err).toContain('barred')
})
