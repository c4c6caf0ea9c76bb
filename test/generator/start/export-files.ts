import { mkdir, mkdtemp, readFile, rm, writeFile } from 'node:fs/promises'
import { tmpdir } from 'node:os'
import path from 'node:path'
import { parse } from 'yaml'
import { startAccount, type StartedAccount } from '../../../generator/start/start-account.ts'

/** A post as an export might hold it. */
export interface ExportedPost {
  readonly number: number
  /** Milliseconds since 1970. */
  readonly at: number
  readonly venue: string
  readonly user: string
  readonly tone: 'negative' | 'neutral' | 'positive'
  readonly stars: number
  readonly theme: string
  readonly body: string
}

const hour = 3_600_000
export const firstPost = Date.UTC(2025, 0, 6, 8, 15)

/** Posts every seven hours from January on, by thirty-one people in three venues. */
export function exportedPosts(count = 400): readonly ExportedPost[] {
  return Array.from({ length: count }, (_, number): ExportedPost => ({
    number, at: firstPost + number * 7 * hour, venue: ['island forum', 'microblog', 'blog'][number % 3]!, user: `person${(number * number) % 31}`,
    tone: (['negative', 'neutral', 'positive', 'neutral'] as const)[(number * 7) % 4]!, stars: 1 + (number * 7) % 5, theme: ['fares', 'crew', 'timetable', 'food', ''][(number * 3) % 5]!,
    body: `The ${number % 2 === 0 ? 'morning' : 'evening'} crossing number ${number} was late again and nobody told us why`,
  }))
}

export interface Started extends StartedAccount {
  /** account.yaml as text and as YAML reads it. */
  readonly text: string
  readonly yaml: Readonly<Record<string, unknown>> & { readonly mentions: readonly StartedSource[] }
}

interface StartedSource {
  readonly files: string
  readonly columns: Readonly<Record<string, string>>
  readonly score?: { readonly labels?: Readonly<Record<string, number>>; readonly range?: readonly number[] }
  readonly time_format?: string
  readonly delimiter?: string
  readonly quote?: string
}

/** Write a file, start an account from it, hand both over, and take them away again. */
export async function startedFrom<T>(name: string, content: string | Uint8Array, use: (started: Started) => Promise<T> | T): Promise<T> {
  const scratch = await mkdtemp(path.join(tmpdir(), 'start-test-'))
  try {
    await mkdir(path.join(scratch, 'exports'))
    const from = path.join(scratch, 'exports', name)
    await writeFile(from, content)
    const started = await startAccount(path.join(scratch, 'skerrow-ferries'), { from, progress: () => undefined })
    const text = await readFile(path.join(started.folder, 'account.yaml'), 'utf8')
    return await use({ ...started, text, yaml: parse(text) as Started['yaml'] })
  } finally {
    await rm(scratch, { recursive: true, force: true })
  }
}

/** A table as text, its fields quoted where they must be. */
export function separated(delimiter: string, header: readonly string[], rows: readonly (readonly (string | number)[])[]): string {
  const field = (value: string | number): string => (/["\r\n]/.test(String(value)) || String(value).includes(delimiter) ? `"${String(value).replaceAll('"', '""')}"` : String(value))
  return [header, ...rows].map((row) => `${row.map(field).join(delimiter)}\n`).join('')
}
