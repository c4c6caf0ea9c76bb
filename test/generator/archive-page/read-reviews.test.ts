import { appendFile, mkdir, rm, writeFile } from 'node:fs/promises'
import { join } from 'node:path'
import { afterEach, beforeEach, expect, test } from 'vitest'
import { sealedInOrder, readArchive } from '../../../generator/archive/read-archive.ts'
import { verifyArchive } from '../../../generator/archive/verify-archive.ts'
import { readReviews, type ListedReview } from '../../../generator/archive-page/read-reviews.ts'
import { fivePeriods, inventedArchive } from './invented-archive.ts'

let folder: string
let remove: () => Promise<void>
beforeEach(async () => { ({ folder, remove } = await inventedArchive(fivePeriods)) })
afterEach(() => remove())

const read = async (): Promise<ReadonlyMap<string, ListedReview>> => new Map((await readReviews(folder)).reviews.map((review) => [review.name, review]))

test('the invented archive is one that verifies: the tests stand on a real chain', async () => {
  expect(await verifyArchive(folder)).toMatchObject({ faults: [], endBehind: false })
})

test('every seal is there in the order of sealing, with the figures that were sealed', async () => {
  const { reviews, unreadable } = await readReviews(folder)
  expect(reviews.map(({ name }) => name)).toEqual(['2026-06', '2026-07', '2026-08', '2026-08.r2', '2026-09', '2026-08.r3', '2026-10'])
  expect(reviews.map(({ figures }) => typeof figures === 'string' ? figures : figures.opinion.period.mean)).toEqual(fivePeriods.map(({ level }) => level))
  expect(reviews.map(({ hash }) => hash)).toEqual(sealedInOrder(await readArchive(folder)).map(({ hash }) => hash))
  expect(unreadable).toEqual([])
})

test('figures that are not the sealed ones are not taken, though they could be read', async () => {
  await appendFile(join(folder, '2026-09', 'findings.json'), ' ')
  expect((await read()).get('2026-09')?.figures).toBe('changed')
})

test('a file that is gone, and one whose form is unknown, are told apart', async () => {
  await rm(join(folder, '2026-09', 'findings.json'))
  const other = await inventedArchive([{ period: '2026-06', level: 0, findings: '{"schema":"tareline-findings/7"}' }])
  expect((await read()).get('2026-09')?.figures).toBe('missing')
  expect((await readReviews(other.folder)).reviews[0]?.figures).toBe('unknown')
  await other.remove()
})

test('a folder without a manifest that can be read is named; what an interrupted seal left is no seal', async () => {
  await writeFile(join(folder, '2026-07', 'manifest.json'), '{}')
  await mkdir(join(folder, '.unfinished-2026-11'))
  await writeFile(join(folder, '.unfinished-index.html'), '<p>')
  const { reviews, unreadable } = await readReviews(folder)
  expect(unreadable).toEqual(['2026-07'])
  expect(reviews).toHaveLength(6)
})
