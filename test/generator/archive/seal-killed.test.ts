import { spawn } from 'node:child_process'
import { watch } from 'node:fs'
import { appendFile, cp, mkdir, mkdtemp, readdir, rm, writeFile } from 'node:fs/promises'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { afterAll, beforeAll, expect, test } from 'vitest'
import { madeHere } from '../../../generator/archive/manifest.ts'
import { fingerprint, fingerprints, recordName, type BuildRecord } from '../../../generator/archive/record.ts'
import { filesOf, verifyArchive } from '../../../generator/archive/verify-archive.ts'
import { thisProgram } from '../../../generator/program/program.ts'
import { createGenerator } from '../../../model/random/generator.ts'
import { lastSealed } from './fake-account.ts'

const root = join(import.meta.dirname, '../../..')
const period = '2025-08'
let account: string
beforeAll(async () => {
  account = await mkdtemp(join(tmpdir(), 'killed-'))
  await cp(join(root, 'test/generator/intake/fixtures/open-cells'), account, { recursive: true, filter: (path) => !path.endsWith('cache') })
  await appendFile(join(account, 'account.yaml'), 'prepared_by: Ana\nreviewed_by: Bo\n')
})
afterAll(() => rm(account, { recursive: true, force: true }))

/** A draft as a build would record it, of so many tables that its sealing takes a while. */
async function draftOf(tables: number): Promise<void> {
  const draft = join(account, 'drafts', period)
  await rm(draft, { recursive: true, force: true })
  await mkdir(join(draft, 'tables'), { recursive: true })
  for (const name of ['review.html', 'review.pdf', 'findings.json', ...Array.from({ length: tables }, (_, t) => `tables/table-${t}.csv`)]) await writeFile(join(draft, name), `${name}\n`)
  const record: BuildRecord = {
    schema: 'tareline-record/1', account: 'skerrow-ferries', period, default_period: true, program: { ...madeHere(thisProgram()), browser: 'Any/1.0' }, seed: 1, prepared_by: 'Ana', reviewed_by: 'Bo', past: await lastSealed(account), passed: true,
    inputs: [{ ...await fingerprint(account, 'account.yaml'), kept: true }, { ...await fingerprint(account, 'cells/cells.csv'), kept: false }],
    files: [...await fingerprints(draft, await filesOf(draft))],
  }
  await writeFile(join(draft, recordName), JSON.stringify(record))
}

interface Ended { readonly signal: NodeJS.Signals | null; readonly code: number | null; readonly tookMs: number; readonly err: string }

/** Run the program's own `seal`; once it writes into the archive it has so many ms to live. */
async function seal(sealed: number, liveMs: number): Promise<Ended> {
  await draftOf(60)
  const child = spawn(process.execPath, ['--import', 'tsx', join(root, 'generator/cli/main.ts'), 'seal', account, '--period', period, '--quiet', ...(sealed === 0 ? [] : ['--revise', `seal ${sealed + 1}`])], { cwd: root, stdio: ['ignore', 'ignore', 'pipe'] })
  let err = ''
  child.stderr.on('data', (chunk: Buffer) => { err += String(chunk) })
  let began: number | undefined
  const watched = watch(join(account, 'archive'), () => {
    if (began !== undefined) return
    began = performance.now()
    if (Number.isFinite(liveMs)) setTimeout(() => child.kill('SIGKILL'), liveMs)
  })
  return new Promise((resolve) => {
    child.on('close', (code, signal) => {
      watched.close()
      resolve({ code, signal, err, tookMs: performance.now() - (began ?? performance.now()) })
    })
  })
}

test('a seal that is killed, whenever it is, leaves the archive as it was or with the whole new seal in it', async () => {
  await mkdir(join(account, 'archive'))
  const first = await seal(0, Number.POSITIVE_INFINITY)
  expect(first).toMatchObject({ code: 0, signal: null, err: '' })
  const random = createGenerator(2026, 0)
  let [sealed, killed, atWork] = [1, 0, 0]
  for (let run = 0; run < 6; run++) {
    const { signal, code, err } = await seal(sealed, random.uniform() * first.tookMs)
    if (signal === 'SIGKILL') killed++
    else expect([code, err]).toEqual([0, ''])
    const { faults, archive } = await verifyArchive(join(account, 'archive'))
    expect(faults).toEqual([])
    expect([sealed, sealed + 1]).toContain(archive.seals.length)
    if (signal === 'SIGKILL' && (await readdir(join(account, 'archive'))).some((name) => name.startsWith('.unfinished-'))) atWork++
    sealed = archive.seals.length
  }
  // killed while it was writing, not before or after
  expect(killed).toBeGreaterThan(1)
  expect(atWork).toBeGreaterThan(0)
  expect(await seal(sealed, Number.POSITIVE_INFINITY)).toMatchObject({ code: 0, err: '' })
  expect(await verifyArchive(join(account, 'archive'))).toMatchObject({ faults: [], endBehind: false })
  expect((await readdir(join(account, 'archive'))).filter((name) => name.startsWith('.unfinished-'))).toEqual([])
}, 240_000)
