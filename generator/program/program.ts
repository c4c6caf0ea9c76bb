import { createHash } from 'node:crypto'
import { existsSync, readdirSync, readFileSync } from 'node:fs'
import { dirname, join } from 'node:path'
import { fileURLToPath } from 'node:url'
import { z } from 'zod'

/** The program as installed: where its own files lie, and which version it is. */
export interface Program {
  readonly root: string
  readonly version: string
  /** SHA-256 of the model's code: two programs that compute alike have the same. */
  readonly model: string
  /** SHA-256 of all else that a review depends on: the rest of the code, the templates, and package.json, which pins every library. */
  readonly code: string
  /** Node and the kind of machine, on which the last digits of a figure and the form of a date may depend. */
  readonly runtime: string
  /** Folder of the house template, words, charts and theme. */
  readonly templates: string
}

/** What runs here: looked at once, since what was loaded stays as it is whoever changes its files. */
export function thisProgram(): Program {
  return (known ??= findProgram())
}

let known: Program | undefined

/** Found from this file upwards, so that source and build find the same root. */
function findProgram(): Program {
  const here = dirname(fileURLToPath(import.meta.url))
  let root = here
  while (!existsSync(join(root, 'package.json'))) root = dirname(root)
  const { version } = z.object({ version: z.string() }).parse(JSON.parse(readFileSync(join(root, 'package.json'), 'utf8')))
  const templates = join(root, 'templates')
  return {
    root, version, templates, model: digestOf(filesIn(join(here, '..', '..', 'model'))),
    code: digestOf([...filesIn(join(here, '..')), ...filesIn(templates), join(root, 'package.json')]),
    runtime: `node ${process.versions.node} ${process.platform} ${process.arch}`,
  }
}

function filesIn(folder: string): readonly string[] {
  return readdirSync(folder, { recursive: true, withFileTypes: true }).filter((entry) => entry.isFile()).map((entry) => join(entry.parentPath, entry.name)).sort()
}

function digestOf(files: readonly string[]): string {
  const hash = createHash('sha256')
  for (const file of files) hash.update(readFileSync(file))
  return hash.digest('hex')
}
