import { truncate } from 'node:fs/promises'
import { theDisk, type Disk } from '../../generator/archive/disk.ts'

/** How a disk dies: before its n-th call, half-way through what that writes, right after it; or it is full from the n-th on. */
export type Death = 'before' | 'half' | 'after' | 'full'

/** A disk that dies at its n-th call; one that is full still removes. */
export function dyingDisk(at: number, how: Death): Disk {
  let calls = 0
  const dying = async (work: () => Promise<void>, written?: string, frees = false): Promise<void> => {
    calls++
    if (how === 'full' && calls >= at && !frees) throw Object.assign(new Error('the disk is full'), { code: 'ENOSPC' })
    if (how !== 'full' && (calls > at || (calls === at && how === 'before'))) throw new Error('the disk died')
    await work()
    if (how === 'full' || calls !== at) return
    if (how === 'half' && written !== undefined) await truncate(written, 3)
    throw new Error('the disk died')
  }
  return {
    makeFolder: (path) => dying(() => theDisk.makeFolder(path)),
    write: (file, content) => dying(() => theDisk.write(file, content), file),
    copy: (from, to) => dying(() => theDisk.copy(from, to), to),
    rename: (from, to) => dying(() => theDisk.rename(from, to)),
    remove: (path) => dying(() => theDisk.remove(path), undefined, true),
  }
}

/** A disk that lives, and how many calls it had. */
export function countingDisk(): { readonly disk: Disk; readonly calls: () => number } {
  let calls = 0
  const counted = <A extends readonly unknown[]>(work: (...args: A) => Promise<void>) => (...args: A) => { calls++; return work(...args) }
  return {
    disk: { makeFolder: counted(theDisk.makeFolder), write: counted(theDisk.write), copy: counted(theDisk.copy), rename: counted(theDisk.rename), remove: counted(theDisk.remove) },
    calls: () => calls,
  }
}
