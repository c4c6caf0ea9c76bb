import { spawn } from 'node:child_process'
import { chmod, mkdtemp, readdir, readFile, rm, writeFile } from 'node:fs/promises'
import { hostname, tmpdir } from 'node:os'
import { join } from 'node:path'
import { afterEach, beforeEach, describe, expect, test } from 'vitest'
import { InputFault } from '../../../generator/faults/fault.ts'
import { lockName, withAccountLock, type LockHolder } from '../../../generator/review/account-lock.ts'
import { processStart } from '../../../generator/review/process-start.ts'
import { deferred } from '../../../generator/cli/deferred.ts'

let folder: string
beforeEach(async () => { folder = await mkdtemp(join(tmpdir(), 'locked-')) })
afterEach(() => rm(folder, { recursive: true, force: true }))

const lockFile = () => join(folder, lockName)
const holder = (changes: Partial<LockHolder>): LockHolder => ({ command: 'build', pid: process.pid, host: hostname(), since: '2026-12-01T09:00:00.000Z', started: null, token: 'aaaaaaaa', ...changes })
const leave = (changes: Partial<LockHolder>, file = lockFile()) => writeFile(file, JSON.stringify(holder(changes)))

/** A process that has just ended. */
async function pidOfTheDead(): Promise<number> {
  const child = spawn(process.execPath, ['-e', ''], { stdio: 'ignore' })
  await new Promise((resolve) => child.on('close', resolve))
  return child.pid!
}

const attempt = (work: () => Promise<unknown> = () => Promise.resolve('done')): Promise<unknown> => withAccountLock(folder, 'build', work).catch((error: unknown) => {
  if (error instanceof InputFault) return error.faults
  throw error
})

test('while the work goes on the lock says who is at it, and afterwards nothing is left', async () => {
  await withAccountLock(folder, 'seal', async () => {
    expect(await readdir(folder)).toEqual([lockName])
    expect(JSON.parse(await readFile(lockFile(), 'utf8'))).toMatchObject({ command: 'seal', pid: process.pid, host: hostname() })
  })
  expect(await readdir(folder)).toEqual([])
})

test('it goes with work that fails, too', async () => {
  await expect(withAccountLock(folder, 'seal', () => Promise.reject(new Error('no luck')))).rejects.toThrow('no luck')
  expect(await readdir(folder)).toEqual([])
})

test('a second run is refused and told who holds it; the first keeps its lock', async () => {
  await withAccountLock(folder, 'seal', async () => {
    const faults = await attempt()
    expect(faults).toMatchObject([{ code: 'account-busy', place: lockFile(), mend: expect.stringContaining('Wait until that process has ended') as string }])
    expect(JSON.stringify(faults)).toContain(`\`tareline seal\`, process ${process.pid} on ${hostname()} since 20`)
    expect(await readdir(folder)).toEqual([lockName])
  })
})

describe('a lock that was left', () => {
  test('by a process that is gone is taken over', async () => {
    await leave({ pid: await pidOfTheDead() })
    expect(await attempt()).toBe('done')
    expect(await readdir(folder)).toEqual([])
  })

  test('by a process whose number another has now is taken over', async () => {
    if (await processStart(process.pid) === null) return
    await leave({ started: 'another start of the machine 12345' })
    expect(await attempt()).toBe('done')
  })

  test('by a process that runs is not', async () => {
    await leave({ started: await processStart(process.pid) })
    expect(await attempt()).toMatchObject([{ code: 'account-busy' }])
    await leave({ started: null })
    expect(await attempt()).toMatchObject([{ code: 'account-busy' }])
  })

  test('by another machine is not: whether it is at work there can’t be known', async () => {
    await leave({ pid: await pidOfTheDead(), host: 'elsewhere' })
    expect(await attempt()).toMatchObject([{ code: 'account-busy', mend: expect.stringContaining('delete the file') as string }])
    expect(JSON.parse(await readFile(lockFile(), 'utf8'))).toMatchObject({ host: 'elsewhere' })
  })

  test.each(['', 'mine', '{"pid":1}'])('that is none of ours is not: %j', async (text) => {
    await writeFile(lockFile(), text)
    expect(await attempt()).toMatchObject([{ code: 'account-busy', message: expect.stringContaining('no lock of ours') as string }])
    expect(await readFile(lockFile(), 'utf8')).toBe(text)
  })

  test('by one that was killed while it took over an older one is taken over with it', async () => {
    await leave({ pid: await pidOfTheDead(), token: '11111111' })
    await leave({ pid: await pidOfTheDead(), token: '22222222' }, `${lockFile()}.after-11111111`)
    expect(await attempt()).toBe('done')
    expect(await readdir(folder)).toEqual([])
  })
})

/** Many ask at once, and whoever is let in stays until all have their answer: how many were let in. */
async function letIn(asking: number): Promise<number> {
  const answered = deferred()
  let [inside, answers] = [0, 0]
  const answer = (): void => { if (++answers === asking) answered.resolve() }
  await Promise.all(Array.from({ length: asking }, async () => {
    const came = await attempt(async () => {
      inside++
      answer()
      await answered.promise
      return 'done'
    })
    if (came !== 'done') answer()
  }))
  return inside
}

test('of many who find the same old lock at once one is let in, every time', async () => {
  const dead = await pidOfTheDead()
  for (let round = 0; round < 40; round++) {
    await leave({ pid: dead, token: '11111111' })
    if (round % 2 === 1) await leave({ pid: dead, token: '22222222' }, `${lockFile()}.after-11111111`)
    expect(await letIn(12)).toBe(1)
    expect(await readdir(folder)).toEqual([])
  }
})

test('of many who find none one is let in; one after the other all are', async () => {
  expect(await letIn(12)).toBe(1)
  expect(await letIn(1)).toBe(1)
})

test('a folder that can’t be written is worked on without a lock', async () => {
  const root = process.geteuid?.() === 0
  await chmod(folder, 0o555)
  if (root) process.seteuid!(65534)
  try {
    expect(await attempt(() => readdir(folder))).toEqual([])
  } finally {
    if (root) process.seteuid!(0)
    await chmod(folder, 0o755)
  }
})
