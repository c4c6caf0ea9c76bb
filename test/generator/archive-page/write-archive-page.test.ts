import { appendFile, mkdir, readdir, readFile, rm, truncate, writeFile } from 'node:fs/promises'
import { join } from 'node:path'
import { afterEach, beforeEach, expect, test } from 'vitest'
import { theDisk, type Disk } from '../../../generator/archive/disk.ts'
import { verifyArchive } from '../../../generator/archive/verify-archive.ts'
import { writeArchivePage } from '../../../generator/archive-page/write-archive-page.ts'
import { templatesFolder } from '../../support/house-words.ts'
import { inventedArchive, looksIn } from './invented-archive.ts'

const looks = await looksIn()
let folder: string
let remove: () => Promise<void>
beforeEach(async () => { ({ folder, remove } = await inventedArchive([{ period: '2026-09', level: 1 }, { period: '2026-10', level: 2 }])) })
afterEach(() => remove())

const write = (disk: Disk = theDisk) => writeArchivePage(folder, templatesFolder, looks, disk)
const sound = async () => (await verifyArchive(folder)).faults.length === 0
const page = () => readFile(join(folder, 'index.html'), 'utf8')

test('the page is put in the place of the one before, and nothing is left beside it', async () => {
  await writeFile(join(folder, 'index.html'), 'old')
  await write()
  expect((await page()).startsWith('<!doctype html>')).toBe(true)
  expect((await readdir(folder)).sort()).toEqual(['2026-09', '2026-10', 'chain-end.json', 'index.html'])
})

test('the archive verifies without the page, with another in its place, and with one half-written beside it', async () => {
  await write()
  expect(await sound()).toBe(true)
  await appendFile(join(folder, 'index.html'), 'changed')
  expect(await sound()).toBe(true)
  await rm(join(folder, 'index.html'))
  await writeFile(join(folder, '.unfinished-index.html'), '<!doc')
  const { faults, archive } = await verifyArchive(folder)
  expect([faults, archive.seals.map(({ name }) => name)]).toEqual([[], ['2026-09', '2026-10']])
})

test('it can fail: any other page there is told', async () => {
  await writeFile(join(folder, 'start.html'), '')
  expect(await sound()).toBe(false)
})

/** A disk that dies at its n-th call, half-way through what it writes, or right after it. */
function dyingDisk(at: number): Disk {
  let calls = 0
  const dying = async (work: () => Promise<void>, written?: string): Promise<void> => {
    calls++
    await work()
    if (calls < at) return
    if (written !== undefined) await truncate(written, 3)
    throw new Error('the disk died')
  }
  return { ...theDisk, write: (file, content) => dying(() => theDisk.write(file, content), file), rename: (from, to) => dying(() => theDisk.rename(from, to)), remove: (path) => dying(() => theDisk.remove(path)) }
}

test('whenever the disk dies, the page is the old one or the new one, the archive is sound, and the next one goes through', async () => {
  await write()
  const whole = await page()
  for (const at of [1, 2, 3]) {
    await writeFile(join(folder, 'index.html'), 'old')
    await expect(write(dyingDisk(at))).rejects.toThrow('the disk died')
    expect(await page() === (at === 3 ? whole : 'old')).toBe(true)
    expect(await sound()).toBe(true)
    await write()
    expect(await page() === whole).toBe(true)
  }
})

test('what stands in its place and is no file is left alone, and told', async () => {
  await mkdir(join(folder, 'index.html', 'mine'), { recursive: true })
  await expect(write()).rejects.toThrow(/EISDIR|ENOTEMPTY|EEXIST|EPERM/)
  expect(await readdir(join(folder, 'index.html'))).toEqual(['mine'])
})
