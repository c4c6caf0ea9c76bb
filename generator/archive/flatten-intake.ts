import type { AuthorVariation, IntakeTables } from '../../model/intake/intake-tables.ts'
import { real, rowsOfTable, tableOfRows, whole, type NumberTable } from './number-table.ts'

/**
 * The intake tables as an archive keeps them: long tables as numbers, and everything that gives the numbers their meaning as `facts`, plain data
 * for JSON. Both directions are exact, bit for bit, but for the values that could not be read, which are not kept.
 */
export interface FlatIntake {
  readonly numbers: readonly NumberTable[]
  readonly facts: IntakeFacts
}

/** What is not a long table. Typed arrays are written as lists. */
export type IntakeFacts = Pick<IntakeTables, 'factors' | 'variation' | 'hindsight' | 'noLabels'> & {
  readonly timeline: Omit<IntakeTables['timeline'], 'periodOf' | 'inBase'> & { readonly periodOf: readonly number[]; readonly inBase: readonly number[] }
  readonly accounting: Omit<IntakeTables['accounting'], 'withAuthor'> & { readonly withAuthor: readonly number[] }
  readonly labels: { readonly names: readonly string[]; readonly scores: readonly number[] } | null
  readonly segments: Pick<NonNullable<IntakeTables['segments']>, 'margins' | 'levels'> | null
  readonly authors: { readonly exact: boolean; readonly byPeriod: readonly number[]; readonly byPeriodLevel: readonly (readonly number[])[] }
  readonly variation: readonly (AuthorVariation | null)[]
}

const kinds = {
  staying: { period: 'whole', stance: 'whole', authors: 'whole', stayed: 'whole' },
  extremes: { period: 'whole', venue: 'whole', mentions: 'whole', extremes: 'whole' },
  pull: { venue: 'whole', poster: 'whole', replies: 'whole', authors: 'whole', slope: 'real', standardError: 'real' },
  concentration: { period: 'whole', venue: 'whole', mentionsPerAuthor: 'whole', authors: 'whole' },
} as const

/** Columns of every cell that are whole numbers or real ones, besides its levels and labels. */
const cellReals = ['mentions', 'authors', 'mean', 'squares', 'freedom', 'clustering', 'deff'] as const

export function flattenIntake(tables: IntakeTables): FlatIntake {
  const { timeline, cells, labels, segments, authors, accounting } = tables
  return {
    numbers: [
      { name: 'cells', columns: {
        step: whole(cells.step),
        ...Object.fromEntries(cells.levels.map((levels, f) => [`factor_${f}`, whole(levels)])),
        ...Object.fromEntries(cellReals.map((name) => [name, real(cells[name])])),
        ...Object.fromEntries((labels?.names ?? []).map((_, l) => [`label_${l}`, real(columnOf(labels?.counts ?? [], labels?.names.length ?? 1, l))])),
      } },
      { name: 'authors', columns: {
        all: real(authors.byStep),
        ...Object.fromEntries(tables.factors[0].levels.map((_, v, venues) => [`venue_${v}`, real(columnOf(authors.byStepVenue, venues.length, v))])),
      } },
      tableOfRows('staying', tables.staying, kinds.staying),
      tableOfRows('extremes', tables.extremes, kinds.extremes),
      tableOfRows('pull', tables.pull, kinds.pull),
      tableOfRows('concentration', tables.concentration, kinds.concentration),
      ...(segments === null ? [] : [{ name: 'segments', columns: {
        ...Object.fromEntries(segments.margins.map((_, m) => [`margin_${m}`, whole(segments.rows.map(({ levels }) => levels[m]))])),
        authors: whole(segments.rows.map((row) => row.authors)), sum: real(segments.rows.map(({ sum }) => sum)), squares: real(segments.rows.map(({ squares }) => squares)),
      } }]),
    ],
    facts: {
      factors: tables.factors, variation: tables.variation, hindsight: tables.hindsight, noLabels: tables.noLabels,
      timeline: { ...timeline, periodOf: [...timeline.periodOf], inBase: [...timeline.inBase] },
      // of a mistaken column these may be the words of a post: no figure rests on them
      accounting: { ...accounting, unread: [], withAuthor: [...accounting.withAuthor] },
      labels: labels === null ? null : { names: labels.names, scores: [...labels.scores] },
      segments: segments === null ? null : { margins: segments.margins, levels: segments.levels },
      authors: { exact: authors.exact, byPeriod: [...authors.byPeriod], byPeriodLevel: authors.byPeriodLevel.map((counts) => [...counts]) },
    },
  }
}

/** @throws {Error} where a table is missing */
export function unflattenIntake({ numbers, facts }: FlatIntake): IntakeTables {
  const table = (name: string): NumberTable => {
    const found = numbers.find((one) => one.name === name)
    if (found === undefined) throw new Error(`Unexpected absence of the table ${name}, expected it among ${numbers.map((one) => one.name).join(', ')}`)
    return found
  }
  const [cells, authors] = [table('cells').columns, table('authors').columns]
  const venues = facts.factors[0].levels.length
  return {
    ...facts,
    timeline: { ...facts.timeline, periodOf: Int32Array.from(facts.timeline.periodOf), inBase: Uint8Array.from(facts.timeline.inBase) },
    accounting: { ...facts.accounting, withAuthor: Float64Array.from(facts.accounting.withAuthor) },
    cells: {
      count: cells['step'].values.length, step: Int32Array.from(cells['step'].values),
      levels: facts.factors.map((_, f) => Int32Array.from(cells[`factor_${f}`].values)),
      ...Object.fromEntries(cellReals.map((name) => [name, Float64Array.from(cells[name].values)])) as Pick<IntakeTables['cells'], (typeof cellReals)[number]>,
    },
    labels: facts.labels === null ? null : {
      names: facts.labels.names, scores: Float64Array.from(facts.labels.scores),
      counts: interleave(facts.labels.names.map((_, l) => cells[`label_${l}`].values)),
    },
    authors: {
      exact: facts.authors.exact, byStep: Float64Array.from(authors['all'].values),
      byStepVenue: interleave(Array.from({ length: venues }, (_, v) => authors[`venue_${v}`].values)),
      byPeriod: Float64Array.from(facts.authors.byPeriod), byPeriodLevel: facts.authors.byPeriodLevel.map((counts) => Float64Array.from(counts)),
    },
    staying: rowsOfTable(table('staying'), ['period', 'stance', 'authors', 'stayed']) as IntakeTables['staying'],
    extremes: rowsOfTable(table('extremes'), ['period', 'venue', 'mentions', 'extremes']),
    pull: rowsOfTable(table('pull'), ['venue', 'poster', 'replies', 'authors', 'slope', 'standardError']),
    concentration: rowsOfTable(table('concentration'), ['period', 'venue', 'mentionsPerAuthor', 'authors']),
    segments: facts.segments === null ? null : { ...facts.segments, rows: segmentRows(table('segments'), facts.segments.margins.length) },
  }
}

function segmentRows({ columns }: NumberTable, margins: number): NonNullable<IntakeTables['segments']>['rows'] {
  return Array.from(columns['authors'].values, (authors, row) => ({
    levels: Array.from({ length: margins }, (_, m) => columns[`margin_${m}`].values[row]), authors, sum: columns['sum'].values[row], squares: columns['squares'].values[row],
  }))
}

/** Every `width`-th value, from the `at`-th on. */
function columnOf(values: ArrayLike<number>, width: number, at: number): Float64Array {
  return Float64Array.from({ length: values.length / width }, (_, row) => values[row * width + at])
}

/** The other way round: columns of equal length, row by row. */
function interleave(columns: readonly ArrayLike<number>[]): Float64Array {
  const rows = columns.length === 0 ? 0 : columns[0].length
  return Float64Array.from({ length: rows * columns.length }, (_, i) => columns[i % columns.length][Math.floor(i / columns.length)])
}
