import type { Database } from './database.ts'
import type { ZoneSql } from './time-sql.ts'

export interface Duplicates {
  readonly sameId: number
  readonly repost: number
}

/** The upper half of an id's hash. */
const half = '(id >> 32)::UINTEGER'
const week = 7 * 86_400 * 1_000_000

/**
 * Find the rows of `scanned` that repeat another and put them into `repeated (row)`: first those whose id was there
 * before in the same source, then, among the rest, reposts.
 *
 * @param eligible - SQL condition on `scanned`: readable and in scope
 * @param filled - the columns that `scanned` has
 */
export async function findDuplicates(database: Database, zone: ZoneSql, eligible: string, filled: { readonly id: boolean; readonly text: boolean }): Promise<Duplicates> {
  await database.run('CREATE TEMP TABLE repeated (row BIGINT)')
  const sameId = filled.id ? await findSameIds(database, eligible) : 0
  const repost = filled.text ? await findReposts(database, zone, eligible) : 0
  return { sameId, repost }
}

async function findSameIds(database: Database, eligible: string): Promise<number> {
  // Sorting one number a row and comparing neighbours takes half the time of grouping by as many different numbers, and
  // sorting half the number again half of that: of the few ids that share it, the whole is looked at.
  await database.run(`CREATE TEMP TABLE half_twice AS SELECT DISTINCT half FROM (
    SELECT half, lag(half) OVER () AS before FROM (SELECT ${half} AS half FROM scanned WHERE ${eligible} AND id IS NOT NULL ORDER BY half)) WHERE half = before`)
  await database.run(`CREATE TEMP TABLE id_twice AS SELECT id FROM scanned JOIN half_twice ON half = ${half} WHERE ${eligible} AND id IS NOT NULL GROUP BY id HAVING count(*) > 1`)
  await database.run(`INSERT INTO repeated SELECT row FROM (
    SELECT scanned.rowid AS row, row_number() OVER (PARTITION BY id ORDER BY scanned.rowid) AS place
    FROM scanned JOIN id_twice USING (id) WHERE ${eligible}) WHERE place > 1`)
  await database.run('DROP TABLE id_twice; DROP TABLE half_twice')
  return count(database, 'repeated')
}

/**
 * A text counts as its first posting; copies within 7 days of a posting that counts do not. The first one later than
 * that counts again, and so on: each round settles one counting posting of every text.
 */
async function findReposts(database: Database, zone: ZoneSql, eligible: string): Promise<number> {
  const before = await count(database, 'repeated')
  await database.run(`CREATE TEMP TABLE text_twice AS SELECT text FROM scanned WHERE ${eligible} AND text IS NOT NULL GROUP BY text HAVING count(*) > 1`)
  await database.run(`CREATE TEMP TABLE posting AS SELECT text, ${zone.instant} AS instant, scanned.rowid AS row
    FROM scanned JOIN text_twice USING (text) WHERE ${eligible} AND scanned.rowid NOT IN (SELECT row FROM repeated)`)
  while (await count(database, 'posting') > 0) {
    await database.run(`CREATE TEMP TABLE counting AS SELECT text, min(instant) AS since, arg_min(row, (instant, row)) AS row FROM posting GROUP BY text`)
    await database.run(`INSERT INTO repeated SELECT posting.row FROM posting JOIN counting USING (text)
      WHERE posting.row <> counting.row AND posting.instant <= since + ${week}`)
    await database.run(`CREATE TEMP TABLE later AS SELECT posting.* FROM posting JOIN counting USING (text) WHERE posting.instant > since + ${week}`)
    await database.run('DROP TABLE posting; DROP TABLE counting; ALTER TABLE later RENAME TO posting')
  }
  await database.run('DROP TABLE posting; DROP TABLE text_twice')
  return await count(database, 'repeated') - before
}

async function count(database: Database, table: string): Promise<number> {
  const [row] = await database.rows<{ rows: bigint }>(`SELECT count(*) AS rows FROM ${table}`)
  return Number(row!.rows)
}
