import { readdir, rename, stat } from 'node:fs/promises'
import { join } from 'node:path'

/** What a draft's folder is called while the new one takes its place: the mark of the unfinished one, and the name that it had. */
export function asideName(unfinished: string, name: string): string {
  return `${unfinished}-${name}-before`
}

/**
 * Put back the drafts that stepped aside for a new one when the build was killed before the new one had taken the place: for a moment neither
 * stands there. A draft whose place is taken stays aside: it is never taken away unseen.
 *
 * @param parent - the folder in which drafts stand; one that is not there, or can't be written, holds none
 */
export async function restoreDrafts(parent: string): Promise<void> {
  for (const name of await readdir(parent).catch(() => [])) {
    const before = /^\.unfinished-[^-]+-(.+)-before$/.exec(name)?.[1]
    if (before === undefined) continue
    const place = join(parent, before)
    const taken = await stat(place).then(() => true, () => false)
    if (!taken) await rename(join(parent, name), place).catch(() => undefined)
  }
}
