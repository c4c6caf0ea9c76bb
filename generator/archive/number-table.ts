/** A column of numbers: whole ones, or any, not-a-number among them. */
export interface NumberColumn {
  readonly kind: 'whole' | 'real'
  readonly values: ArrayLike<number>
}

/** A table that holds numbers only, by column; every column is equally long. */
export interface NumberTable {
  readonly name: string
  readonly columns: Readonly<Record<string, NumberColumn>>
}

export const whole = (values: ArrayLike<number>): NumberColumn => ({ kind: 'whole', values })
export const real = (values: ArrayLike<number>): NumberColumn => ({ kind: 'real', values })

/** Rows of a table that was given by column. */
export function rowsOf({ columns }: NumberTable): number {
  return Math.max(0, ...Object.values(columns).map(({ values }) => values.length))
}

/** A table of rows, by column; which columns are whole numbers is said by name. */
export function tableOfRows<K extends string>(name: string, rows: readonly Readonly<Record<K, number>>[], kinds: Readonly<Record<K, NumberColumn['kind']>>): NumberTable {
  const names = Object.keys(kinds) as K[]
  return { name, columns: Object.fromEntries(names.map((column) => [column, { kind: kinds[column], values: Float64Array.from(rows, (row) => row[column]) }])) }
}

/** The rows again. */
export function rowsOfTable<K extends string>(table: NumberTable, names: readonly K[]): readonly Readonly<Record<K, number>>[] {
  return Array.from({ length: rowsOf(table) }, (_, row) => Object.fromEntries(names.map((name) => [name, table.columns[name].values[row]])) as Record<K, number>)
}
