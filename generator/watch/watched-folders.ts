import { existsSync, watch, type FSWatcher } from 'node:fs'
import { posix, join } from 'node:path'
import type { Account } from '../account/account.ts'

/** Folders of an account in which something may change that a review is made with: relative to it, whether they are there yet or not. */
export function foldersOf({ template, notes }: Pick<Account, 'template' | 'notes'>, files: readonly string[]): readonly string[] {
  const beside = template === null ? [] : ['sections', 'charts'].map((name) => posix.join(posix.dirname(template), name))
  return [...new Set(['.', ...files.map((file) => posix.dirname(file)), ...beside, ...(notes === null ? [] : [posix.normalize(notes)])])].sort()
}

/** Folders that are looked at. Whole folders, since editors write a new file and rename it. */
export interface FolderWatch {
  /** Look at these from now on. */
  look(folders: readonly string[]): void
  close(): void
}

/**
 * Tell of each change in a set of folders.
 *
 * @param root - absolute
 * @param changed - with the path of what changed, relative to the root
 */
export function watchFolders(root: string, changed: (path: string) => void): FolderWatch {
  const watchers = new Map<string, FSWatcher>()
  return {
    look: (folders) => {
      for (const [folder, watcher] of watchers) {
        if (folders.includes(folder)) continue
        watcher.close()
        watchers.delete(folder)
      }
      for (const folder of folders) {
        if (watchers.has(folder) || !existsSync(join(root, folder))) continue
        const watcher = watch(join(root, folder), { persistent: true }, (_, name) => { if (name !== null) changed(posix.join(folder, name)) })
        // a folder that goes away is no longer looked at; it is found again when its parent tells of it
        watcher.on('error', () => { watcher.close(); watchers.delete(folder) })
        watchers.set(folder, watcher)
      }
    },
    close: () => { for (const watcher of watchers.values()) watcher.close() },
  }
}
