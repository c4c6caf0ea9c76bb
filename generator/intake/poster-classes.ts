import type { Account } from '../account/account.ts'
import type { Database } from './database.ts'

const window = 90 * 86_400 * 1_000_000

/**
 * Make `classified` of `mention`: every mention with its poster class, by its author's mentions in the 90 days up to and
 * including it; for mentions in the first 90 days of a source the window is those 90 days whole, or everyone would look
 * occasional at the start of history. Where the account has no factor `poster`, it is `mention` as it stands.
 */
export async function classifyPosters(database: Database, account: Account): Promise<void> {
  const index = account.factors.indexOf('poster')
  if (index < 0) {
    await database.run('ALTER TABLE mention RENAME TO classified')
    return
  }
  const { occasional, regular } = account.posters
  const classOf = `CASE WHEN posts <= ${occasional} THEN 0 WHEN posts <= ${regular} THEN 2 ELSE 1 END`
  await database.run(`CREATE TEMP TABLE opening AS SELECT source, min(instant) AS since, min(instant) + ${window} AS until FROM mention GROUP BY source`)
  await database.run(`CREATE TEMP TABLE early AS SELECT author, opening.source, count(*) AS early_posts
    FROM mention JOIN opening ON instant >= since AND instant < until WHERE author IS NOT NULL GROUP BY ALL`)
  await database.run(`CREATE TEMP TABLE classified AS
    SELECT * EXCLUDE (trailing_posts, early_posts, until, posts) REPLACE (CAST(${classOf} AS USMALLINT) AS factor_${index})
    FROM (SELECT *, CASE WHEN instant < until THEN early_posts ELSE trailing_posts END AS posts FROM (
      SELECT *, count(*) OVER (PARTITION BY author ORDER BY instant RANGE BETWEEN ${window - 1} PRECEDING AND CURRENT ROW) AS trailing_posts FROM mention WHERE author IS NOT NULL)
      JOIN (SELECT source, until FROM opening) USING (source) LEFT JOIN early USING (author, source))
    UNION ALL SELECT * REPLACE (3::USMALLINT AS factor_${index}) FROM mention WHERE author IS NULL`)
  await database.run('DROP TABLE mention; DROP TABLE opening; DROP TABLE early')
}
