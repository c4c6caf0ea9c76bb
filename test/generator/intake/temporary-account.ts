import { mkdir, mkdtemp, rm, writeFile } from 'node:fs/promises'
import { tmpdir } from 'node:os'
import path from 'node:path'

/** Write an account folder, hand it over, and take it away again. */
export async function withAccount<T>(files: Readonly<Record<string, string | Uint8Array>>, use: (folder: string) => Promise<T>): Promise<T> {
  const folder = await mkdtemp(path.join(tmpdir(), 'tareline-test-'))
  try {
    for (const [name, content] of Object.entries(files)) {
      await mkdir(path.dirname(path.join(folder, name)), { recursive: true })
      await writeFile(path.join(folder, name), content)
    }
    return await use(folder)
  } finally {
    await rm(folder, { recursive: true, force: true })
  }
}

/** Rows as CSV, every field quoted. */
export function quotedCsv(header: readonly string[], rows: readonly (readonly string[])[]): string {
  return [header, ...rows].map((row) => row.map((field) => `"${field.replaceAll('"', '""')}"`).join(',')).join('\r\n')
}

/** An account of one CSV with every column mapped, in UTC, whose scores are labels. */
export const plainAccount = `account: demo
brand: Skerrow Ferries
time_zone: UTC
mentions:
  - files: posts.csv
    columns: { id: ref, posted_at: published, venue: source, author: handle, score: tone, topic: theme, brand: about, text: body }
    score: { labels: { negative: -1, neutral: 0, positive: 1 } }
venues: { boards: { label: Discussion boards, values: [forum, board] } }
`

export const plainHeader = ['ref', 'published', 'source', 'handle', 'tone', 'theme', 'about', 'body']
