import { chmod, mkdtemp, readdir, rm, writeFile } from 'node:fs/promises'
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
