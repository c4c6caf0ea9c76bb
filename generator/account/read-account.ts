import { readFile, realpath } from 'node:fs/promises'
import path from 'node:path'
import { isUtf8 } from 'node:buffer'
import { faultOf } from '../faults/catalogue.ts'
import { InputFault, type Fault } from '../faults/fault.ts'
import type { Account } from './account.ts'
import { combinationFaults, type SoundEntries } from './combinations.ts'
import { accountOf } from './fill-account.ts'
import { findNamedFiles } from './named-files.ts'
import { accountShape, type AccountKey, type Entries } from './schema.ts'
import { describe, shapeFaults, unknownKey } from './shape-faults.ts'
import { readPlacedYaml } from './yaml-places.ts'

/**
 * Read and check account.yaml of an account folder:
 * text → YAML with places → shape of each key → what hangs together → the files it names → Account.
 *
 * @param options.archived - the folder is what an archive keeps of an account: the files of mentions are not there, nor looked for
 * @throws {InputFault} with every fault that the file has, not only the first
 */
export async function readAccount(folder: string, { archived = false }: { readonly archived?: boolean } = {}): Promise<Account> {
  const text = await accountText(folder)
  const { value, places, faults } = readPlacedYaml(text)
  if (faults.length > 0) throw new InputFault(faults)
  if (value === null || typeof value !== 'object' || Array.isArray(value)) {
    throw new InputFault([faultOf('account-value', 'account.yaml', { actual: describe(value), expected: 'a map of keys' })])
  }
  const { entries, faults: wrongShapes } = soundEntries(value as Readonly<Record<string, unknown>>, places)
  const root = await realpath(folder)
  const named = await findNamedFiles(root, entries, places, archived)
  const all: readonly Fault[] = [...wrongShapes, ...combinationFaults(entries, places), ...named.faults]
  if (all.length > 0) throw new InputFault(all)
  return accountOf(root, entries as Entries, named.found, places)
}

async function accountText(folder: string): Promise<string> {
  const bytes = await readFile(path.join(folder, 'account.yaml')).catch(() => undefined)
  if (bytes === undefined) throw new InputFault([faultOf('account-missing', 'account.yaml', {})])
  if (!isUtf8(bytes)) throw new InputFault([faultOf('account-unreadable', 'account.yaml', { reason: 'bytes that are not UTF-8' })])
  return bytes.toString('utf8').replace(/^\uFEFF/, '')
}

function soundEntries(given: Readonly<Record<string, unknown>>, places: Readonly<Record<string, string>>): { readonly entries: SoundEntries; readonly faults: readonly Fault[] } {
  const known = Object.keys(accountShape) as AccountKey[]
  const faults: Fault[] = Object.keys(given).filter((key) => !known.includes(key as AccountKey)).map((key) => unknownKey([key], known, places))
  const entries: Partial<Record<AccountKey, unknown>> = {}
  for (const key of known) {
    const result = accountShape[key].safeParse(given[key])
    if (result.success) entries[key] = result.data
    else for (const issue of result.error.issues) faults.push(...shapeFaults(issue, [key], given[key], places))
  }
  return { entries: entries as SoundEntries, faults }
}
