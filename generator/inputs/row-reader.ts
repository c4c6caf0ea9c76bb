import { isDate } from '../calendar/days.ts'
import { inputExpectations as expected } from '../faults/catalogue-inputs.ts'
import { faultOf } from '../faults/catalogue.ts'
import type { Fault } from '../faults/fault.ts'
import type { CsvRow } from './csv-table.ts'

/** Reads the fields of one row; what is wrong with them gathers in `faults`. */
export interface RowReader {
  readonly faults: readonly Fault[]
  /** A field that may not be empty. */
  text(column: string): string
  /** An ISO date. */
  date(column: string): string
  /** A finite number for which `holds`; NaN where the field is no such one. */
  number(column: string, holds: (value: number) => boolean, expectation: string): number
  /** That a field which could be read is wrong all the same. */
  fault(column: string, expectation: string): void
}

/** A reader of a row. */
export function rowReader(row: CsvRow): RowReader {
  const faults: Fault[] = []
  const fault = (column: string, expectation: string): void => {
    faults.push(faultOf('input-value', `${row.place} ${column}`, { actual: row.field(column), expected: expectation }))
  }
  return {
    faults, fault,
    text: (column) => {
      const text = row.field(column)
      if (text === '') fault(column, expected.text)
      return text
    },
    date: (column) => {
      const date = row.field(column)
      if (!isDate(date)) fault(column, expected.date)
      return date
    },
    number: (column, holds, expectation) => {
      const text = row.field(column)
      const value = /^[+-]?(\d+\.?\d*|\.\d+)(e[+-]?\d+)?$/i.test(text) ? Number(text) : Number.NaN
      if (Number.isFinite(value) && holds(value)) return value
      fault(column, /^[+-]?\d[\d.]*(,\d+)+$/.test(text) ? expected.decimalPoint : expectation)
      return Number.NaN
    },
  }
}
