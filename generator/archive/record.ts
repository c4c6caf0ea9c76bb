import { readFile, stat } from 'node:fs/promises'
import { join } from 'node:path'
import { z } from 'zod'
import { hashOf } from '../intake/input-file.ts'
import { keptFile, madeWith, sha256, type KeptFile } from './manifest.ts'

/** What a draft was made from and what it holds: without it nobody could say later that a seal holds what was reviewed. */
const recordSchema = z.strictObject({
  schema: z.literal('tareline-record/1'),
  account: z.string(),
  period: z.string(),
  /** Whether that is the last whole period that the mentions cover, whatever was asked for: then a build that names none would make this draft. */
  default_period: z.boolean(),
  program: madeWith,
  seed: z.int().min(0),
  prepared_by: z.string().nullable(),
  reviewed_by: z.string().nullable(),
  /** Hash of the last manifest of the archive that the review looked back at; null before the first seal. */
  past: sha256.nullable(),
  /** Whether the fit passed its checks. */
  passed: z.boolean(),
  /** Files of the account folder that were read. Those with mentions in them are not kept: the intake tables stand for them, with no person in them. */
  inputs: z.array(keptFile.extend({ kept: z.boolean() })),
  /** Files of the draft but this one. */
  files: z.array(keptFile),
})
export type BuildRecord = z.infer<typeof recordSchema>

export const recordName = 'record.json'

/** @returns null where there is none, or it is none of ours */
export async function readRecord(draft: string): Promise<BuildRecord | null> {
  const text = await readFile(join(draft, recordName), 'utf8').catch(() => null)
  if (text === null) return null
  try {
    return recordSchema.safeParse(JSON.parse(text)).data ?? null
  } catch {
    return null
  }
}

/** A file as it is now. @throws {InputFault} `file-unreadable` */
export async function fingerprint(folder: string, path: string): Promise<KeptFile> {
  const sha256 = await hashOf(folder, path)
  return { path, bytes: (await stat(join(folder, path))).size, sha256 }
}

/** Files as they are now, one after the other: there may be thousands, of any size. */
export async function fingerprints(folder: string, paths: readonly string[]): Promise<readonly KeptFile[]> {
  const found: KeptFile[] = []
  for (const path of paths) found.push(await fingerprint(folder, path))
  return found
}

/** Those of the recorded files that are not there any more, or not as they were. */
export async function changedSince(folder: string, recorded: readonly KeptFile[]): Promise<readonly string[]> {
  const changed: string[] = []
  for (const { path, bytes, sha256 } of recorded) {
    const sameSize = await stat(join(folder, path)).then(({ size }) => size === bytes, () => false)
    if (!sameSize || await hashOf(folder, path).catch(() => null) !== sha256) changed.push(path)
  }
  return changed
}
