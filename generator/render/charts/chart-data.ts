import type { Column, Row, Table } from '../../tables/table.ts'
import { rowLabel, valueWord, writeCell } from '../../words/cells.ts'
import type { Words } from '../../words/words.ts'
import type { DrawingSize, Theme } from '../../theme/theme.ts'
import { wrapLabel } from './text-metrics.ts'

/** One mark's worth of data: dates as milliseconds (UTC), labels broken into lines, figures beside their wording. */
export type Datum = Readonly<Record<string, string | number | boolean | null>>

export interface DataOptions {
  readonly words: Words
  readonly theme: Theme
  readonly size: DrawingSize
  /** Whether the chart uses a column of this name: only what is used is worded. */
  readonly uses: (column: string) => boolean
}

/**
 * A table as a chart reads it. Beside its own columns a row has, where the chart uses them:
 * - `KEY_shown`: a figure as the document prints it;
 * - `KEY_said`: the wording of a code, as tables word it;
 * - `rank`: the row's place in the table, from 0.
 */
export function chartData(table: Table, options: DataOptions): readonly Datum[] {
  return table.rows.map((row, rank) => ({ rank, ...Object.fromEntries(table.columns.flatMap((column) => cells(row, column, options))) }))
}

/** Charts name venues by their own label. */
const noLabels = new Map<string, string>()

function cells(row: Row, column: Column, options: DataOptions): [string, Datum[string]][] {
  const { key, kind } = column
  const { words, uses } = options
  const cell = row[key] ?? null
  if (kind === 'date') return [[key, typeof cell === 'string' ? Date.parse(`${cell}T00:00:00Z`) : null]]
  if (key === 'label') return [[key, wrapped(rowLabel(row, words) ?? String(cell), options)]]
  if (typeof cell === 'string') return uses(`${key}_said`) ? [[key, cell], [`${key}_said`, wrapped(valueWord(words, key, cell), options)]] : [[key, cell]]
  if (typeof cell === 'number' && uses(`${key}_shown`)) return [[key, cell], [`${key}_shown`, writeCell(column, row, words, noLabels)]]
  return [[key, cell]]
}

function wrapped(label: string, { theme, size }: DataOptions): string {
  return wrapLabel(label, theme.chart.label_widths[size], { fontSize: theme.chart.font_size }, theme.advances)
}
