import type { Element, ElementContent } from 'hast'
import { h } from 'hastscript'
import { isRowLabel, writeBounds, writeCell } from '../words/cells.ts'
import type { Labels } from '../words/cells.ts'
import type { Words } from '../words/words.ts'
import type { Column, Row, Table } from '../tables/table.ts'
import type { PrintedColumn } from './table-columns.ts'

interface Surroundings {
  readonly caption: string
  readonly after: readonly ElementContent[]
  /** The wording of each column's header. */
  readonly headers: readonly string[]
  readonly labels: Labels
}

/**
 * A table as people read it: caption, column headers, the first text column heading its rows; figures carry the class of
 * their column's kind (`kind-points`, `kind-interval`, ...), by which they are aligned.
 */
export function tableTree(
  table: Table, columns: readonly PrintedColumn[], { caption, after, headers, labels }: Surroundings, words: Words,
): Element {
  const rowHeader = columns.findIndex((column) => column.keys.length === 1 && isRowLabel(kindOf(table, column)))
  const cells = (row: Row) => columns.map((column, at) => {
    const content = written(table, column, row, labels, words)
    const className = [`kind-${kindOf(table, column)}`]
    return at === rowHeader ? h('th', { scope: 'row', className }, content) : h('td', { className }, content)
  })
  return h('div.table', { role: 'group', ariaLabel: caption, tabIndex: 0, dataTable: table.name }, [
    h('table', { className: [`table-${table.name}`] }, [
      h('caption', [caption, ...after]),
      h('thead', [h('tr', columns.map((column, at) => h('th', { scope: 'col', className: [`kind-${kindOf(table, column)}`] }, headers[at])))]),
      h('tbody', table.rows.map((row) => h('tr', cells(row)))),
    ]),
  ])
}

function written(table: Table, { keys }: PrintedColumn, row: Row, labels: Labels, words: Words): string {
  const [first, second] = keys
  if (second !== undefined) return writeBounds(row[first] ?? null, row[second] ?? null, columnOf(table, first).kind, words, row)
  return writeCell(columnOf(table, first), row, words, labels)
}

function kindOf(table: Table, { keys }: PrintedColumn): string {
  return keys.length === 2 ? 'interval' : columnOf(table, keys[0]).kind
}

function columnOf(table: Table, key: string): Column {
  return table.columns.find((column) => column.key === key) ?? { key, kind: 'text' }
}
