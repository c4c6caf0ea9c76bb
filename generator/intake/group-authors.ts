import type { Database } from './database.ts'
import { periodSql, type MentionNames } from './mention-table.ts'
import { solitude } from './poster-classes.ts'
import { scoreParts } from './score-sql.ts'

/** Counts of authors by number of step, period, factor and level, as in `MentionNames`. */
export interface AuthorGroups {
  /** A mention without an author counts as one author, here and in `byPeriodLevel`. */
  readonly byStepVenue: readonly { readonly step: number; readonly venue: number; readonly authors: number }[]
  readonly byPeriodLevel: readonly { readonly period: number; readonly factor: number; readonly level: number; readonly authors: number }[]
  /** Known authors only. */
  readonly concentration: readonly { readonly period: number; readonly venue: number; readonly mentionsPerAuthor: number; readonly authors: number }[]
  /** Mentions with a known author, by venue. */
  readonly withAuthor: readonly { readonly venue: number; readonly mentions: number }[]
  /** Known authors by the stance of their mean score in the period, and those of them who posted in the period after as well. */
  readonly staying: readonly { readonly period: number; readonly stance: number; readonly authors: number; readonly stayed: number }[]
}

/** Levels that one mask holds. */
const bits = 63

/**
 * Who posted how often, counted. `active` has one row an author and period with more than one mention there, with the
 * levels they were in as bits, so that distinct authors by level need no grouping by author of their own; mentions that
 * are their author's only one in the period, and those without an author, are counted as they stand.
 */
export async function groupAuthors(database: Database, names: MentionNames): Promise<AuthorGroups> {
  const masks = names.levels.flatMap((levels, factor) => (factor === 0 ? [] : chunks(levels.length).map((chunk) => ({ factor, chunk, column: `mask_${factor}_${chunk}` }))))
  const columns = masks.map(({ factor, chunk, column }) =>
    `bit_or(CASE WHEN factor_${factor} // ${bits} = ${chunk} THEN 1::BIGINT << (factor_${factor} % ${bits})::BIGINT ELSE 0 END) AS ${column}`)
  await database.run(`CREATE TEMP TABLE active AS SELECT ${periodSql} AS period, min(factor_0) AS venue, count(*) AS posts, sum(score)::BIGINT AS score, bool_or(stays) AS stays${columns.map((column) => `, ${column}`).join('')}
    FROM classified WHERE solitude < ${solitude.aloneInPeriod} GROUP BY author, ${periodSql}`)
  const concentration = await counted(database, `SELECT a, b, c, sum(n)::BIGINT AS n FROM (
    SELECT period AS a, venue AS b, posts AS c, count(*) AS n FROM active GROUP BY ALL
    UNION ALL SELECT period, factor_0, 1, known_alone_in_period FROM cell_sum WHERE known_alone_in_period > 0) GROUP BY ALL ORDER BY ALL`)
  const byLevel = [...await counted(database, `SELECT period AS a, 0 AS b, level AS c, sum(n)::BIGINT AS n FROM (
    SELECT period, venue AS level, 1 AS n FROM active UNION ALL SELECT period, factor_0, alone_in_period FROM cell_sum) GROUP BY ALL ORDER BY ALL`)]
  for (const { factor, chunk, column } of masks) {
    byLevel.push(...await counted(database, `SELECT a, ${factor} AS b, c, sum(n)::BIGINT AS n FROM (
      SELECT period AS a, ${chunk * bits} + bit AS c, n FROM (SELECT period, ${column} AS mask, count(*) AS n FROM active GROUP BY ALL), range(${bits}) AS bit(bit) WHERE (mask >> bit) & 1 = 1
      UNION ALL SELECT period, factor_${factor}, alone_in_period FROM cell_sum WHERE factor_${factor} // ${bits} = ${chunk}) GROUP BY ALL ORDER BY ALL`))
  }
  const byStep = await counted(database, 'SELECT step AS a, factor_0 AS b, 0 AS c, sum(first_in_step)::BIGINT AS n FROM cell_sum GROUP BY ALL ORDER BY ALL')
  const staying = await counted(database, `SELECT a, b, c, sum(n)::BIGINT AS n FROM (
    SELECT period AS a, ${stanceSql('score', 'posts')} AS b, stays::INTEGER AS c, count(*) AS n FROM active GROUP BY ALL
    UNION ALL SELECT ${periodSql}, ${stanceSql('score', '1')}, stays::INTEGER, count(*) FROM classified WHERE author IS NOT NULL AND solitude >= ${solitude.aloneInPeriod} GROUP BY ALL) GROUP BY ALL ORDER BY ALL`)
  const withAuthor = await counted(database, 'SELECT 0 AS a, factor_0 AS b, 0 AS c, sum(known)::BIGINT AS n FROM cell_sum GROUP BY ALL ORDER BY ALL')
  return {
    byStepVenue: byStep.map(({ a, b, n }) => ({ step: a, venue: b, authors: n })),
    byPeriodLevel: byLevel.map(({ a, b, c, n }) => ({ period: a, factor: b, level: c, authors: n })),
    concentration: concentration.map(({ a, b, c, n }) => ({ period: a, venue: b, mentionsPerAuthor: c, authors: n })),
    withAuthor: withAuthor.map(({ b, n }) => ({ venue: b, mentions: n })),
    staying: staying.map(({ a, b, c, n }) => ({ period: a, stance: b, authors: n, stayed: c * n })),
  }
}

/** SQL of the third of [-1, 1] that holds a mean, from sums of whole numbers: 0, 1 or 2; its ends belong to the middle one. */
function stanceSql(score: string, posts: string): string {
  return `CASE WHEN 3 * ${score}::BIGINT < -${scoreParts}::BIGINT * ${posts} THEN 0 WHEN 3 * ${score}::BIGINT > ${scoreParts}::BIGINT * ${posts} THEN 2 ELSE 1 END`
}

interface Counted {
  readonly a: number
  readonly b: number
  readonly c: number
  readonly n: number
}

async function counted(database: Database, sql: string): Promise<readonly Counted[]> {
  const rows = await database.rows<Record<keyof Counted, number | bigint>>(sql)
  return rows.map(({ a, b, c, n }) => ({ a: Number(a), b: Number(b), c: Number(c), n: Number(n) }))
}

function chunks(levels: number): readonly number[] {
  return Array.from({ length: Math.ceil(levels / bits) }, (_, chunk) => chunk)
}
