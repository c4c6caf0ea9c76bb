import type { Database } from './database.ts'
import { periodSql } from './mention-table.ts'

/** As `PullRow` of the intake tables, by the numbers of the database. */
export interface GroupedPull {
  readonly venue: number
  readonly poster: number
  readonly replies: number
  readonly authors: number
  readonly slope: number
  readonly standardError: number
}

/** A regression on fewer replies is not made. */
const leastReplies = 50
/** x and y are whole numbers of this many score parts, so that sums over authors of products of products fit. */
const coarser = 1000

interface PullSums {
  readonly venue: number
  readonly poster: number
  readonly replies: bigint
  readonly authors: bigint
  readonly xy: bigint
  readonly xx: bigint
  /** Sums over authors of the products of their own sums. */
  readonly xy_xy: bigint
  readonly xy_xx: bigint
  readonly xx_xx: bigint
}

/**
 * How a reply's score follows the thread before it: slope of y on x through the origin, by venue and by venue and poster class.
 *
 * A reply is a mention by a known author with an earlier one by somebody else in the same thread and venue. y is its score less
 * the mean c of its venue, topic and period; x the mean, over those earlier mentions, of the same. The mean that
 * is taken from an earlier mention of the reply's own venue, topic and period leaves the reply out: with n mentions in
 * both means, y and x would share an error, and scores without any pull would give a slope of about -(mentions before)/n.
 * What is left is the small-sample bias of a ratio: of 10 threads in a venue, about -0.03 in simulations without pull.
 *
 *     x = mean(s_j - c_j) + share of j in the reply's own cell * y / (n - 1)
 *
 * The standard error is that of clusters by author (Liang and Zeger 1986) with the factor G / (G - 1) for G of them (CR1, from memory):
 *
 *     se^2 = G / (G - 1) * sum_a (xy_a - b xx_a)^2 / xx^2
 *
 * Everything summed is whole, and the sums over authors are put together in whole numbers of any size: nothing depends on the order.
 *
 * @param factors - of the account
 * @param place - whether mentions say their place in the thread, which then goes before time
 * @param smallest - fewest authors of a group that is told
 */
export async function groupPull(database: Database, factors: readonly string[], place: boolean, smallest: number): Promise<readonly GroupedPull[]> {
  const [topic, poster] = [factors.indexOf('topic'), factors.indexOf('poster')]
  const cell = ['venue', 'period', ...(topic < 0 ? [] : ['topic'])].join(', ')
  const columns = `factor_0 AS venue, ${topic < 0 ? '' : `factor_${topic} AS topic, `}`
  const order = `ORDER BY ${place ? 'place NULLS LAST, ' : ''}moment ROWS BETWEEN UNBOUNDED PRECEDING AND 1 PRECEDING`
  const before = (value: string, more: string): string => `coalesce(${value} OVER (PARTITION BY thread, venue${more} ${order}), 0)`
  const others = (value: string, more: string): string => `${before(value, more)} - ${before(value, `${more}, author`)}`
  const own = `, ${cell}`.replace(', venue', '')
  await database.run(`CREATE OR REPLACE TEMP TABLE reply_sum AS
    WITH mean AS (SELECT ${cell}, sum(mentions)::BIGINT AS n, round(sum(score)::DOUBLE / sum(mentions))::BIGINT AS mean FROM (SELECT ${columns} period, mentions, score FROM cell_sum) GROUP BY ${cell}),
    threaded AS (SELECT author, thread, moment, ${place ? 'place, ' : ''}${columns} ${periodSql} AS period, score, ${poster < 0 ? '-1' : `factor_${poster}`} AS poster FROM classified WHERE thread IS NOT NULL),
    centred AS (SELECT threaded.*, n, score - mean AS above FROM threaded JOIN mean USING (${cell})),
    reply AS (SELECT author, venue, poster, above, n, ${others('sum(above)', '')} AS heard, ${others('count(*)', '')} AS posts, ${others('count(*)', own)} AS alike FROM centred),
    placed AS (SELECT author, venue, poster, round(above / ${coarser}.0)::BIGINT AS y,
      round((heard::DOUBLE / posts + alike::DOUBLE / posts * above / greatest(n - 1, 1)) / ${coarser}.0)::BIGINT AS x FROM reply WHERE author IS NOT NULL AND posts > 0)
    SELECT author, venue, poster, count(*) AS replies, sum(x * y)::HUGEINT AS xy, sum(x * x)::HUGEINT AS xx FROM placed GROUP BY author, venue, poster`)
  const grouped = (by: string, sums: string): string => `SELECT venue, ${by} AS poster, sum(replies)::BIGINT AS replies, count(*) AS authors, sum(xy)::HUGEINT AS xy, sum(xx)::HUGEINT AS xx,
    sum(xy * xy)::HUGEINT AS xy_xy, sum(xy * xx)::HUGEINT AS xy_xx, sum(xx * xx)::HUGEINT AS xx_xx FROM ${sums} GROUP BY ALL`
  const together = '(SELECT author, venue, sum(replies) AS replies, sum(xy)::HUGEINT AS xy, sum(xx)::HUGEINT AS xx FROM reply_sum GROUP BY author, venue)'
  const rows = await database.rows<PullSums>(`SELECT * FROM (${grouped('-1', together)}${poster < 0 ? '' : ` UNION ALL ${grouped('poster::INTEGER', 'reply_sum')}`})
    WHERE replies >= ${leastReplies} AND authors >= ${smallest} AND xx > 0 ORDER BY venue, poster`)
  await database.run('DROP TABLE reply_sum')
  return rows.map(pullOf)
}

function pullOf({ venue, poster, replies, authors, xy, xx, ...products }: PullSums): GroupedPull {
  const squares = products.xy_xy * xx * xx - 2n * products.xy_xx * xx * xy + products.xx_xx * xy * xy
  const clusters = Number(authors)
  return {
    venue, poster, replies: Number(replies), authors: clusters, slope: Number(xy) / Number(xx),
    standardError: Math.sqrt((clusters / (clusters - 1)) * Number(squares)) / Number(xx) ** 2,
  }
}
