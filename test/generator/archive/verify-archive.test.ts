import { cp, readFile, rename, rm, symlink, writeFile } from 'node:fs/promises'
import { join } from 'node:path'
import fc from 'fast-check'
import { afterEach, beforeEach, describe, expect, test } from 'vitest'
import { manifestSchema, sha256Of, writtenManifest, type Manifest } from '../../../generator/archive/manifest.ts'
import { sealReview } from '../../../generator/archive/seal-review.ts'
import { filesOf, verifyArchive } from '../../../generator/archive/verify-archive.ts'
import { fakeAccount, fakeDraft, requestOf } from './fake-account.ts'

let folder: string
let archive: string
let remove: () => Promise<void>
beforeEach(async () => {
  ({ folder, remove } = await fakeAccount())
  archive = join(folder, 'archive')
  for (const period of ['2026-08', '2026-09', '2026-10']) {
    await fakeDraft(folder, period)
    await sealReview(requestOf(folder, period))
  }
})
afterEach(() => remove())

const found = async () => (await verifyArchive(archive)).faults.map(({ code, place }) => `${code} ${place}`)

async function editManifest(name: string, edit: (manifest: Manifest) => Manifest): Promise<void> {
  const file = join(archive, name, 'manifest.json')
  await writeFile(file, writtenManifest(edit(manifestSchema.parse(JSON.parse(await readFile(file, 'utf8'))))))
}

test('an archive as it was sealed has no fault', async () => { expect(await found()).toEqual([]) })

test('a flipped bit anywhere in it is found, at the file it is in', async () => {
  const files = await filesOf(archive)
  await fc.assert(fc.asyncProperty(fc.constantFrom(...files), fc.nat(), fc.nat({ max: 7 }), async (path, where, bit) => {
    const whole = await readFile(join(archive, path))
    const changed = Buffer.from(whole)
    changed[where % whole.length] ^= 1 << bit
    await writeFile(join(archive, path), changed)
    const faults = await found()
    await writeFile(join(archive, path), whole)
    expect(faults.length).toBeGreaterThan(0)
    const owner = path === 'chain-end.json' ? 'archive' : `archive/${path.split('/')[0]}`
    // a manifest that still reads betrays itself by the seal after it, or by the end of the chain
    if (!path.endsWith('manifest.json')) expect(faults.join()).toContain(path === 'chain-end.json' ? owner : `archive/${path}`)
  }), { numRuns: 120 })
  expect(await found()).toEqual([])
})

describe('each of these is found and named', () => {
  test('a removed file', async () => {
    await rm(join(archive, '2026-09', 'tables', 'opinion.csv'))
    expect(await found()).toEqual(['sealed-file-absent archive/2026-09/tables/opinion.csv'])
  })
  test('an added file, or a link', async () => {
    await writeFile(join(archive, '2026-09', 'tables', 'more.csv'), '')
    await symlink('/etc', join(archive, '2026-10', 'link'))
    expect(await found()).toEqual(['sealed-file-added archive/2026-09/tables/more.csv', 'sealed-file-added archive/2026-10/link'])
  })
  test('two files swapped', async () => {
    const [one, other] = ['review.html', 'review.pdf'].map((name) => join(archive, '2026-09', name))
    await rename(one, `${one}.x`)
    await rename(other, one)
    await rename(`${one}.x`, other)
    expect(await found()).toEqual(['sealed-file-changed archive/2026-09/review.html', 'sealed-file-changed archive/2026-09/review.pdf'])
  })
  test('two seals swapped', async () => {
    const [one, other] = ['2026-08', '2026-09'].map((name) => join(archive, name))
    await rename(one, join(archive, 'x'))
    await rename(other, one)
    await rename(join(archive, 'x'), other)
    expect((await found()).filter((fault) => fault.startsWith('manifest-unreadable'))).toHaveLength(2)
  })
  test('a seal removed from the middle', async () => {
    await rm(join(archive, '2026-09'), { recursive: true })
    expect(await found()).toEqual(['chain-gap archive/2026-10'])
  })
  test('the last two seals removed', async () => {
    await rm(join(archive, '2026-09'), { recursive: true })
    await rm(join(archive, '2026-10'), { recursive: true })
    expect(await found()).toEqual(['chain-cut archive'])
  })
  test('all seals removed', async () => {
    for (const name of ['2026-08', '2026-09', '2026-10']) await rm(join(archive, name), { recursive: true })
    expect(await found()).toEqual(['chain-cut archive'])
  })
  test('a seal copied under another name', async () => {
    await cp(join(archive, '2026-09'), join(archive, '2026-07'), { recursive: true })
    expect(await found()).toEqual(['manifest-unreadable archive/2026-07/manifest.json'])
  })
  test('a file edited together with its manifest: the hashes are right, the chain is not', async () => {
    await writeFile(join(archive, '2026-09', 'review.html'), 'better news')
    await editManifest('2026-09', (manifest) => ({ ...manifest, files: manifest.files.map((file) => (file.path === 'review.html' ? { path: file.path, bytes: 11, sha256: sha256Of('better news') } : file)) }))
    expect(await found()).toEqual(['chain-broken archive/2026-10'])
  })
  test('so in the last seal', async () => {
    await editManifest('2026-10', (manifest) => ({ ...manifest, reviewed_by: 'Cy' }))
    expect(await found()).toEqual(['chain-end-differs archive/2026-10/manifest.json'])
  })
  test('the end of the chain taken away, or made illegible', async () => {
    await rm(join(archive, 'chain-end.json'))
    expect(await found()).toEqual(['chain-end-differs archive/2026-10/manifest.json'])
    await writeFile(join(archive, 'chain-end.json'), 'nothing')
    expect(await found()).toEqual(['chain-end-unreadable archive/chain-end.json'])
  })
  test('something that is no seal', async () => {
    await writeFile(join(archive, 'notes.txt'), '')
    expect(await found()).toEqual(['archive-entry-unknown archive/notes.txt'])
  })
})

test('the last entry of the chain missing after a crash is told, and is no fault', async () => {
  const [, second] = (await verifyArchive(archive)).archive.seals
  await writeFile(join(archive, 'chain-end.json'), JSON.stringify({ schema: 'tareline-chain-end/1', sequence: 2, manifest: second.hash }))
  expect(await verifyArchive(archive)).toMatchObject({ faults: [], endBehind: true })
})
