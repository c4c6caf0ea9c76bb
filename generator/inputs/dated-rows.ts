import { inputExpectations as expected } from '../faults/catalogue-inputs.ts'
import { faultOf } from '../faults/catalogue.ts'
import type { Fault } from '../faults/fault.ts'
import type { CsvRow, TableColumns } from './csv-table.ts'
import type { RawEvent, RawOutcome } from './raw-inputs.ts'
import { rowReader } from './row-reader.ts'

export const eventColumns: TableColumns = { needed: ['date', 'label'], optional: ['kind'] }
export const outcomeColumns: TableColumns = { needed: ['date', 'value'], optional: ['market'] }

/** Read a row of an event file, or tell everything that is wrong with it. */
export function eventRow(row: CsvRow): RawEvent | readonly Fault[] {
  const read = rowReader(row)
  const event = { date: read.date('date'), label: read.text('label'), kind: read.optionalText('kind') }
  return read.faults.length > 0 ? read.faults : event
}

export interface OutcomeRow extends RawOutcome {
  readonly place: string
}

/** A smaller one is mistyped: its logarithm would drown all others. */
const leastPositive = 1e-12

/** Read a row of an outcome file, or tell everything that is wrong with it. */
export function outcomeRow(row: CsvRow): OutcomeRow | readonly Fault[] {
  const read = rowReader(row)
  const positive = (column: string): number => read.number(column, (value) => value >= leastPositive, expected.positiveLogarithm, expected.positive)
  const outcome = { place: row.place, date: read.date('date'), value: positive('value'), market: row.field('market') === '' ? null : positive('market') }
  return read.faults.length > 0 ? read.faults : outcome
}

/** Dates that come twice, and too few of them. @param rows - in order of time @param place - of the whole */
export function outcomeFaults(rows: readonly OutcomeRow[], place: string): readonly Fault[] {
  return [
    ...rows.flatMap((row, index) => (index > 0 && rows[index - 1]!.date === row.date ? [faultOf('outcome-twice', `${row.place} date`, { date: row.date, first: rows[index - 1]!.place })] : [])),
    ...(rows.length < 2 ? [faultOf('outcome-short', place, { rows: rows.length })] : []),
  ]
}
