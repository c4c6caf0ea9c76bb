import { faultOf } from './catalogue.ts'
import { MachineFault } from './fault.ts'

/** What a file system says when it does not take a file: no right, no room, no place. */
const refusals: ReadonlySet<string> = new Set(['EACCES', 'EPERM', 'EROFS', 'ENOSPC', 'EDQUOT', 'ENOTDIR', 'EEXIST', 'ENAMETOOLONG', 'ENOENT'])

/** An error of the file system as a fault of the machine, where it is one; any other error as it is. */
export function writeRefusal(code: 'draft-unwritable' | 'archive-unwritable', folder: string, error: unknown): unknown {
  const reason = (error as NodeJS.ErrnoException).code
  return reason !== undefined && refusals.has(reason) ? new MachineFault(faultOf(code, folder, { reason })) : error
}
