import type { CellPart } from './cell-part.ts'
import type { Database } from './database.ts'
import { periodSql, stepSql, type MentionNames } from './mention-table.ts'
import { solitude } from './poster-classes.ts'
import { scorePart, scoreParts } from './score-sql.ts'

interface CellSums {
  readonly mentions: bigint
  readonly score: bigint
  readonly squares: bigint
  /** Known authors, their mentions, and the sum of squares of those by author. */
  readonly authors: bigint
  readonly known: bigint
  readonly clusters: bigint
  readonly step: number
  readonly [level: `factor_${number}`]: number
  readonly [label: `label_${number}`]: bigint
}

/**
 * `cell_sum`: one row a cell with everything that can be summed of its mentions in one pass, so that `classified` need not
 * be read again: of all, of those with an author (`known`), of those that are the first or only one of their author, of
 * those at either end of the scale, and of those with each label.
 */
export async function sumCells(database: Database, factors: readonly string[], labels: number): Promise<void> {
  const keys = cellKeys(factors)
  await database.run(`CREATE TEMP TABLE cell_sum AS SELECT ${keys}, ${stepSql} AS step, ${periodSql} AS period, count(*) AS mentions, sum(score)::HUGEINT AS score, sum(score::BIGINT * score)::HUGEINT AS squares,
    count(author) AS known, coalesce(sum(score) FILTER (author IS NOT NULL), 0)::HUGEINT AS known_score, count(author) FILTER (solitude >= ${solitude.aloneInStep}) AS single,
    count(*) FILTER (solitude >= ${solitude.firstInStep}) AS first_in_step, count(*) FILTER (solitude >= ${solitude.aloneInPeriod}) AS alone_in_period,
    count(author) FILTER (solitude >= ${solitude.aloneInPeriod}) AS known_alone_in_period, count(*) FILTER (abs(score) = ${scoreParts}) AS extremes${labelColumns(labels, (label) => `count(*) FILTER (label = ${label}) AS label_${label}`)}
    FROM classified GROUP BY ${keys}`)
}

/** The cells of `classified`, ordered by step and levels. @param labels - number of labels that are counted; 0 where none are */
export async function groupCells(database: Database, factors: readonly string[], names: MentionNames, labels: number): Promise<readonly CellPart[]> {
  const keys = cellKeys(factors)
  // An author with one mention in the step needs no grouping: only the others are grouped by author.
  const rows = await database.rows<CellSums>(`
    SELECT step, ${keys}, mentions, score, squares, single + coalesce(authors, 0) AS authors, known, single + coalesce(clusters, 0) AS clusters${labelColumns(labels, (label) => `label_${label}`)}
    FROM cell_sum LEFT JOIN (SELECT ${keys}, count(*) AS authors, sum(posts * posts)::BIGINT AS clusters FROM (
      SELECT author, ${keys}, count(*) AS posts FROM classified WHERE solitude < ${solitude.aloneInStep} GROUP BY author, ${keys}) GROUP BY ${keys}) USING (${keys})
    ORDER BY step, ${keys}`)
  return rows.map((row) => cellOf(row, factors, names, labels))
}

function cellOf(row: CellSums, factors: readonly string[], names: MentionNames, labels: number): CellPart {
  const mentions = Number(row.mentions)
  const unknown = row.mentions - row.known
  return {
    step: names.steps[row.step]!,
    levels: factors.map((_, index) => names.levels[index]![row[`factor_${index}`]!]!),
    mentions,
    authors: Number(row.authors + unknown),
    mean: (Number(row.score) / mentions) * scorePart,
    squares: (Number(row.squares * row.mentions - row.score * row.score) / mentions) * scorePart ** 2,
    freedom: mentions - 1,
    clustering: Number(row.clusters + unknown) / mentions,
    deff: Number.NaN,
    labels: Array.from({ length: labels }, (_, label) => Number(row[`label_${label}`])),
  }
}

function labelColumns(labels: number, column: (label: number) => string): string {
  return Array.from({ length: labels }, (_, label) => `, ${column(label)}`).join('')
}

function cellKeys(factors: readonly string[]): string {
  return ['slot', ...factors.map((_, index) => `factor_${index}`)].join(', ')
}
