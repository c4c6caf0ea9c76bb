import { chmod, lstat, mkdir, mkdtemp, readdir, rename, rm, rmdir } from 'node:fs/promises'
import path from 'node:path'
import { faultOf } from '../faults/catalogue.ts'
import { InputFault, MachineFault } from '../faults/fault.ts'

/** An account that is being laid out beside its place. */
export interface UnfinishedAccount {
  /** Where its files are to be written. */
  readonly folder: string
  /** Put it in its place, whole. */
  finish(): Promise<void>
  /** Leave no trace. */
  abandon(): Promise<void>
}

/**
 * Begin an account in a folder that is absent or empty. An absent one comes into being by one rename; into an empty one, in which
 * somebody may be standing, the entries are moved, account.yaml last.
 *
 * @param target - absolute
 * @throws {InputFault} `start-folder-taken`, then and when the account is finished
 * @throws {MachineFault} `start-unwritable`
 */
export async function openAccountFolder(target: string): Promise<UnfinishedAccount> {
  const there = await entriesOf(target)
  const parent = there === null ? path.dirname(target) : target
  const made = await writing(target, () => mkdir(parent, { recursive: true }))
  const folder = await writing(target, () => mkdtemp(path.join(parent, '.unfinished-')))
  return {
    folder,
    finish: () => writing(target, async () => {
      await chmod(folder, 0o755)
      if (there === null) {
        await entriesOf(target)
        await rename(folder, target)
      } else await moveInto(target, folder)
    }),
    abandon: async () => {
      // what could not be written may not be removable either; why it was abandoned is told, not that
      await rm(folder, { recursive: true, force: true }).catch(() => undefined)
      if (made !== undefined) await removeEmpty(parent, made)
    },
  }
}

/** The entries of a folder, of which there must be none; null where there is no such folder. */
async function entriesOf(target: string, but: readonly string[] = []): Promise<readonly string[] | null> {
  try {
    // a link that leads nowhere is there all the same
    if (await lstat(target).then(() => false, (error: NodeJS.ErrnoException) => error.code === 'ENOENT')) return null
    const entries = (await readdir(target)).filter((entry) => !but.includes(entry))
    if (entries.length > 0) throw new InputFault([faultOf('start-folder-taken', target, { entry: entries.sort()[0]! })])
    return entries
  } catch (error) {
    const { code } = error as NodeJS.ErrnoException
    throw code === 'ENOTDIR' || code === 'ENOENT' ? new InputFault([faultOf('start-folder-taken', target, { entry: '' })]) : refused(target, error)
  }
}

async function moveInto(target: string, folder: string): Promise<void> {
  await entriesOf(target, [path.basename(folder)])
  const entries = (await readdir(folder)).sort((a, b) => Number(a === 'account.yaml') - Number(b === 'account.yaml'))
  for (const entry of entries) await rename(path.join(folder, entry), path.join(target, entry))
  await rmdir(folder)
}

/** Take away the folders that were made, from the innermost out, as long as they are empty. */
async function removeEmpty(innermost: string, outermost: string): Promise<void> {
  for (let folder = innermost; folder.startsWith(outermost); folder = path.dirname(folder)) {
    if (!await rmdir(folder).then(() => true, () => false)) return
  }
}

const refusals: ReadonlySet<string> = new Set(['EACCES', 'EPERM', 'EROFS', 'ENOSPC', 'EDQUOT', 'ENOTDIR', 'EEXIST', 'ENOTEMPTY', 'ENAMETOOLONG', 'ELOOP'])

/** Do what writes. @throws {MachineFault} `start-unwritable` where the file system does not take it */
export async function writing<T>(target: string, write: () => Promise<T>): Promise<T> {
  try {
    return await write()
  } catch (error) {
    throw refused(target, error)
  }
}

function refused(target: string, error: unknown): unknown {
  const { code } = error as NodeJS.ErrnoException
  return code !== undefined && refusals.has(code) ? new MachineFault(faultOf('start-unwritable', target, { reason: code })) : error
}
