import { existsSync, readFileSync } from 'node:fs'
import { dirname, join } from 'node:path'
import { fileURLToPath } from 'node:url'
import { z } from 'zod'

/** The program as installed: where its own files lie, and which version it is. */
export interface Program {
  readonly root: string
  readonly version: string
  /** Folder of the house template, words, charts and theme. */
  readonly templates: string
}

/** Found from this file upwards, so that source and build find the same root. */
export function thisProgram(): Program {
  let root = dirname(fileURLToPath(import.meta.url))
  while (!existsSync(join(root, 'package.json'))) root = dirname(root)
  const { version } = z.object({ version: z.string() }).parse(JSON.parse(readFileSync(join(root, 'package.json'), 'utf8')))
  return { root, version, templates: join(root, 'templates') }
}
