import { readdir, stat } from 'node:fs/promises'
import { join } from 'node:path'
import { faultOf } from '../faults/catalogue.ts'
import { InputFault } from '../faults/fault.ts'

/**
 * The accounts in a folder: each folder in it, or link to one, that holds an account.yaml. Names that begin with a dot are none.
 *
 * @returns their names, sorted by code unit
 * @throws {InputFault} `accounts-absent` where there are none, or no folder
 */
export async function accountFolders(around: string): Promise<readonly string[]> {
  const names = (await readdir(around).catch(() => [])).filter((name) => !name.startsWith('.')).sort()
  const found: string[] = []
  for (const name of names) {
    if (await stat(join(around, name, 'account.yaml')).then(() => true, () => false)) found.push(name)
  }
  if (found.length === 0) throw new InputFault([faultOf('accounts-absent', around, {})])
  return found
}
