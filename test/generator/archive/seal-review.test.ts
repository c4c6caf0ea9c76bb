import { appendFile, readdir, readFile, rm, writeFile } from 'node:fs/promises'
import { join } from 'node:path'
import { afterEach, beforeEach, expect, test } from 'vitest'
import { recordName, type BuildRecord } from '../../../generator/archive/record.ts'
import { sealReview, type SealRequest } from '../../../generator/archive/seal-review.ts'
import { verifyArchive } from '../../../generator/archive/verify-archive.ts'
import { InputFault } from '../../../generator/faults/fault.ts'
import { countingDisk, dyingDisk } from '../../support/dying-disk.ts'
import { fakeAccount, fakeDraft, program, requestOf } from './fake-account.ts'

let folder: string
let remove: () => Promise<void>
beforeEach(async () => { ({ folder, remove } = await fakeAccount()) })
afterEach(() => remove())

const archive = () => join(folder, 'archive')
const codes = (work: Promise<unknown>): Promise<readonly string[]> => work.then(() => [], (error: unknown) => {
  if (error instanceof InputFault) return error.faults.map(({ code }) => code)
  throw error
})

test('a seal holds the draft, the inputs without the mentions, and a manifest of every file', async () => {
  await fakeDraft(folder, '2026-10')
  const { manifest, folder: sealed } = await sealReview(requestOf(folder, '2026-10'))
  expect(manifest.files.map(({ path }) => path)).toEqual(['account/account.yaml', 'account/survey/waves.csv', 'findings.json', 'review.html', 'review.pdf', 'tables/opinion.csv'])
  expect(manifest).toMatchObject({ period: '2026-10', revision: 1, sequence: 1, previous: null, reason: null, prepared_by: 'Ana', reviewed_by: 'Bo', sealed_at: '2026-12-01T09:00:00.000Z' })
  expect(await readFile(join(sealed, 'review.html'), 'utf8')).toBe('<p>first of 2026-10</p>')
  expect(await verifyArchive(archive())).toMatchObject({ faults: [], endBehind: false })
})

test('seals form a chain; a revision stands beside the first, which is not touched', async () => {
  await fakeDraft(folder, '2026-09')
  await sealReview(requestOf(folder, '2026-09'))
  await fakeDraft(folder, '2026-10')
  await sealReview(requestOf(folder, '2026-10'))
  const before = await readFile(join(archive(), '2026-09', 'review.html'), 'utf8')
  await fakeDraft(folder, '2026-09', 'second')
  const revised = await sealReview(requestOf(folder, '2026-09', { reason: 'late posts' }))
  expect(revised).toMatchObject({ name: '2026-09.r2', manifest: { revision: 2, sequence: 3, reason: 'late posts' } })
  expect(await readFile(join(archive(), '2026-09', 'review.html'), 'utf8')).toBe(before)
  expect((await readdir(archive())).sort()).toEqual(['2026-09', '2026-09.r2', '2026-10', 'chain-end.json'])
  expect((await verifyArchive(archive())).faults).toEqual([])
})

/** What is done to a draft that stands ready, and the refusal it earns. */
const refusals: readonly (readonly [string, (draft: string) => Promise<unknown>, Partial<SealRequest>, readonly string[]])[] = [
  ['no draft', (draft) => rm(draft, { recursive: true }), {}, ['draft-absent']],
  ['no record', (draft) => rm(join(draft, recordName)), {}, ['draft-unrecorded']],
  ['a record of another make', (draft) => writeFile(join(draft, recordName), '{"schema":1}'), {}, ['draft-unrecorded']],
  ['a page that was touched', (draft) => appendFile(join(draft, 'review.html'), ' '), {}, ['draft-changed']],
  ['a file beside', (draft) => writeFile(join(draft, 'tables', 'mine.csv'), ''), {}, ['draft-changed']],
  ['a survey that changed since', () => appendFile(join(folder, 'survey', 'waves.csv'), '2,0.5\n'), {}, ['inputs-changed']],
  ['posts that changed since', () => appendFile(join(folder, 'posts', 'posts.csv'), '2,x\n'), {}, ['inputs-changed']],
  ['an input that is gone', () => rm(join(folder, 'account.yaml')), {}, ['inputs-changed']],
  ['another program', () => Promise.resolve(), { program: { ...program, version: '2.0.0' } }, ['program-changed']],
  ['another program under the same version', () => Promise.resolve(), { program: { ...program, code: 'c'.repeat(64) } }, ['program-changed']],
  ['an input that has come since', () => Promise.resolve(), { inputs: ['account.yaml', 'posts/late.csv'] }, ['inputs-changed']],
  ['a draft of another account', () => Promise.resolve(), { account: 'other' }, ['draft-of-another']],
  ['nothing to revise', () => Promise.resolve(), { reason: 'because' }, ['nothing-to-revise']],
]
test.each(refusals)('%s: refused, and the archive is as it was', async (_, spoil, request, expected) => {
  const draft = await fakeDraft(folder, '2026-10')
  await spoil(draft)
  expect(await codes(sealReview(requestOf(folder, '2026-10', request)))).toEqual(expected)
  expect(await readdir(archive()).catch(() => [])).toEqual([])
})

const records: readonly (readonly [string, Partial<BuildRecord>, readonly string[]])[] = [
  ['a fit that failed its checks', { passed: false }, ['checks-failed']],
  ['nobody named', { prepared_by: null, reviewed_by: null }, ['people-missing', 'people-missing']],
  ['one person for both', { reviewed_by: 'Ana' }, ['same-person']],
  ['one person for both, typed otherwise', { reviewed_by: ' aNA' }, ['same-person']],
]
test.each(records)('%s: refused', async (_, changes, expected) => {
  await fakeDraft(folder, '2026-10', 'first', changes)
  expect(await codes(sealReview(requestOf(folder, '2026-10')))).toEqual(expected)
})

test('one person may do both where the account allows it', async () => {
  await fakeDraft(folder, '2026-10', 'first', { reviewed_by: 'Ana' })
  expect(await codes(sealReview(requestOf(folder, '2026-10', { onePerson: true })))).toEqual([])
})

test('a sealed period is not sealed again without a reason, nor a new one into an archive that was tampered with', async () => {
  await fakeDraft(folder, '2026-10')
  await sealReview(requestOf(folder, '2026-10'))
  expect(await codes(sealReview(requestOf(folder, '2026-10')))).toEqual(['sealed-already'])
  await appendFile(join(archive(), '2026-10', 'findings.json'), ' ')
  await fakeDraft(folder, '2026-11')
  expect(await codes(sealReview(requestOf(folder, '2026-11')))).toEqual(['archive-unsound', 'sealed-file-changed'])
})

test.each(['before', 'half', 'after', 'full'] as const)('whenever the disk dies (%s), the archive is the old one or the new one, and the next seal goes through', async (how) => {
  await fakeDraft(folder, '2026-09')
  await sealReview(requestOf(folder, '2026-09'))
  await fakeDraft(folder, '2026-10')
  const { disk, calls: counted } = countingDisk()
  await sealReview(requestOf(folder, '2026-10', { disk }))
  const calls = counted()
  expect(calls).toBeGreaterThan(12)
  const seen = new Set<string>()
  for (let at = 1; at <= calls; at++) {
    await rm(join(archive(), '2026-10'), { recursive: true, force: true })
    await rm(join(archive(), '2026-10.r2'), { recursive: true, force: true })
    await rm(join(archive(), 'chain-end.json'))
    const [first] = (await verifyArchive(archive())).archive.seals
    await writeFile(join(archive(), 'chain-end.json'), JSON.stringify({ schema: 'tareline-chain-end/1', sequence: 1, manifest: first.hash }))
    await fakeDraft(folder, '2026-10')
    await expect(sealReview(requestOf(folder, '2026-10', { disk: dyingDisk(at, how) }))).rejects.toThrow(/the disk (died|is full)/)
    const { faults, archive: found } = await verifyArchive(archive())
    expect(faults).toEqual([])
    const names = found.seals.map(({ name }) => name).join(' ')
    seen.add(names)
    expect(['2026-09', '2026-09 2026-10']).toContain(names)
    // a draft that was sealed looks back at an archive without itself
    if (names !== '2026-09') await fakeDraft(folder, '2026-10')
    const again = await sealReview(requestOf(folder, '2026-10', names === '2026-09' ? {} : { reason: 'sealed in a crash' }))
    expect(again.manifest.sequence).toBe(names === '2026-09' ? 2 : 3)
    expect(await verifyArchive(archive())).toMatchObject({ faults: [], endBehind: false })
  }
  expect(seen.size).toBe(2)
})
