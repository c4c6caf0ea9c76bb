import { spawn, spawnSync } from 'node:child_process'
import { watch } from 'node:fs'
import { appendFile, cp, mkdir, mkdtemp, readdir, readFile, rm, writeFile } from 'node:fs/promises'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { afterEach, beforeAll, beforeEach, expect, test } from 'vitest'
import { flattenIntake, type FlatIntake } from '../../../generator/archive/flatten-intake.ts'
import { changedSince, readRecord } from '../../../generator/archive/record.ts'
import { filesOf } from '../../../generator/archive/verify-archive.ts'
import { openDraft, type DraftContents } from '../../../generator/review/write-draft.ts'
import { blankFindings } from '../../../model/findings/blank.ts'
import { createGenerator } from '../../../model/random/generator.ts'
import { countingDisk, dyingDisk } from '../../support/dying-disk.ts'
import { simulateCells } from '../../support/simulate-cells.ts'

const root = join(import.meta.dirname, '../../..')
const period = '2025-08'
let place: string
let intake: FlatIntake
beforeAll(() => {
  const sigmas = { mu: 0.01, venueDrift: [0.01], venue: 0.1, topic: 0.1, poster: 0.1, tau: 0.1 }
  intake = flattenIntake(simulateCells({ steps: 6, venues: 1, topics: 1, posters: 1, mentionsPerStep: 20, sigmas }, createGenerator(1, 0)).tables)
})
beforeEach(async () => { place = await mkdtemp(join(tmpdir(), 'crash-')) })
afterEach(() => rm(place, { recursive: true, force: true }))

function contents(text: string): DraftContents {
  const bytes = new TextEncoder().encode(text)
  return {
    findings: blankFindings, html: `<p>${text}</p>`, pdf: bytes, data: [{ path: 'findings.json', mime: 'application/json', bytes }, { path: 'tables/opinion.csv', mime: 'text/csv', bytes }], intake, competitors: null,
    record: {
      schema: 'tareline-record/1', account: 'any', period, program: { version: '1', model: 'a'.repeat(64), code: 'b'.repeat(64), runtime: 'node', browser: null }, seed: 1,
      prepared_by: null, reviewed_by: null, passed: true, inputs: [], default_period: true, past: null,
    },
  }
}

/** Text of the draft that stands there, every file as its record says; null where there is none. */
async function standing(drafts: string): Promise<string | null> {
  const draft = join(drafts, period)
  if (!(await readdir(drafts)).includes(period)) return null
  const record = (await readRecord(draft))!
  expect(await changedSince(draft, record.files)).toEqual([])
  expect((await filesOf(draft)).length).toBe(record.files.length + 1)
  return readFile(join(draft, 'review.html'), 'utf8')
}

test.each(['before', 'half', 'after', 'full'] as const)('whenever the disk dies (%s) as a draft is finished, the old one or the new one stands there, and the next build goes through', async (how) => {
  const drafts = join(place, 'drafts')
  const draft = join(drafts, period)
  const { disk, calls } = countingDisk()
  await (await openDraft(drafts)).finish(draft, contents('old'))
  await (await openDraft(drafts, disk)).finish(draft, contents('old'))
  expect(calls()).toBeGreaterThan(8)
  const seen = new Set<string>()
  for (let at = 1; at <= calls(); at++) {
    const dying = await openDraft(drafts, dyingDisk(at, how))
    const end = await dying.finish(draft, contents('new')).then(() => null, (error: unknown) => error)
    // a full disk can still remove: nothing is lost by an old draft that goes
    if (how !== 'full' || at < calls()) expect(end).toBeInstanceOf(Error)
    // whoever is killed abandons nothing; the next command looks after what stands aside
    const next = await openDraft(drafts)
    const found = await standing(drafts)
    seen.add(found ?? 'none')
    expect(['<p>old</p>', '<p>new</p>']).toContain(found)
    await next.finish(draft, contents('old'))
    expect(await standing(drafts)).toBe('<p>old</p>')
  }
  expect([...seen].sort()).toEqual(['<p>new</p>', '<p>old</p>'])
}, 60_000)

test('a draft that is abandoned for want of room leaves the old one in its place at once', async () => {
  const drafts = join(place, 'drafts')
  await (await openDraft(drafts)).finish(join(drafts, period), contents('old'))
  const { disk, calls } = countingDisk()
  await (await openDraft(drafts, disk)).finish(join(drafts, period), contents('old'))
  for (let at = 1; at < calls(); at++) {
    const full = await openDraft(drafts, dyingDisk(at, 'full'))
    await expect(full.finish(join(drafts, period), contents('new'))).rejects.toMatchObject({ fault: { code: 'draft-unwritable' } })
    await full.abandon()
    expect(await standing(drafts)).toBe('<p>old</p>')
    expect(await readdir(drafts)).toEqual([period])
  }
})

async function accountAt(folder: string): Promise<string> {
  await cp(join(root, 'test/generator/intake/fixtures/open-cells'), folder, { recursive: true, filter: (path) => !/cache|drafts/.test(path.slice(root.length)) })
  await appendFile(join(folder, 'account.yaml'), 'notes: notes\n')
  await mkdir(join(folder, 'notes'))
  return folder
}

/** Run the program's own `build` with a note that speaks of `run`; once it writes the draft's files it has so many ms to live. */
async function build(account: string, run: string, liveMs: number): Promise<{ readonly signal: NodeJS.Signals | null; readonly code: number | null; readonly err: string; readonly tookMs: number }> {
  await mkdir(join(account, 'drafts'), { recursive: true })
  await writeFile(join(account, 'notes', `${period}.md`), `This is the ${run} build.\n`)
  const child = spawn(process.execPath, ['--import', 'tsx', join(root, 'generator/cli/main.ts'), 'build', account, '--period', period, '--no-pdf', '--quiet'], { cwd: root, stdio: ['ignore', 'ignore', 'pipe'] })
  let err = ''
  child.stderr.on('data', (chunk: Buffer) => { err += String(chunk) })
  let began: number | undefined
  const watched = watch(join(account, 'drafts'), { recursive: true }, (_, name) => {
    if (began !== undefined || name === null || !name.includes('tables')) return
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

/** Which build the draft that stands there is of, whole. */
async function standingRun(account: string): Promise<string | undefined> {
  return /This is the (\w+) build/.exec(await standing(join(account, 'drafts')) ?? '')?.[1]
}

test('a build that is killed while it writes, whenever it is, leaves the old draft or the whole new one', async () => {
  const account = await accountAt(join(place, 'account'))
  const first = await build(account, 'first', Number.POSITIVE_INFINITY)
  expect(first).toMatchObject({ code: 0, signal: null, err: '' })
  const random = createGenerator(2027, 0)
  let before = 'first'
  let killed = 0
  for (const run of ['second', 'third', 'fourth']) {
    const { signal, code, err } = await build(account, run, random.uniform() * first.tookMs)
    if (signal === 'SIGKILL') killed++
    else expect([code, err]).toEqual([0, ''])
    await openDraft(join(account, 'drafts')).then((draft) => draft.abandon())
    const found = await standingRun(account)
    expect([before, run]).toContain(found)
    before = found!
  }
  expect(killed).toBeGreaterThan(0)
  expect(await build(account, 'last', Number.POSITIVE_INFINITY)).toMatchObject({ code: 0, err: '' })
  expect(await standingRun(account)).toBe('last')
}, 240_000)

/** A disk in memory of so many kilobytes; null where this user may mount none. */
async function smallDisk(kilobytes: number): Promise<{ readonly folder: string; readonly release: () => void } | null> {
  const folder = join(place, 'disk')
  await mkdir(folder)
  if (spawnSync('mount', ['-t', 'tmpfs', '-o', `size=${kilobytes}k`, 'tmpfs', folder]).status !== 0) return null
  return { folder, release: () => { spawnSync('umount', [folder]) } }
}

const mountable = spawnSync('sh', ['-c', 'd=$(mktemp -d) && mount -t tmpfs tmpfs "$d" && umount "$d"']).status === 0

test.skipIf(!mountable)('a disk that is really full: the build says so, and what was there stands', async () => {
  const disk = (await smallDisk(2600))!
  try {
    const account = await accountAt(join(disk.folder, 'account'))
    expect(await build(account, 'first', Number.POSITIVE_INFINITY)).toMatchObject({ code: 0, err: '' })
    spawnSync('sh', ['-c', `head -c 100M /dev/zero > ${join(disk.folder, 'filler')}`])
    const { code, err } = await build(account, 'second', Number.POSITIVE_INFINITY)
    expect([code, err]).toEqual([3, expect.stringMatching(/(draft|rejects)-unwritable/) as string])
    await rm(join(disk.folder, 'filler'))
    expect(await standingRun(account)).toBe('first')
    expect(await readdir(join(account, 'drafts'))).toEqual([period])
    expect(await build(account, 'third', Number.POSITIVE_INFINITY)).toMatchObject({ code: 0, err: '' })
    expect(await standingRun(account)).toBe('third')
  } finally {
    disk.release()
  }
}, 120_000)
