import { readFile } from 'node:fs/promises'
import { join } from 'node:path'
import { z } from 'zod'
import { filesOf } from './verify-archive.ts'
import { keptFile, sha256Of, type KeptFile } from './manifest.ts'

/** What a draft was made from and what it holds: without it nobody could say later that a seal holds what was reviewed. */
export const recordSchema = z.strictObject({
  schema: z.literal('tareline-record/1'),
  account: z.string(),
  period: z.string(),
  program: z.strictObject({ version: z.string(), model: z.string() }),
  seed: z.int().min(0),
  prepared_by: z.string().nullable(),
  reviewed_by: z.string().nullable(),
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

/** A file as it is now. */
export async function fingerprint(folder: string, path: string): Promise<KeptFile> {
  const content = await readFile(join(folder, path))
  return { path, bytes: content.length, sha256: sha256Of(content) }
}

/** Every file of a folder but the named ones, as they are now, sorted by path. */
export async function fingerprints(folder: string, leftOut: (path: string) => boolean = () => false): Promise<readonly KeptFile[]> {
  const paths = (await filesOf(folder)).filter((path) => !leftOut(path))
  return Promise.all(paths.map((path) => fingerprint(folder, path)))
}

/** Those of the recorded files that are not there any more, or not as they were. */
export async function changedSince(folder: string, recorded: readonly KeptFile[]): Promise<readonly string[]> {
  const now = await Promise.all(recorded.map(({ path }) => fingerprint(folder, path).catch(() => null)))
  return recorded.filter(({ sha256 }, i) => now[i]?.sha256 !== sha256).map(({ path }) => path)
}
