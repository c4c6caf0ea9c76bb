import { faultOf } from './catalogue.ts'
import { MachineFault } from './fault.ts'

/** What a file system says when it does not take a file: no right, no room, no place. */
const refusals: ReadonlySet<string> = new Set(['EACCES', 'EPERM', 'EROFS', 'ENOSPC', 'EDQUOT', 'ENOTDIR', 'EEXIST', 'ENAMETOOLONG', 'ENOENT'])

/** Whether an error says that a file could not be written, and not that the program is wrong. */
export function isWriteRefusal(error: unknown): error is NodeJS.ErrnoException & { readonly code: string } {
  return refusals.has((error as NodeJS.ErrnoException).code ?? '')
}

/** An error of the file system as a fault of the machine, where it is one; any other error as it is. */
export function writeRefusal(code: 'draft-unwritable' | 'rejects-unwritable' | 'archive-unwritable', folder: string, error: unknown): unknown {
  return isWriteRefusal(error) ? new MachineFault(faultOf(code, folder, { reason: error.code })) : error
}
