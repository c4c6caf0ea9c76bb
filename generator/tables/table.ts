/**
 * The figures behind every chart, as plain rows: what a chart draws, what the document prints and what
 * `tables/NAME.csv` holds are the same table, made from the findings by one function.
 */
export interface Table {
  /** Also the name of its CSV, e.g. `opinion`. */
  readonly name: string
  readonly columns: readonly Column[]
  readonly rows: readonly Row[]
}

export interface Column {
  readonly key: string
  readonly kind: ColumnKind
}

/** How a column is to be formatted where people read it; a CSV always holds the plain value. A measure is a survey's, and the row's `kind` says of which kind; steps are counted in those of the row's `grid`. A word is text so short that it is not broken. */
export type ColumnKind = 'text' | 'word' | 'date' | 'count' | 'points' | 'change' | 'share' | 'probability' | 'number' | 'p-value' | 'measure' | 'measure-change' | 'measure-size' | 'steps'

export type Cell = string | number | boolean | null
export type Row = Readonly<Record<string, Cell>>
