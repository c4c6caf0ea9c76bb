import { chmod, mkdir, mkdtemp, readdir, readFile, rm, stat, symlink, utimes, writeFile } from 'node:fs/promises'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { afterEach, beforeEach, describe, expect, test } from 'vitest'
import { openCache } from '../../../generator/cache/cache.ts'

let folder: string
beforeEach(async () => { folder = await mkdtemp(join(tmpdir(), 'cache-')) })
afterEach(async () => { await rm(folder, { recursive: true, force: true }) })

const asNumbers = (written: unknown) => (Array.isArray(written) ? Float64Array.from(written as number[]) : null)

/** Remember a result and count how often it is computed. */
function counted(cache = openCache(folder, 'program')) {
  let times = 0
  return {
    ask: (from: unknown) => cache.remember('kind', from, () => Promise.resolve(Float64Array.of(++times, 0.1 + 0.2)), asNumbers),
    times: () => times,
  }
}

describe('what was computed', () => {
  test('is kept, to the last bit', async () => {
    const { ask, times } = counted()
    expect(await ask({ a: 1 })).toEqual(Float64Array.of(1, 0.1 + 0.2))
    expect(await ask({ a: 1 })).toEqual(Float64Array.of(1, 0.1 + 0.2))
    expect(times()).toBe(1)
  })
  test.each([
    ['another value', { a: 1 }, { a: 2 }],
    ['another number in a typed array', Float64Array.of(1, 2), Float64Array.of(1, 2 + 2 ** -51)],
    ['another kind of array with the same bytes', new Int32Array(2), new Float64Array(1)],
    ['another part of a buffer', new Float64Array([1, 2, 3, 4]).subarray(0, 2), new Float64Array([1, 2, 3, 4]).subarray(2)],
    ['a number that is not one', Float64Array.of(NaN), Float64Array.of(Infinity)],
  ])('depends on %s', async (_, one, other) => {
    const { ask, times } = counted()
    await ask(one)
    await ask(other)
    expect(times()).toBe(2)
  })
  test('is computed anew by another program', async () => {
    await counted().ask(1)
    const other = counted(openCache(folder, 'another'))
    await other.ask(1)
    expect(other.times()).toBe(1)
  })
  test('is computed anew where what was written can’t be read', async () => {
    const { ask, times } = counted()
    await ask(1)
    const [file] = await readdir(join(folder, 'kind'))
    await writeFile(join(folder, 'kind', file), '[1,')
    await ask(1)
    expect(times()).toBe(2)
  })
  test('is given all the same where nothing can be written', async () => {
    await writeFile(join(folder, 'kind'), 'a file in the way of the folder')
    await chmod(folder, 0o555)
    const { ask, times } = counted()
    expect(await ask(1)).toEqual(Float64Array.of(1, 0.1 + 0.2))
    await ask(1)
    expect(times()).toBe(2)
    await chmod(folder, 0o755)
  })
})

describe('what was written', () => {
  const fileOf = async (kind = 'kind') => join(folder, kind, (await readdir(join(folder, kind)))[0])

  test('stands beside its hash, and is not used where the two do not fit', async () => {
    const { ask, times } = counted()
    await ask(1)
    const file = await fileOf()
    const written = JSON.parse(await readFile(file, 'utf8')) as { sha256: string; result: number[] }
    expect(written).toEqual({ sha256: expect.stringMatching(/^[0-9a-f]{64}$/) as string, result: [1, 0.1 + 0.2] })
    await writeFile(file, JSON.stringify({ ...written, result: [1, 0.4] }))
    expect(await ask(1)).toEqual(Float64Array.of(2, 0.1 + 0.2))
    await writeFile(file, JSON.stringify([1, 0.4]))
    await ask(1)
    expect(times()).toBe(3)
    await ask(1)
    expect(times()).toBe(3)
  })
  test('is not used where restoring it fails', async () => {
    let times = 0
    const ask = () => openCache(folder, 'program').remember('kind', 1, () => Promise.resolve(++times), () => { throw new Error('what a figure') })
    expect([await ask(), await ask()]).toEqual([1, 2])
  })
  test('is not read where it is larger than 64 MB', async () => {
    const { ask, times } = counted()
    await ask(1)
    const file = await fileOf()
    // sound JSON all the same, with its hash: only the size speaks against it
    await writeFile(file, `${await readFile(file, 'utf8')}${' '.repeat(64 * 1024 * 1024)}`)
    await ask(1)
    expect(times()).toBe(2)
    expect((await stat(file)).size).toBeLessThan(1000)
  })
  test('is at most 2,000 results a kind: the oldest go', async () => {
    await mkdir(join(folder, 'kind'))
    const old = (i: number) => join(folder, 'kind', `${i.toString(16).padStart(64, '0')}.json`)
    for (let i = 0; i < 2000; i++) {
      await writeFile(old(i), '{}')
      await utimes(old(i), 1000 + (i * 7) % 2000, 1000 + (i * 7) % 2000)
    }
    await writeFile(join(folder, 'kind', 'mine.txt'), 'not a result')
    await counted().ask(1)
    const kept = await readdir(join(folder, 'kind'))
    expect(kept).toHaveLength(2001)
    expect(kept).toContain('mine.txt')
    expect(kept).not.toContain(old(0).slice(-69))
    expect(kept).toContain(old(1).slice(-69))
  })
  test.each(['the folder', 'a kind', 'a result'])('is neither read nor written where %s is a link that leads out of the account', async (what) => {
    const elsewhere = await mkdtemp(join(tmpdir(), 'elsewhere-'))
    const cache = join(folder, 'account/cache')
    await mkdir(join(folder, 'account'))
    const { ask, times } = counted(openCache(cache, 'program'))
    await ask(1)
    const [file] = await readdir(join(cache, 'kind'))
    const [from, to] = what === 'the folder' ? [cache, elsewhere] : what === 'a kind' ? [join(cache, 'kind'), join(elsewhere, 'kind')] : [join(cache, 'kind', file), join(elsewhere, file)]
    await mkdir(join(elsewhere, 'kind'), { recursive: true })
    const written = await readFile(join(cache, 'kind', file))
    await writeFile(join(elsewhere, 'kind', file), written)
    await writeFile(join(elsewhere, file), written)
    await rm(from, { recursive: true })
    await symlink(to, from)
    const before = await stat(join(elsewhere, 'kind', file))
    await ask(1)
    expect(times()).toBe(2)
    await ask(2)
    expect(await readdir(join(elsewhere, 'kind'))).toEqual([file])
    expect((await stat(join(elsewhere, 'kind', file))).mtimeMs).toBe(before.mtimeMs)
    await rm(elsewhere, { recursive: true })
  })
  test('is used where a link stays in the account', async () => {
    const account = join(folder, 'account')
    await mkdir(join(account, 'kept'), { recursive: true })
    await symlink(join(account, 'kept'), join(account, 'cache'))
    const { ask, times } = counted(openCache(join(account, 'cache'), 'program'))
    await ask(1)
    await ask(1)
    expect(times()).toBe(1)
  })
})

test('two who ask for the same at once share one computation; one that failed is tried again', async () => {
  const cache = openCache(folder, 'program')
  let times = 0
  const ask = (from: unknown) => cache.remember('kind', from, async () => {
    await new Promise((resolve) => { setTimeout(resolve, 5) })
    if (++times === 1) throw new Error('no luck')
    return times
  }, (written) => (typeof written === 'number' ? written : null))
  expect((await Promise.allSettled([ask(1), ask(1)])).map(({ status }) => status)).toEqual(['rejected', 'rejected'])
  expect(times).toBe(1)
  const [one, same, other, again] = await Promise.all([ask(1), ask(1), ask({}), ask(1)])
  expect([same, again]).toEqual([one, one])
  // which of the two is computed first is not said
  expect([one, other].sort()).toEqual([2, 3])
})
