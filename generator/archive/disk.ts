import { constants } from 'node:fs'
import { copyFile, mkdir, open, rename, rm } from 'node:fs/promises'
import { dirname } from 'node:path'

/**
 * Everything that sealing, and finishing a draft, does to a disk, one call at a time: a test can stop it between any two. What a call has done is on the disk when it
 * returns, not only in the machine's memory.
 */
export interface Disk {
  /** With the folders around it. */
  makeFolder(folder: string): Promise<void>
  /** A file that was not there. */
  write(file: string, content: Uint8Array | string): Promise<void>
  /** To a file that was not there. */
  copy(from: string, to: string): Promise<void>
  /** A file takes the place of one that is there; a folder does not. */
  rename(from: string, to: string): Promise<void>
  remove(path: string): Promise<void>
}

export const theDisk: Disk = {
  makeFolder: async (folder) => {
    await mkdir(folder, { recursive: true })
    await flush(folder)
  },
  write: async (file, content) => {
    const handle = await open(file, 'wx')
    try {
      await handle.writeFile(content)
      await handle.sync()
    } finally {
      await handle.close()
    }
    await flush(dirname(file))
  },
  copy: async (from, to) => {
    await copyFile(from, to, constants.COPYFILE_EXCL)
    await flush(to)
    await flush(dirname(to))
  },
  rename: async (from, to) => {
    await rename(from, to)
    await flush(dirname(to))
  },
  remove: (path) => rm(path, { recursive: true, force: true }),
}

async function flush(path: string): Promise<void> {
  const handle = await open(path, 'r')
  try {
    await handle.sync()
  } catch (error) {
    // some file systems do not flush folders
    if ((error as NodeJS.ErrnoException).code !== 'EINVAL' && (error as NodeJS.ErrnoException).code !== 'EPERM') throw error
  } finally {
    await handle.close()
  }
}
