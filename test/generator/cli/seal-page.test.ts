import { appendFile, cp, mkdir, mkdtemp, readdir, readFile, rm, writeFile } from 'node:fs/promises'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { afterEach, beforeEach, expect, test } from 'vitest'
import { madeHere } from '../../../generator/archive/manifest.ts'
import { fingerprint, fingerprints, recordName, type BuildRecord } from '../../../generator/archive/record.ts'
import { filesOf } from '../../../generator/archive/verify-archive.ts'
import { thisProgram } from '../../../generator/program/program.ts'
import { runCommand as run } from '../../support/run-command.ts'
import { sampleFindings } from '../../support/sample-findings.ts'
import { lastSealed } from '../archive/fake-account.ts'

const period = '2025-08'
let account: string
beforeEach(async () => {
  account = await mkdtemp(join(tmpdir(), 'sealed-'))
  await cp(join(import.meta.dirname, '../intake/fixtures/open-cells'), account, { recursive: true, filter: (path) => !path.endsWith('cache') })
  await appendFile(join(account, 'account.yaml'), 'prepared_by: Ana\nreviewed_by: Bo\n')
})
afterEach(() => rm(account, { recursive: true, force: true }))

/** A draft as a build would record it. */
async function draft(): Promise<void> {
  const folder = join(account, 'drafts', period)
  await rm(folder, { recursive: true, force: true })
  await mkdir(folder, { recursive: true })
  for (const name of ['review.html', 'review.pdf']) await writeFile(join(folder, name), name)
  await writeFile(join(folder, 'findings.json'), JSON.stringify({ ...sampleFindings(), period: { name: period, start: '2025-08-01', end: '2025-08-31' } }))
  const record: BuildRecord = {
    schema: 'tareline-record/1', account: 'skerrow-ferries', period, default_period: true, program: { ...madeHere(thisProgram()), browser: 'Any/1.0' }, seed: 1, prepared_by: 'Ana', reviewed_by: 'Bo',
    past: await lastSealed(account), passed: true,
    inputs: [{ ...await fingerprint(account, 'account.yaml'), kept: true }, { ...await fingerprint(account, 'cells/cells.csv'), kept: false }],
    files: [...await fingerprints(folder, await filesOf(folder))],
  }
  await writeFile(join(folder, recordName), JSON.stringify(record))
}

const page = () => readFile(join(account, 'archive', 'index.html'), 'utf8')

test('each seal writes the page of the archive anew, and the archive verifies', async () => {
  await draft()
  const first = await run('seal', account, '--period', period, '--json')
  expect([first.code, JSON.parse(first.out)]).toMatchObject([0, { ok: true, warnings: [], seal: { name: period } }])
  expect((await page()).includes('href="2025-08/review.html"')).toBe(true)
  await draft()
  expect(await run('seal', account, '--period', period, '--revise', 'late posts')).toMatchObject({ code: 0, err: '' })
  expect((await page()).includes('href="2025-08.r2/review.html"')).toBe(true)
  expect((await page()).includes('late posts')).toBe(true)
  expect((await run('verify', account)).code).toBe(0)
})

test('a page that cannot be written is told and undoes nothing; the next seal writes it', async () => {
  const inTheWay = join(account, 'archive', 'index.html')
  await mkdir(join(inTheWay, 'mine'), { recursive: true })
  await draft()
  const { code, out, err } = await run('seal', account, '--period', period, '--json')
  expect([code, JSON.parse(out)]).toMatchObject([0, { ok: true, faults: [], warnings: [{ code: 'archive-page-unwritten', place: 'archive/index.html' }], seal: { name: period } }])
  expect(err).toContain('The seal stands and needs nothing; the next seal writes the page anew. [archive-page-unwritten]')
  expect((await readdir(join(account, 'archive'))).filter((name) => !name.startsWith('.')).sort()).toEqual([period, 'chain-end.json', 'index.html'])
  expect((await run('verify', account)).code).toBe(0)
  await rm(inTheWay, { recursive: true })
  await draft()
  expect(await run('seal', account, '--period', period, '--revise', 'late posts')).toMatchObject({ code: 0, err: '' })
  expect((await page()).includes('href="2025-08/review.html"')).toBe(true)
})

test('a seal that is refused writes no page', async () => {
  expect((await run('seal', account, '--period', period)).code).toBe(1)
  await expect(page()).rejects.toThrow('ENOENT')
})
