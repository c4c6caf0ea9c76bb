import { appendFile, cp, mkdir, readFile, rm, writeFile } from 'node:fs/promises'
import { join } from 'node:path'
import type { Browser } from 'puppeteer'
import { afterAll, beforeAll, describe, expect, test } from 'vitest'
import { readAccount } from '../../../generator/account/read-account.ts'
import { chainEndName, manifestName, manifestSchema, sha256Of, writtenManifest, type Manifest } from '../../../generator/archive/manifest.ts'
import { readParquet, writeParquet } from '../../../generator/archive/parquet.ts'
import { readArchive, sealedInOrder } from '../../../generator/archive/read-archive.ts'
import { rebuildSeal, type Rebuilt } from '../../../generator/archive/rebuild.ts'
import { readRecord } from '../../../generator/archive/record.ts'
import { sealReview } from '../../../generator/archive/seal-review.ts'
import { filesOf, verifyArchive } from '../../../generator/archive/verify-archive.ts'
import { InputFault } from '../../../generator/faults/fault.ts'
import { openBrowser } from '../../../generator/print/open-browser.ts'
import { thisProgram } from '../../../generator/program/program.ts'
import { buildReview } from '../../../generator/review/build-review.ts'
import { silent } from '../../../generator/review/stages.ts'
import { runCommand } from '../../support/run-command.ts'
import { requestOf } from './fake-account.ts'
import { inputsOf2025August, wholeAccount } from './whole-account.ts'

const period = '2025-08'
let folder: string
let remove: () => Promise<void>
let browser: Browser
beforeAll(async () => {
  ({ folder, remove } = await wholeAccount())
  browser = await openBrowser()
  await buildReview(thisProgram(), await readAccount(folder), { period, seed: 7, browser: () => Promise.resolve(browser), progress: silent })
}, 240_000)
afterAll(async () => {
  await browser.close()
  await remove()
})

describe('what was read', () => {
  test('is recorded, every file of it, and what is kept', async () => {
    const record = await readRecord(join(folder, 'drafts', period))
    expect(Object.fromEntries(record!.inputs.map(({ path, kept }) => [path, kept]))).toEqual(inputsOf2025August)
    // a competitor's name is no name of a folder; one that nobody writes of has none
    expect(record!.files.flatMap(({ path }) => /^intake\/competitors\/([^/]+)/.exec(path)?.[1] ?? []).filter((name, i, all) => all.indexOf(name) === i)).toEqual(['1', 'brands.json'])
    expect(record).toMatchObject({ account: 'whole', period, seed: 7, prepared_by: 'Ana Reis', reviewed_by: 'Bo Lund', passed: true, program: { version: thisProgram().version, browser: await browser.version() } })
  })

  const inputs = Object.keys(inputsOf2025August)
  const sealing = (more: object = {}) => sealReview(requestOf(folder, period, { account: 'whole', inputs, program: thisProgram(), ...more }))
    .then(() => [], (error: unknown) => { if (error instanceof InputFault) return error.faults.map(({ code, message }) => `${code} ${message}`); throw error })

  test.each(inputs)('a seal is refused once %s has changed', async (path) => {
    const before = await readFile(join(folder, path))
    await appendFile(join(folder, path), ' ')
    const faults = await sealing()
    await writeFile(join(folder, path), before)
    expect(faults).toEqual([expect.stringMatching(/^inputs-changed /)])
    expect(faults[0]).toContain(`\`${path}\``)
  })

  test.each(['posts/late.csv', 'looks/sections/more.md', 'looks/charts/more.json', 'survey/more.csv'])('and once %s, which a build would read, has come', async (path) => {
    await cp(join(folder, { csv: path.startsWith('posts') ? 'posts/posts.csv' : 'survey/waves.csv', md: 'looks/sections/own.md', json: 'looks/charts/months.json' }[path.split('.')[1]]!), join(folder, path))
    const { code, out } = await runCommand('seal', folder, '--period', period, '--json')
    await rm(join(folder, path))
    expect([code, JSON.parse(out)]).toMatchObject([1, { ok: false, seal: null, faults: [{ code: 'inputs-changed', message: expect.stringContaining(`\`${path}\``) as string }] }])
  })

  test('so is a seal of another period or account, by the record', async () => {
    await cp(join(folder, 'drafts', period), join(folder, 'drafts/2025-07'), { recursive: true })
    expect(await sealing({ period: '2025-07' })).toEqual([expect.stringMatching(/^draft-of-another /)])
    expect(await sealing({ account: 'other' })).toEqual([expect.stringMatching(/^draft-of-another /)])
    await rm(join(folder, 'drafts/2025-07'), { recursive: true })
  })

  test('a note of another month is no matter of this one', async () => {
    await appendFile(join(folder, 'notes/2025-07.md'), '\nMore.\n')
    const { code, out } = await runCommand('seal', folder, '--period', period, '--json')
    expect([code, JSON.parse(out)]).toMatchObject([0, { ok: true, faults: [], seal: { account: 'whole', period, name: period, revision: 1, sequence: 1, prepared_by: 'Ana Reis' } }])
  })
})

describe('a sealed review', () => {
  test('holds what it was made from, and nothing of a person', async () => {
    const paths = await filesOf(join(folder, 'archive', period))
    const kept = Object.entries(inputsOf2025August).filter(([, isKept]) => isKept).map(([path]) => `account/${path}`)
    expect(paths).toEqual(expect.arrayContaining([...kept, 'intake/facts.json', 'intake/cells.parquet', 'intake/segments.parquet', 'review.html', 'review.pdf', 'findings.json', 'manifest.json', 'tables/opinion.csv']))
    for (const path of paths) {
      const bytes = await readFile(join(folder, 'archive', period, path))
      expect(bytes.includes('words that only its author has written') || bytes.includes('author 17'), path).toBe(false)
    }
  })

  test('made again from its own folder, is the same to the byte, by the command', async () => {
    const alone = await copyOfArchive('alone')
    const { code, out } = await runCommand('verify', alone, '--rebuild', '--json')
    expect([code, JSON.parse(out)]).toMatchObject([0, { ok: true, faults: [], seals: [{ name: period, sound: true }], rebuilt: [{ name: period, made_otherwise: [], identical: true, printed: true, differences: [], files_that_differ: [] }] }])
    expect((JSON.parse(out) as { rebuilt: { values: number; files_compared: number }[] }).rebuilt[0]).toMatchObject({ values: expect.toSatisfy((n: number) => n > 2000) as number, files_compared: expect.toSatisfy((n: number) => n > 20) as number })
  }, 240_000)

  test('whose tables were changed, and all hashes with them, is found when it is made again', async () => {
    const forged = await forge('cells', changeCells)
    expect((await verifyArchive(join(forged, 'archive'))).faults).toEqual([])
    const { faults, findings, files } = await rebuilt(forged)
    expect(faults[0]).toMatchObject({ code: 'rebuild-differs', place: expect.stringContaining(`archive/${period}/findings.json `) as string })
    expect(faults.map(({ place }) => place)).toContain(`archive/${period}/review.html`)
    // raw averages and what follows from them: opinion itself rests on the labels, which the audit corrects
    expect(findings!.differences.length).toBeGreaterThan(20)
    expect(files).toContain('tables/opinion.csv')
  }, 120_000)

  test('of another program: differences are told, and are no fault', async () => {
    const forged = await forge('other-program', async (seal) => ({ ...await changeCells(seal), version: '0.0.9' }))
    const { code, out } = await runCommand('verify', forged, '--rebuild')
    expect(code).toBe(0)
    expect(out).toMatch(/2025-08: made again, with differences \(made with another version\): \d+ of \d+ values, most of all .+ was sealed, .+ now/)
  }, 120_000)

  test('whose page alone was changed is a fault; whose PDF another browser printed is not', async () => {
    const page = await forge('page', async (seal) => { await appendFile(join(seal, 'review.html'), '<!-- -->'); return {} })
    expect((await rebuilt(page)).faults.map(({ place }) => place)).toEqual([`archive/${period}/review.html`])
    const printed = await forge('printed', async (seal) => { await appendFile(join(seal, 'review.pdf'), '%'); return { browser: 'Chrome/1.0' } })
    expect(await rebuilt(printed)).toMatchObject({ faults: [], otherwise: ['browser'], files: ['review.pdf'] })
    const same = await forge('same-browser', async (seal) => { await appendFile(join(seal, 'review.pdf'), '%'); return {} })
    expect((await rebuilt(same)).faults.map(({ place }) => place)).toEqual([`archive/${period}/review.pdf`])
  }, 240_000)

  test.each([
    ['without a table', (seal: string) => rm(join(seal, 'intake/pull.parquet')), 'rebuild-failed'],
    ['with facts of another make', (seal: string) => writeFile(join(seal, 'intake/facts.json'), '{"factors":[]}'), 'rebuild-failed'],
    ['with a survey that can’t be read', (seal: string) => writeFile(join(seal, 'account/survey/waves.csv'), 'nothing\n'), 'input-columns'],
  ] as const)('%s can’t be made again, and that is a fault', async (name, spoil, code) => {
    const { faults, findings } = await rebuilt(await forge(name.replaceAll(' ', '-'), async (seal) => { await spoil(seal); return {} }))
    expect([findings, faults[0]]).toMatchObject([null, { code, place: expect.stringMatching(/^archive\/2025-08/) as string }])
  })
})

test('an account without an archive: exit code 1; without a browser, everything but the PDF is compared', async () => {
  await mkdir(join(folder, 'empty'))
  expect(JSON.parse((await runCommand('verify', join(folder, 'empty'), '--json')).out)).toMatchObject({ ok: false, faults: [{ code: 'archive-empty' }], rebuilt: null })
  const archive = await readArchive(join(folder, 'archive'))
  const [seal] = sealedInOrder(archive)
  expect(await rebuildSeal(thisProgram(), seal, { archive, browser: null, progress: silent })).toMatchObject({ faults: [], printed: false, files: [], otherwise: [] })
}, 120_000)

async function copyOfArchive(name: string): Promise<string> {
  const copy = join(folder, 'copies', name)
  await cp(join(folder, 'archive'), join(copy, 'archive'), { recursive: true })
  return copy
}

async function rebuilt(account: string): Promise<Rebuilt> {
  const archive = await readArchive(join(account, 'archive'))
  const [seal] = sealedInOrder(archive)
  return rebuildSeal(thisProgram(), seal, { archive, browser: Promise.resolve(browser), progress: silent })
}

/** A copy of the archive whose only seal was changed by somebody who mends every hash: nothing but making it again can tell. */
async function forge(name: string, change: (seal: string) => Promise<Partial<Manifest['program']>>): Promise<string> {
  const copy = await copyOfArchive(name)
  const seal = join(copy, 'archive', period)
  const program = await change(seal)
  const manifest = manifestSchema.parse(JSON.parse(await readFile(join(seal, manifestName), 'utf8')))
  const files = await Promise.all((await filesOf(seal)).filter((path) => path !== manifestName).map(async (path) => {
    const bytes = await readFile(join(seal, path))
    return { path, bytes: bytes.length, sha256: sha256Of(bytes) }
  }))
  const written = writtenManifest({ ...manifest, files, program: { ...manifest.program, ...program } })
  await writeFile(join(seal, manifestName), written)
  await writeFile(join(copy, 'archive', chainEndName), JSON.stringify({ schema: 'tareline-chain-end/1', sequence: 1, manifest: sha256Of(written) }))
  return copy
}

/** One cell of the last month less bad than it was. */
async function changeCells(seal: string): Promise<object> {
  const cells = await readParquet(join(seal, 'intake'), 'cells')
  const mean = Float64Array.from(cells.columns['mean'].values)
  mean[mean.length - 3] = mean[mean.length - 3] > 0 ? -0.5 : 0.5
  await writeParquet(join(seal, 'intake'), [{ ...cells, columns: { ...cells.columns, mean: { kind: 'real', values: mean } } }])
  return {}
}
