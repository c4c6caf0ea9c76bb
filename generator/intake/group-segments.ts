import type { SegmentTable } from '../../model/intake/intake-tables.ts'
import type { Database } from './database.ts'
import { byText, foldValue } from './level-names.ts'
import type { MarginWish } from './margins.ts'
import { periodSql, type MentionNames } from './mention-table.ts'
import { scorePart } from './score-sql.ts'

/**
 * Authors of the period under review by the margins together. A mention without an author counts as one. An author has
 * the level that most of its mentions in the period name, the first by name of several; mentions that name none have no
 * say in it. Author means are rounded to score parts, so that what is summed is whole.
 *
 * @param factors - those of the account, followed by `traits`, the columns that only margins ask for
 */
export async function groupSegments(database: Database, { levels: named, review }: MentionNames, factors: readonly string[], traits: readonly string[], wishes: readonly MarginWish[]): Promise<SegmentTable> {
  const margins = wishes.map((wish) => marginLevels(wish, named, factors, traits))
  const joins = margins.map(({ factor, numbers }, m) => `JOIN (VALUES ${numbers.map((level, number) => `(${number}, ${level ?? 'NULL::INTEGER'})`).join(', ')}) AS m${m}(number, level) ON m${m}.number = factor_${factor}`)
  await database.run(`CREATE OR REPLACE TEMP TABLE voiced AS SELECT CASE WHEN author IS NULL THEN -1 - classified.rowid ELSE author::HUGEINT END AS voice, score, ${margins.map((_, m) => `m${m}.level AS margin_${m}`).join(', ')}
    FROM classified ${joins.join(' ')} WHERE ${periodSql} = ${review}`)
  const most = margins.map((_, m) => `LEFT JOIN (SELECT voice, arg_min(margin_${m}, (-posts, margin_${m})) AS level_${m} FROM (
    SELECT voice, margin_${m}, count(*) AS posts FROM voiced WHERE margin_${m} IS NOT NULL GROUP BY ALL) GROUP BY voice) AS most_${m} USING (voice)`)
  const levels = margins.map((_, m) => `level_${m}`).join(', ')
  const rows = await database.rows<SegmentRow>(`SELECT ${levels}, count(*) AS authors, sum(mean)::HUGEINT AS sum, sum(mean::HUGEINT * mean)::HUGEINT AS squares
    FROM (SELECT voice, round(sum(score)::DOUBLE / count(*))::BIGINT AS mean FROM voiced GROUP BY voice) ${most.join(' ')} GROUP BY ${levels} ORDER BY ${levels}`)
  await database.run('DROP TABLE voiced')
  const seen = margins.map(({ names }, m) => names.flatMap((_, level) => (rows.some((row) => row[`level_${m}`] === level) ? [level] : [])))
  return {
    margins: wishes.map(({ margin }) => margin),
    levels: margins.map(({ names }, m) => seen[m]!.map((level) => names[level]!)),
    rows: rows.map((row) => ({
      levels: margins.map((_, m) => { const level = row[`level_${m}`]; return level == null ? -1 : seen[m]!.indexOf(level) }),
      authors: Number(row.authors), sum: Number(row.sum) * scorePart, squares: Number(row.squares) * scorePart ** 2,
    })),
  }
}

interface SegmentRow {
  readonly authors: bigint
  readonly sum: bigint
  readonly squares: bigint
  readonly [level: `level_${number}`]: number | null
}

interface MarginLevels {
  readonly factor: number
  /** Sorted. */
  readonly names: readonly string[]
  /** By number of a level in the database: index into `names`; null where it means that nothing is known. */
  readonly numbers: readonly (number | null)[]
}

/** What stands for an empty field, or for an author that is not known. */
const blankOf = (margin: string, trait: boolean): string => (trait ? '' : margin === 'poster' ? 'unknown' : 'none')

function marginLevels({ margin, levels }: MarginWish, named: readonly (readonly string[])[], factors: readonly string[], traits: readonly string[]): MarginLevels {
  const [factor, blank] = [factors.indexOf(margin), blankOf(margin, traits.includes(margin))]
  const known = new Map(levels.map((level) => [foldValue(level), level]))
  const own = named[factor]!.map((name) => (name === blank ? null : known.get(foldValue(name)) ?? name))
  const names = [...new Set(own.filter((name) => name !== null))].sort(byText)
  return { factor, names, numbers: own.map((name) => (name === null ? null : names.indexOf(name))) }
}
