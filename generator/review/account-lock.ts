import { randomBytes } from 'node:crypto'
import { constants } from 'node:fs'
import { copyFile, link, readFile, rename, rm, writeFile } from 'node:fs/promises'
import { hostname } from 'node:os'
import { join } from 'node:path'
import { z } from 'zod'
import { faultOf } from '../faults/catalogue.ts'
import { InputFault } from '../faults/fault.ts'
import { isWriteRefusal } from '../faults/write-refusal.ts'
import { isGone, processStart } from './process-start.ts'

/** The file in an account folder that says who is at work there. It begins with a dot: no pattern of inputs finds it. */
export const lockName = '.tareline-busy'

const holderSchema = z.strictObject({
  command: z.string(), pid: z.int().min(1), host: z.string(), since: z.iso.datetime(),
  /** See `processStart`. */
  started: z.string().nullable(),
  /** Tells this lock from every other, also of the same process. */
  token: z.string().regex(/^[0-9a-f]{8}$/),
})
export type LockHolder = z.infer<typeof holderSchema>

/**
 * Work on an account while nobody else builds or seals it. The lock goes when the work ends, well or badly; that of a process that was killed is taken
 * over. A folder in which no file can be written is worked on without a lock: drafts then go elsewhere.
 *
 * @param folder - of the account
 * @param command - what is being done, for whoever finds the lock
 * @throws {InputFault} `account-busy` where another holds it, and what the work throws
 */
export async function withAccountLock<T>(folder: string, command: string, work: () => Promise<T>): Promise<T> {
  const release = await takeLock(folder, command)
  try {
    return await work()
  } finally {
    await release()
  }
}

async function takeLock(folder: string, command: string): Promise<() => Promise<void>> {
  const mine: LockHolder = {
    command, pid: process.pid, host: hostname(), since: new Date().toISOString(), started: await processStart(process.pid), token: randomBytes(4).toString('hex'),
  }
  const file = join(folder, lockName)
  const written = `${file}.${mine.token}`
  try {
    await writeFile(written, `${JSON.stringify(mine)}\n`, { flag: 'wx' })
  } catch (error) {
    // an empty file may stand there where there is no room
    await rm(written, { force: true }).catch(() => undefined)
    if (isWriteRefusal(error)) return () => Promise.resolve()
    throw error
  }
  try {
    const holder = await claim(file, written)
    if (holder !== null) throw new InputFault([busy(file, holder)])
  } finally {
    await rm(written, { force: true })
  }
  return async () => {
    const holder = await readHolder(file)
    if (isRead(holder) && holder.token === mine.token) await rm(file, { force: true }).catch(() => undefined)
  }
}

/** Locks come and go in the meantime; what is there, and can't be read as often as this, is none. */
const mostTries = 100

/**
 * Put one's own lock at a place. Where one of a process that is gone stands there, whoever takes it over first claims, in the same way, the right to do so:
 * a file named after that very lock. Only who has it may rename it over the lock, and only while that lock still stands: at no moment is there none, and of
 * two who find the same old lock one is refused.
 *
 * @param written - one's own lock, whole, beside
 * @returns who holds the place; null: oneself
 */
async function claim(file: string, written: string): Promise<LockHolder | 'unreadable' | null> {
  for (let tries = 0; tries < mostTries; tries++) {
    if (await placed(written, file)) return null
    const holder = await readHolder(file)
    if (holder === 'absent') continue
    if (holder === 'unreadable' || !await isGone(holder)) return holder
    const right = `${file}.after-${holder.token}`
    const rival = await claim(right, written)
    if (rival !== null) return rival
    const now = await readHolder(file)
    if (isRead(now) && now.token === holder.token) {
      await rename(right, file)
      return null
    }
    await rm(right, { force: true })
  }
  return 'unreadable'
}

/** Put a whole file at a place where none stands, in one step; file systems without links take a copy. */
async function placed(written: string, file: string): Promise<boolean> {
  const exists = (error: NodeJS.ErrnoException): boolean => error.code === 'EEXIST'
  try {
    await link(written, file)
    return true
  } catch (error) {
    if (exists(error as NodeJS.ErrnoException)) return false
  }
  return copyFile(written, file, constants.COPYFILE_EXCL).then(() => true, (error: NodeJS.ErrnoException) => {
    if (exists(error)) return false
    throw error
  })
}

type FoundHolder = LockHolder | 'unreadable' | 'absent'

const isRead = (holder: FoundHolder): holder is LockHolder => typeof holder === 'object'

async function readHolder(file: string): Promise<FoundHolder> {
  try {
    return holderSchema.safeParse(JSON.parse(await readFile(file, 'utf8'))).data ?? 'unreadable'
  } catch (error) {
    return (error as NodeJS.ErrnoException).code === 'ENOENT' ? 'absent' : 'unreadable'
  }
}

function busy(file: string, holder: LockHolder | 'unreadable') {
  return faultOf('account-busy', file, holder === 'unreadable' ? { holder: null, here: false } : { holder, here: holder.host === hostname() })
}
