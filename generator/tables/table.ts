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

/** How a column is to be formatted where people read it; a CSV always holds the plain value. */
export type ColumnKind = 'text' | 'date' | 'count' | 'points' | 'change' | 'share' | 'probability' | 'number'

export type Cell = string | number | boolean | null
export type Row = Readonly<Record<string, Cell>>
