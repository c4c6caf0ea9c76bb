import { mkdir, open } from 'node:fs/promises'
import path from 'node:path'
import { writeRefusal } from '../faults/write-refusal.ts'
import type { Database } from './database.ts'
import { lineNumbers } from './record-lines.ts'
import { lastReject, rejectReasons, type ScannedFile } from './scan-mentions.ts'

/** Rows that could not be read, by reason. */
export async function countRejects(database: Database, files: readonly ScannedFile[]): Promise<Readonly<Record<string, number>>> {
  const rows = await database.rows<{ reason: number; rows: bigint }>(`SELECT fate AS reason, count(*) AS rows FROM scanned WHERE fate BETWEEN 1 AND ${lastReject} GROUP BY fate ORDER BY fate`)
  const counts = new Map(rows.map(({ reason, rows: count }) => [rejectReasons[reason - 1]!, Number(count)]))
  const malformed = files.reduce((total, file) => total + file.malformed.length, 0)
  if (malformed > 0) counts.set('row-malformed', (counts.get('row-malformed') ?? 0) + malformed)
  return Object.fromEntries(counts)
}

/**
 * Write `mentions.csv` into a folder: file, line and reason of every rejected row, and nothing of what it said.
 *
 * @throws {MachineFault} `rejects-unwritable`
 */
export async function writeRejects(database: Database, files: readonly ScannedFile[], folder: string): Promise<void> {
  await fillRejects(database, files, folder).catch((error: unknown) => { throw writeRefusal('rejects-unwritable', folder, error) })
}

async function fillRejects(database: Database, files: readonly ScannedFile[], folder: string): Promise<void> {
  await mkdir(folder, { recursive: true })
  const output = await open(path.join(folder, 'mentions.csv'), 'w')
  try {
    await output.write('file,line,reason\n')
    for (const file of files) {
      const name = csvField(file.file.path)
      const rejects = await rejectsOf(database, file)
      for (let at = 0; at < rejects.length; at += 10_000) {
        await output.write(rejects.slice(at, at + 10_000).map(({ line, reason }) => `${name},${line},${reason}\n`).join(''))
      }
    }
  } finally {
    await output.close()
  }
}

interface Reject {
  readonly line: number
  readonly reason: string
}

async function rejectsOf(database: Database, scanned: ScannedFile): Promise<readonly Reject[]> {
  const rows = await database.rows<{ ordinal: bigint; reason: number }>(
    `SELECT rowid - ${scanned.first} AS ordinal, fate AS reason FROM scanned WHERE fate BETWEEN 1 AND ${lastReject} AND rowid >= ${scanned.first} AND rowid < ${scanned.first + scanned.sound} ORDER BY rowid`)
  const ordinals = rows.map((row) => Number(row.ordinal))
  if (ordinals.length + scanned.malformed.length === 0) return []
  const lines = scanned.cut === null
    ? { sound: Float64Array.from(ordinals, (ordinal) => ordinal + 1), malformed: new Float64Array(0) }
    : await lineNumbers(scanned.file.readable, scanned.cut, ordinals, scanned.malformed.map((row) => row.offset))
  const all = [
    ...rows.map((row, index): Reject => ({ line: lines.sound[index]!, reason: rejectReasons[row.reason - 1]! })),
    ...Array.from(lines.malformed, (line): Reject => ({ line, reason: 'row-malformed' })),
  ]
  return all.sort((a, b) => a.line - b.line)
}

/** A field as CSV takes it, quoted where it must be. */
export function csvField(text: string): string {
  return /[",\r\n]/.test(text) ? `"${text.replaceAll('"', '""')}"` : text
}
