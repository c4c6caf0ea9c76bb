import type { Estimate } from '../../model/findings/schema.ts'
import type { Cell, Column, ColumnKind, Row, Table } from './table.ts'

/**
 * A table from a record of column kinds, in the order in which they are written down.
 *
 * @param name - also the name of its CSV
 * @param kinds - key of each column and how it is formatted
 * @param rows - one record per row; every column must be present
 * @throws {TypeError} a row that lacks a column: a slip of this program, never of an input
 */
export function makeTable<K extends string>(name: string, kinds: Readonly<Record<K, ColumnKind>>, rows: readonly Readonly<Record<K, Cell>>[]): Table {
  const columns: Column[] = (Object.keys(kinds) as K[]).map((key) => ({ key, kind: kinds[key] }))
  for (const row of rows) {
    const absent = columns.find((column) => (row as Row)[column.key] === undefined)
    if (absent) throw new TypeError(`Table ${name}: a row lacks ${absent.key}`)
  }
  return { name, columns, rows }
}

/** The three cells of an estimate: `level`, `level_low`, `level_high`; all null where there is no estimate. */
export function estimateCells<K extends string>(key: K, estimate: Estimate | null): Record<K | `${K}_low` | `${K}_high`, number | null> {
  const cells = { [key]: estimate?.mean ?? null, [`${key}_low`]: estimate?.low ?? null, [`${key}_high`]: estimate?.high ?? null }
  return cells as Record<K | `${K}_low` | `${K}_high`, number | null>
}

/**
 * A figure that rests on fewer than the smallest group shown is withheld, so that nobody can be made out in it.
 *
 * @param figure - the figure as found
 * @param group - authors (or mentions, where authors are not counted: there are never more authors than mentions)
 * @param smallest - the smallest group shown, findings.method.smallest_group
 */
export function withheldBelow(figure: number | null, group: number, smallest: number): number | null {
  return group < smallest ? null : figure
}
