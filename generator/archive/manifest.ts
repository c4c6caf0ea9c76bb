import { createHash } from 'node:crypto'
import { z } from 'zod'
import type { Program } from '../program/program.ts'

export const sha256 = z.string().regex(/^[0-9a-f]{64}$/)
/** With forward slashes, inside its folder. */
const inside = z.string().min(1).refine((path) => !path.startsWith('/') && !path.split('/').some((part) => part === '' || part === '.' || part === '..') && !path.includes('\\'))

export const keptFile = z.strictObject({ path: inside, bytes: z.int().min(0), sha256 })
/** A file that is kept, and the hash by which it is known again. */
export type KeptFile = z.infer<typeof keptFile>

/**
 * What a review was made with: the same inputs give the same files with the same program, Node and browser. `model` and `code` are hashes of the code
 * of the model and of everything else; `runtime` is Node's version and the kind of machine; `browser` printed the PDF, null where none did.
 */
export const madeWith = z.strictObject({ version: z.string(), model: sha256, code: sha256, runtime: z.string(), browser: z.string().nullable() })
export type MadeWith = z.infer<typeof madeWith>

/** What this program makes reviews with, but the browser. */
export function madeHere({ version, model, code, runtime }: Program): Omit<MadeWith, 'browser'> {
  return { version, model, code, runtime }
}

/** What was sealed, when, by whom, made by which program from what, and what was sealed before it. */
export const manifestSchema = z.strictObject({
  schema: z.literal('tareline-manifest/1'),
  account: z.string(),
  period: z.string(),
  /** 1 when the period was first sealed. */
  revision: z.int().min(1),
  /** Why it was revised; null for the first. */
  reason: z.string().nullable(),
  /** Of all seals of the account, in the order of sealing, from 1. */
  sequence: z.int().min(1),
  /** SHA-256 of the manifest sealed before; null for the first of the archive. */
  previous: sha256.nullable(),
  sealed_at: z.iso.datetime(),
  prepared_by: z.string(),
  reviewed_by: z.string(),
  program: madeWith,
  seed: z.int().min(0),
  /** Every file of the folder but this one, sorted by path. */
  files: z.array(keptFile),
})
export type Manifest = z.infer<typeof manifestSchema>

export const manifestName = 'manifest.json'

/** Name of the folder of a seal: `2026-10`, or `2026-10.r2` when it was revised. */
export function sealName({ period, revision }: Pick<Manifest, 'period' | 'revision'>): string {
  return revision === 1 ? period : `${period}.r${revision}`
}

export function writtenManifest(manifest: Manifest): string {
  return `${JSON.stringify(manifest, null, 2)}\n`
}

export function sha256Of(content: Uint8Array | string): string {
  return createHash('sha256').update(content).digest('hex')
}

/** The end of the chain, so that the last seal can't be changed or taken away unseen. */
export const chainEndSchema = z.strictObject({ schema: z.literal('tareline-chain-end/1'), sequence: z.int().min(1), manifest: sha256 })
export type ChainEnd = z.infer<typeof chainEndSchema>
export const chainEndName = 'chain-end.json'
