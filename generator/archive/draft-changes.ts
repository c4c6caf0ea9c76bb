import { changedSince, recordName, type BuildRecord } from './record.ts'
import { filesOf } from './verify-archive.ts'

/** Where an account and its draft stand, and what a build of the draft's period would read now. */
export interface StandingDraft {
  /** Of the account, absolute. */
  readonly folder: string
  /** Of the draft, absolute. */
  readonly draft: string
  /** Relative to the account's folder. */
  readonly inputs: readonly string[]
}

/** Files that are not what the record says: changed, gone, or come since. */
export interface DraftChanges {
  /** Relative to the draft. */
  readonly draft: readonly string[]
  /** Relative to the account's folder. */
  readonly inputs: readonly string[]
}

/** A draft and its inputs held against its record. Files are hashed, unless their size tells already. */
export async function draftChanges({ folder, draft, inputs }: StandingDraft, record: BuildRecord): Promise<DraftChanges> {
  const known = new Set([...record.files.map(({ path }) => path), recordName])
  const before = new Set(record.inputs.map(({ path }) => path))
  return {
    draft: [...await changedSince(draft, record.files), ...(await filesOf(draft)).filter((path) => !known.has(path))],
    inputs: [...await changedSince(folder, record.inputs), ...inputs.filter((path) => !before.has(path))],
  }
}
