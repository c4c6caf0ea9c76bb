import { faultOf } from '../faults/catalogue.ts'
import type { Fault } from '../faults/fault.ts'
import type { SoundEntries } from './combinations.ts'
import { findFiles, findFolder, type Found } from './file-patterns.ts'
import { dotted, placeOf, type KeyPath } from './yaml-places.ts'

const mentionKinds = ['.csv', '.csv.gz', '.parquet', '.ndjson'] as const
const cellKinds = ['.csv', '.csv.gz', '.parquet'] as const
/** Of tables that people write: a fault in one is told by its line. */
const lineKinds = ['.csv', '.csv.gz'] as const

interface Named {
  readonly path: KeyPath
  readonly pattern: string
  readonly kinds: readonly string[]
  readonly what: 'file' | 'folder'
}

/** Files by the dotted path of the key that names them, and the faults of those that are not there. */
export interface NamedFiles {
  readonly found: ReadonlyMap<string, readonly string[]>
  readonly faults: readonly Fault[]
}

/**
 * Look for every file that the account names.
 *
 * @param archived - as an archive keeps an account: without mentions, and without a folder of notes where the period had none
 */
export async function findNamedFiles(folder: string, entries: SoundEntries, places: Readonly<Record<string, string>>, archived: boolean): Promise<NamedFiles> {
  const found = new Map<string, readonly string[]>()
  const faults: Fault[] = []
  for (const named of namedBy(entries).filter(({ path }) => !archived || path[0] !== 'mentions')) {
    const place = placeOf(places, named.path)
    const result: Found = named.what === 'folder' ? await findFolder(folder, named.pattern) : await findFiles(folder, named.pattern)
    if (result.kind === 'outside') faults.push(faultOf('account-path-outside', place, { path: result.path }))
    else if (result.kind === 'none' && archived && named.what === 'folder') continue
    else if (result.kind === 'none') faults.push(faultOf('account-file-absent', place, { path: named.pattern, what: named.what }))
    else {
      const odd = result.files.filter((file) => named.kinds.length > 0 && !named.kinds.some((kind) => file.endsWith(kind)))
      faults.push(...odd.map((path) => faultOf('account-file-kind', place, { path, kinds: named.kinds })))
      found.set(dotted(named.path), result.files)
    }
  }
  return { found, faults }
}

function namedBy(entries: SoundEntries): readonly Named[] {
  const sources = (entries.mentions ?? []).flatMap((source, index): readonly Named[] => [
    ...(source.files === undefined ? [] : [{ path: ['mentions', index, 'files'], pattern: source.files, kinds: mentionKinds, what: 'file' as const }]),
    ...(source.cells === undefined ? [] : [{ path: ['mentions', index, 'cells'], pattern: source.cells, kinds: cellKinds, what: 'file' as const }]),
  ])
  const tables = (['survey', 'benchmark', 'coding_audit', 'importance', 'events', 'outcome'] as const).flatMap((key): readonly Named[] => {
    const entry = entries[key]
    return entry === undefined ? [] : [{ path: [key, 'files'], pattern: entry.files, kinds: lineKinds, what: 'file' as const }]
  })
  const single = (['template', 'theme', 'notes', 'words'] as const).flatMap((key): readonly Named[] => {
    const pattern = entries[key]
    return pattern === undefined ? [] : [{ path: [key], pattern, kinds: [], what: key === 'notes' ? 'folder' as const : 'file' as const }]
  })
  return [...sources, ...tables, ...single]
}
