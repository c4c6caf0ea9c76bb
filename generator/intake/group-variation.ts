import type { AuthorVariation } from '../../model/intake/intake-tables.ts'
import type { Database } from './database.ts'
import { stepSql } from './mention-table.ts'
import { solitude } from './poster-classes.ts'
import { scorePart } from './score-sql.ts'

interface VariationSums {
  readonly venue: number
  readonly posts: bigint
  readonly authors: bigint
  readonly sum: bigint
  readonly sum_squares: bigint
  readonly squares: bigint
}

/**
 * Sums for the one-way analysis of variance by author inside each venue, of the scores of known authors less the mean of
 * those in the venue and step. Authors with equally many mentions are summed together, so that what comes out of the
 * database is whole numbers and the one division is done here.
 *
 * @param before - number of a step: of the mentions before it alone; all of them if absent
 * @returns by number of the venue
 */
export async function groupVariation(database: Database, before?: number): Promise<ReadonlyMap<number, AuthorVariation>> {
  await database.run(`CREATE OR REPLACE TEMP TABLE centre AS SELECT factor_0, slot, CAST(round(sum(known_score)::DOUBLE / sum(known)) AS BIGINT) AS centre
    FROM cell_sum WHERE known > 0 GROUP BY ALL`)
  const centred = 'SELECT author, solitude, factor_0, score - centre AS score FROM classified JOIN centre USING (factor_0, slot) WHERE author IS NOT NULL'
    + (before === undefined ? '' : ` AND ${stepSql} < ${before}`)
  const rows = await database.rows<VariationSums>(`
    SELECT venue, posts, count(*) AS authors, sum(total)::HUGEINT AS sum, sum(total::HUGEINT * total)::HUGEINT AS sum_squares, sum(squares)::HUGEINT AS squares FROM (
      SELECT min(factor_0) AS venue, count(*) AS posts, sum(score)::BIGINT AS total, sum(score * score)::HUGEINT AS squares FROM (${centred}) WHERE solitude < ${solitude.alone} GROUP BY author)
    GROUP BY venue, posts
    UNION ALL SELECT factor_0, 1, count(*), sum(score)::HUGEINT, sum(score * score)::HUGEINT, sum(score * score)::HUGEINT FROM (${centred}) WHERE solitude = ${solitude.alone} GROUP BY factor_0
    ORDER BY venue, posts`)
  const venues = new Map<number, VariationSums[]>()
  for (const row of rows) venues.set(row.venue, [...(venues.get(row.venue) ?? []), row])
  return new Map([...venues].map(([venue, sums]) => [venue, variationOf(sums)]))
}

function variationOf(sums: readonly VariationSums[]): AuthorVariation {
  const total = (value: (row: VariationSums) => bigint): bigint => sums.reduce((all, row) => all + value(row), 0n)
  const mentions = total((row) => row.authors * row.posts)
  const sum = total((row) => row.sum)
  const explained = sums.reduce((all, row) => all + Number(row.sum_squares) / Number(row.posts), 0)
  const between = explained - Number(sum * sum) / Number(mentions)
  const within = Number(total((row) => row.squares)) - explained
  return {
    authors: Number(total((row) => row.authors)),
    mentions: Number(mentions),
    squaredSizes: Number(total((row) => row.authors * row.posts * row.posts)),
    betweenSquares: Math.max(0, between) * scorePart ** 2,
    withinSquares: Math.max(0, within) * scorePart ** 2,
  }
}
