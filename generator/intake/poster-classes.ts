import type { Account } from '../account/account.ts'
import type { Database } from './database.ts'
import { momentBits, slotBits } from './mention-table.ts'

/** Ninety days in seconds. */
const window = 90 * 86_400

/**
 * Make `classified` of `mention`, still sorted by author and moment: every mention with its poster class, and with what
 * its neighbours say, so that later counts need not group by author where an author has but one mention.
 *
 * The class goes by the author's mentions in the 90 days up to and including this one (of several in one second, those
 * before it in the files); for mentions in the first 90 days of a source the window is those 90 days whole, or everyone
 * would look occasional at the start of history.
 *
 * Added columns, each true for mentions without an author: `first_in_step`: none of its author's before it in the step;
 * `alone_in_step`, `alone_in_period`, `alone`: the only one of its author in the step, the period, at all.
 */
export async function classifyPosters(database: Database, account: Account): Promise<void> {
  const poster = account.factors.indexOf('poster')
  const others = account.factors.map((_, index) => `factor_${index}`).filter((_, index) => index !== poster)
  const openings = poster < 0 ? [] : await createEarly(database)
  const classed = poster < 0 ? '' : `, CAST(CASE WHEN author IS NULL THEN 3 ELSE ${classOf(account)} END AS UTINYINT) AS factor_${poster}`
  const neighbours = ['author', 'slot'].flatMap((column) => [`lag(${column}) OVER () AS ${column}_before`, `lead(${column}) OVER () AS ${column}_after`])
  const far = poster < 0 ? [] : [account.posters.occasional, account.posters.regular].flatMap((back) => [`lag(author, ${back}) OVER () AS author_${back}`, `lag(moment, ${back}) OVER () AS moment_${back}`])
  // Only the mentions of an opening are looked up: a key that is NULL meets nothing, and costs nothing.
  const opening = openings.length === 0 ? 'NULL' : `CASE ${openings.map(({ source, until }) => `WHEN source = ${source} AND moment < ${until} THEN author`).join(' ')} END`
  const before = 'author_before IS DISTINCT FROM author'
  const after = 'author_after IS DISTINCT FROM author'
  const period = (column: string): string => `(${column} >> ${slotBits})`
  await database.run(`CREATE TEMP TABLE classified AS SELECT author, (slot & ${2 ** slotBits - 1})::USMALLINT AS step, ${period('slot')}::USMALLINT AS period, score, ${others.join(', ')}${classed},
      author IS NULL OR ${before} OR slot_before <> slot AS first_in_step,
      author IS NULL OR ((${before} OR slot_before <> slot) AND (${after} OR slot_after <> slot)) AS alone_in_step,
      author IS NULL OR ((${before} OR ${period('slot_before')} <> ${period('slot')}) AND (${after} OR ${period('slot_after')} <> ${period('slot')})) AS alone_in_period,
      author IS NULL OR (${before} AND ${after}) AS alone
    FROM (SELECT *, ${opening} AS early_author, ${[...neighbours, ...far].join(', ')} FROM mention)
    ${poster < 0 ? '' : 'LEFT JOIN early ON early.author_early = early_author AND early.source_early = source'}`)
  await database.run(`DROP TABLE mention${poster < 0 ? '' : '; DROP TABLE early'}`)
}

/** `early (author_early, source_early, early_posts)`: how often each author posted in the first 90 days of each source; returns the moments at which those end. */
async function createEarly(database: Database): Promise<readonly { readonly source: number; readonly until: bigint }[]> {
  const openings = await database.rows<{ source: number; since: bigint; until: bigint }>(`SELECT source, (since << ${momentBits}) AS since, ((since + ${window}) << ${momentBits}) AS until
    FROM (SELECT source, min(moment) >> ${momentBits} AS since FROM mention GROUP BY source) ORDER BY source`)
  const counts = openings.map(({ source, since, until }) =>
    `SELECT author, ${source}::USMALLINT, count(*) FROM mention WHERE author IS NOT NULL AND moment >= ${since} AND moment < ${until} GROUP BY author HAVING count(*) > 1`)
  await database.run(`CREATE TEMP TABLE early (author_early UBIGINT, source_early USMALLINT, early_posts BIGINT)`)
  if (counts.length > 0) await database.run(`INSERT INTO early ${counts.join(' UNION ALL ')}`)
  return openings
}

/** More than N mentions stand in the window if the N-th before this one does. */
function classOf(account: Account): string {
  const { occasional, regular } = account.posters
  const within = (back: number): string => `(author_${back} = author AND (moment >> ${momentBits}) - (moment_${back} >> ${momentBits}) < ${window})`
  return `CASE WHEN early_author IS NOT NULL THEN CASE WHEN early_posts > ${regular} THEN 1 WHEN early_posts > ${occasional} THEN 2 ELSE 0 END
    WHEN ${within(regular)} THEN 1 WHEN ${within(occasional)} THEN 2 ELSE 0 END`
}
