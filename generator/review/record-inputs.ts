import { stat } from 'node:fs/promises'
import { join } from 'node:path'
import type { Account } from '../account/account.ts'
import type { KeptFile } from '../archive/manifest.ts'
import { fingerprints, type BuildRecord } from '../archive/record.ts'
import type { House } from './house.ts'
import type { ReviewMaterial } from './make-review.ts'

/** Every file of an account that a build of a period reads, relative to its folder, sorted. */
export interface InputPaths {
  /** The account file, small inputs, template and what goes with it, words, theme, the period's note. */
  readonly kept: readonly string[]
  /** Mentions, and ready-made cells. */
  readonly notKept: readonly string[]
}

export function inputPaths(account: Account, house: House, period: string): InputPaths {
  const { survey, events, outcome, benchmark, codingAudit, importance } = account
  const notKept = account.mentions.flatMap(({ files }) => files)
  const tables = [survey, events, outcome, benchmark, codingAudit, importance].flatMap((source) => source?.files ?? [])
  const note = Object.hasOwn(house.template.notes, period) ? [house.template.notes[period].place] : []
  return { kept: sorted(['account.yaml', ...tables, ...house.files, ...note].filter((path) => !notKept.includes(path))), notKept: sorted(notKept) }
}

function sorted(paths: readonly string[]): readonly string[] {
  return [...new Set(paths)].sort()
}

/**
 * The account file and what the house was loaded from, the notes of every period among them, as they are now: to be asked as soon as they were read,
 * since somebody may write on them while the model is fitted.
 */
export async function fingerprintHouse({ folder }: Account, { files, template }: House): Promise<readonly KeptFile[]> {
  return fingerprints(folder, sorted(['account.yaml', ...files, ...Object.values(template.notes).map(({ place }) => place)]))
}

/** What the record of a build says of its inputs. Mentions and small inputs were hashed when they were read: they are not read again. */
export async function recordInputs(
  account: Account, house: House, period: string, ofHouse: readonly KeptFile[], { tables, inputs }: ReviewMaterial,
): Promise<BuildRecord['inputs']> {
  const { kept, notKept } = inputPaths(account, house, period)
  const hashes = new Map([...ofHouse, ...inputs.files, ...tables.accounting.inputs].map(({ path, sha256 }) => [path, sha256]))
  const recorded = (isKept: boolean) => async (path: string) => {
    const sha256 = hashes.get(path)
    if (sha256 === undefined) throw new Error(`Unexpected absence of a hash of ${path}, which was read`)
    return { path, bytes: (await stat(join(account.folder, path))).size, sha256, kept: isKept }
  }
  return Promise.all([...kept.map(recorded(true)), ...notKept.map(recorded(false))])
}
