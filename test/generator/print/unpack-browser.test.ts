import { mkdtemp, readdir, readFile, rm, stat, writeFile } from 'node:fs/promises'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { brotliCompressSync } from 'node:zlib'
import { afterEach, beforeEach, expect, test } from 'vitest'
import { browserPackage, unpackBrowser } from '../../../generator/print/unpack-browser.ts'

let folder: string
let cache: string
const source = () => ({ files: folder, version: '1.2.3' })

beforeEach(async () => {
  folder = await mkdtemp(join(tmpdir(), 'unpack-'))
  cache = join(folder, 'cache')
  // Two blocks of zeros are an archive without files.
  for (const name of ['al2023.tar.br', 'fonts.tar.br']) await writeFile(join(folder, name), brotliCompressSync(Buffer.alloc(1024)))
  await writeFile(join(folder, 'chromium.br'), brotliCompressSync(Buffer.from('the program')))
})
afterEach(async () => { await rm(folder, { recursive: true, force: true }) })

test('unpacks a program that can be run, with fonts of its own, into a folder of its version', async () => {
  const unpacked = await unpackBrowser(source(), cache)
  expect(unpacked.executable).toBe(join(cache, 'tareline', 'chromium-1.2.3', 'chromium'))
  expect(await readFile(unpacked.executable, 'utf8')).toBe('the program')
  expect((await stat(unpacked.executable)).mode & 0o111).toBe(0o111)
  expect(await readFile(unpacked.fontConfiguration, 'utf8')).toContain(join(cache, 'tareline', 'chromium-1.2.3', 'fonts'))
})

test('once: the second call finds it there', async () => {
  const { executable } = await unpackBrowser(source(), cache)
  await rm(join(folder, 'chromium.br'))
  expect((await unpackBrowser(source(), cache)).executable).toBe(executable)
})

test('two at once agree, and leave one folder', async () => {
  const [one, other] = await Promise.all([unpackBrowser(source(), cache), unpackBrowser(source(), cache)])
  expect(one).toEqual(other)
  expect(await readdir(join(cache, 'tareline'))).toEqual(['chromium-1.2.3'])
})

test('a run that fails leaves nothing behind', async () => {
  await writeFile(join(folder, 'fonts.tar.br'), 'no archive')
  await expect(unpackBrowser(source(), cache)).rejects.toThrow()
  expect(await readdir(join(cache, 'tareline'))).toEqual([])
})

test('the package is among the dependencies', async () => {
  const { files, version } = await browserPackage()
  expect(await readdir(files)).toEqual(expect.arrayContaining(['al2023.tar.br', 'chromium.br', 'fonts.tar.br']))
  expect(version).toMatch(/^\d+\.\d+\.\d+$/)
})
