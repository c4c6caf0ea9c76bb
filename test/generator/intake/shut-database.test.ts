import { mkdtemp, writeFile } from 'node:fs/promises'
import { tmpdir } from 'node:os'
import path from 'node:path'
import { describe, expect, test } from 'vitest'
import { readAccount } from '../../../generator/account/read-account.ts'
import { openDatabase } from '../../../generator/intake/database.ts'
import { readIntake } from '../../../generator/intake/read-intake.ts'
import { withAccount } from './temporary-account.ts'

describe('the database', () => {
  test('reads the named file and reaches nothing else, nor can it be opened again', async () => {
    const away = path.join(await mkdtemp(path.join(tmpdir(), 'tareline-away-')), 'secret.csv')
    await writeFile(away, 'a\nsecret\n')
    await withAccount({ 'in.csv': 'a\n1\n', 'scratch/x': '' }, async (folder) => {
      const database = await openDatabase({ readable: [path.join(folder, 'in.csv')], scratch: path.join(folder, 'scratch'), threads: 1 })
      const tried = (sql: string): Promise<string> => database.run(sql).then(() => 'done', (error: unknown) => String(error))
      expect(await tried(`SELECT * FROM read_csv('${folder}/in.csv')`)).toBe('done')
      for (const sql of [`SELECT * FROM read_csv('${away}')`, `SELECT * FROM read_text('${away}')`, `COPY (SELECT 1) TO '${away}x'`, `ATTACH '${away}.db'`,
        "SELECT * FROM read_csv('https://example.org/a.csv')", 'INSTALL httpfs', 'SET enable_external_access = true', 'SET lock_configuration = false', "SET allowed_paths = ['/']"]) {
        expect(await tried(sql)).toMatch(/Error/)
      }
      database.close()
    })
  })

  test('takes whatever an account and its data hold for names, never for SQL', async () => {
    const nasty = `x'"); DROP TABLE scanned; --`
    const yaml = `account: demo
brand: ${JSON.stringify(nasty)}
mentions:
  - files: '*.csv'
    columns: { posted_at: ${JSON.stringify(nasty)}, venue: "v'", score: s, brand: b }
    score: { labels: { ${JSON.stringify(nasty)}: 1 } }
venues: { ${JSON.stringify(`v ${nasty}`)}: { values: ["a'b"] } }
`
    const quoted = `"${nasty.replaceAll('"', '""')}"`
    const tables = await withAccount({ 'account.yaml': yaml, [`it's.csv`]: `${quoted},v',s,b\n2025-03-03,a'b,${quoted},${quoted}\n2025-03-03,${quoted},${quoted},${quoted}\n` },
      async (folder) => readIntake(await readAccount(folder), { period: '2025-03' }))
    expect(tables.accounting.modelled).toBe(2)
    expect(tables.factors[0]!.levels.map((level) => level.name)).toEqual([`v ${nasty}`, nasty])
  })
})
