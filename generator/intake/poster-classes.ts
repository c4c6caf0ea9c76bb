import type { Account } from '../account/account.ts'
import type { Database } from './database.ts'
import { momentBits, slotBits } from './mention-table.ts'
import { classWindow, inOpening, type Opening } from './openings.ts'

/**
 * How far a mention is its author's only one. Each includes those before it, since a step lies in one period; a mention
 * without an author is alone.
 */
export const solitude = {
  /** Its author has an earlier one in the step. */
  further: 0,
  firstInStep: 1,
  aloneInStep: 2,
  aloneInPeriod: 3,
  alone: 4,
} as const

/**
 * Make `classified` of `mention`, sorted by author and moment: every mention with its poster class, and with what
 * its neighbours say, so that later counts need not group by author where an author has but one mention.
 *
 * The class goes by the author's mentions in the 90 days up to and including this one (of several in one second, those
 * before it in the files); for mentions in the first 90 days of a source the window is those 90 days whole, or everyone
 * would look occasional at the start of history.
 *
 * Added besides: `solitude`, above; and `stays`, on an author's last mention of a period: it has another in the period after.
 *
 * @param account - its factors followed by the traits that `mention` has
 * @param extras - further columns of `mention` that are kept
 */
export async function classifyPosters(database: Database, account: Account, openings: readonly Opening[], extras: readonly string[]): Promise<void> {
  const poster = account.factors.indexOf('poster')
  const others = [...extras, ...account.factors.map((_, index) => `factor_${index}`).filter((_, index) => index !== poster)]
  if (poster >= 0) await createEarly(database, openings)
  const classed = poster < 0 ? '' : `, CAST(CASE WHEN author IS NULL THEN 3 ELSE ${classOf(account)} END AS UTINYINT) AS factor_${poster}`
  const backs = poster < 0 ? [] : [account.posters.occasional, account.posters.regular]
  const neighbours = [
    ...[...new Set([1, ...backs])].map((back) => `lag(author, ${back}) OVER () AS author_${back}`), ...backs.map((back) => `lag(moment, ${back}) OVER () AS moment_${back}`),
    'lead(author) OVER () AS author_after', 'lag(slot) OVER () AS slot_before', 'lead(slot) OVER () AS slot_after',
  ]
  // Only the mentions of an opening are looked up: a key that is NULL meets nothing, and costs nothing.
  const opening = openings.length === 0 ? 'NULL' : `CASE ${openings.map(({ source, until }) => `WHEN source = ${source} AND moment < ${until} THEN author`).join(' ')} END`
  const before = 'author_1 IS NOT DISTINCT FROM author'
  const after = 'author_after IS NOT DISTINCT FROM author'
  const period = (column: string): string => `(${column} >> ${slotBits})`
  await database.run(`CREATE TEMP TABLE classified AS SELECT author, slot, score, ${others.join(', ')}${classed},
      CAST(CASE WHEN author IS NULL OR NOT (${before} OR ${after}) THEN ${solitude.alone}
        WHEN NOT ((${before} AND ${period('slot_before')} = ${period('slot')}) OR (${after} AND ${period('slot_after')} = ${period('slot')})) THEN ${solitude.aloneInPeriod}
        WHEN ${before} AND slot_before = slot THEN ${solitude.further}
        WHEN ${after} AND slot_after = slot THEN ${solitude.firstInStep} ELSE ${solitude.aloneInStep} END AS UTINYINT) AS solitude,
      coalesce(author_after = author AND ${period('slot_after')} = ${period('slot')} + 1, false) AS stays
    FROM (SELECT *, ${opening} AS early_author, ${neighbours.join(', ')} FROM (SELECT * FROM mention ORDER BY author, moment))
    ${poster < 0 ? '' : 'LEFT JOIN early ON early.author_early = early_author AND early.source_early = source'}`)
}

/** `early (author_early, source_early, early_posts)`: how often each author posted in the first 90 days of each source. */
async function createEarly(database: Database, openings: readonly Opening[]): Promise<void> {
  const counts = openings.map((opening) => `SELECT author, source, count(*) FROM mention WHERE author IS NOT NULL AND ${inOpening(opening)} GROUP BY author, source HAVING count(*) > 1`)
  await database.run('CREATE TEMP TABLE early (author_early UBIGINT, source_early USMALLINT, early_posts BIGINT)')
  if (counts.length > 0) await database.run(`INSERT INTO early ${counts.join(' UNION ALL ')}`)
}

/** More than N mentions stand in the window if the N-th before this one does. */
function classOf(account: Account): string {
  const { occasional, regular } = account.posters
  const within = (back: number): string => `(author_${back} = author AND (moment >> ${momentBits}) < (moment_${back} >> ${momentBits}) + ${classWindow})`
  return `CASE WHEN early_author IS NOT NULL THEN CASE WHEN early_posts > ${regular} THEN 1 WHEN early_posts > ${occasional} THEN 2 ELSE 0 END
    WHEN ${within(regular)} THEN 1 WHEN ${within(occasional)} THEN 2 ELSE 0 END`
}
