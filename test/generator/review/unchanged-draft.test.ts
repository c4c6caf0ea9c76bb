import { appendFile, cp, mkdir, mkdtemp, readFile, rename, rm, writeFile } from 'node:fs/promises'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { afterAll, beforeAll, beforeEach, describe, expect, test } from 'vitest'
import { readAccount } from '../../../generator/account/read-account.ts'
import { fingerprint, recordName, type BuildRecord } from '../../../generator/archive/record.ts'
import { InputFault } from '../../../generator/faults/fault.ts'
import { thisProgram } from '../../../generator/program/program.ts'
import { buildReview } from '../../../generator/review/build-review.ts'
import { silent } from '../../../generator/review/stages.ts'
import { unchangedDraft, type DraftWish } from '../../../generator/review/unchanged-draft.ts'

const program = thisProgram()
let built: string
let folder: string
beforeAll(async () => {
  built = await mkdtemp(join(tmpdir(), 'unchanged-'))
  await cp(join(import.meta.dirname, '../intake/fixtures/open-cells'), built, { recursive: true, filter: (path) => !/cache|drafts/.test(path) })
  await mkdir(join(built, 'notes'))
  await appendFile(join(built, 'account.yaml'), 'notes: notes\n')
  await writeFile(join(built, 'notes/2025-07.md'), 'A quiet month.\n')
  for (const period of ['2025-07', '2025-08']) await buildReview(program, await readAccount(built), { period, seed: 1, browser: null, progress: silent })
  folder = `${built}-copy`
})
beforeEach(async () => {
  await rm(folder, { recursive: true, force: true })
  await cp(built, folder, { recursive: true })
})
afterAll(() => Promise.all([built, folder].map((each) => rm(each, { recursive: true, force: true }))))

const draft = (period = '2025-08') => join(folder, 'drafts', period)
const wish: DraftWish = { seed: 1, browser: null }

async function found(asked: Partial<DraftWish> = {}, made = program): Promise<string | null> {
  const standing = await unchangedDraft(made, await readAccount(folder), { ...wish, ...asked })
  expect(standing?.folder ?? draft(standing?.findings.period.name)).toBe(draft(standing?.findings.period.name))
  return standing?.findings.period.name ?? null
}

async function changeRecord(period: string, change: (record: BuildRecord) => Partial<BuildRecord>): Promise<void> {
  const file = join(draft(period), recordName)
  const record = JSON.parse(await readFile(file, 'utf8')) as BuildRecord
  await writeFile(file, JSON.stringify({ ...record, ...change(record) }))
}

test('a record says whether its period is the last whole one, also where it was asked for by name', async () => {
  const ofPeriod = async (period: string) => (JSON.parse(await readFile(join(draft(period), recordName), 'utf8')) as BuildRecord).default_period
  expect([await ofPeriod('2025-07'), await ofPeriod('2025-08')]).toEqual([false, true])
})

test('a draft that nothing has changed since is found: that of the last whole period, or of the one asked for', async () => {
  expect(await found()).toBe('2025-08')
  expect(await found({ period: '2025-07' })).toBe('2025-07')
  expect(await found({ period: '2025-06' })).toBeNull()
  expect(await found({ period: '../drafts/2025-08' })).toBeNull()
})

describe('another would be built, and none is found:', () => {
  test.each<readonly [string, () => Promise<unknown>]>([
    ['an input has changed', () => appendFile(join(folder, 'account.yaml'), '# later\n')],
    ['an input has changed and kept its length', async () => writeFile(join(folder, 'cells/cells.csv'), (await readFile(join(folder, 'cells/cells.csv'), 'utf8')).replace(/\d\n$/, (end) => `${(Number(end[0]) + 1) % 10}\n`))],
    ['an input has come', () => cp(join(folder, 'cells/cells.csv'), join(folder, 'cells/later.csv'))],
    ['the period’s note has come', () => writeFile(join(folder, 'notes/2025-08.md'), 'Later.\n')],
    ['the draft was touched', () => appendFile(join(draft(), 'review.html'), ' ')],
    ['a file of the draft is gone', () => rm(join(draft(), 'findings.json'))],
    ['a file beside', () => writeFile(join(draft(), 'tables/mine.csv'), '')],
    ['its record is gone', () => rm(join(draft(), recordName))],
    ['its record is none', () => writeFile(join(draft(), recordName), '{')],
    ['another seed', () => changeRecord('2025-08', () => ({ seed: 2 }))],
    ['another account', () => changeRecord('2025-08', () => ({ account: 'other' }))],
    ['something was sealed since, or is no more', () => changeRecord('2025-08', () => ({ past: 'a'.repeat(64) }))],
    ['it was not the last whole period', () => changeRecord('2025-08', () => ({ default_period: false }))],
    ['another model', () => changeRecord('2025-08', ({ program: made }) => ({ program: { ...made, model: 'b'.repeat(64) } }))],
    ['other code', () => changeRecord('2025-08', ({ program: made }) => ({ program: { ...made, code: 'b'.repeat(64) } }))],
    ['another Node', () => changeRecord('2025-08', ({ program: made }) => ({ program: { ...made, runtime: 'node 1' } }))],
  ])('%s', async (_, spoil) => {
    await spoil()
    expect(await found()).toBeNull()
  })
})

test('a note of another period changes nothing', async () => {
  await appendFile(join(folder, 'notes/2025-07.md'), 'Later.\n')
  expect(await found()).toBe('2025-08')
  expect(await found({ period: '2025-07' })).toBeNull()
})

test('where a PDF is asked for, it has to be there, by the browser that would print it', async () => {
  expect(await found({ browser: 'Any/1.0' })).toBeNull()
  await writeFile(join(draft(), 'review.pdf'), '%PDF')
  const pdf = await fingerprint(draft(), 'review.pdf')
  await changeRecord('2025-08', ({ program: made, files }) => ({ program: { ...made, browser: 'Any/1.0' }, files: [...files, pdf] }))
  expect(await found({ browser: 'Any/1.0' })).toBe('2025-08')
  expect(await found({ browser: 'Any/2.0' })).toBeNull()
  expect(await found()).toBe('2025-08')
})

test('a draft that a killed build left aside is put back and found', async () => {
  await rename(draft(), join(folder, 'drafts/.unfinished-abcdef-2025-08-before'))
  expect(await found()).toBe('2025-08')
})

test('an archive that is not as it was sealed is told, as a build would', async () => {
  await mkdir(join(folder, 'archive/2025-07'), { recursive: true })
  await expect(found()).rejects.toThrow(InputFault)
})
