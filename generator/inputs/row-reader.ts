import { isLongName, mostCharacters } from '../account/long-name.ts'
import { dataDates, isDate } from '../calendar/days.ts'
import { inputExpectations as expected } from '../faults/catalogue-inputs.ts'
import { faultOf } from '../faults/catalogue.ts'
import type { Fault } from '../faults/fault.ts'
import type { CsvRow } from './csv-table.ts'

/** Reads the fields of one row; what is wrong with them gathers in `faults`. */
export interface RowReader {
  readonly faults: readonly Fault[]
  /** A name that may not be empty, of at most 80 characters. */
  text(column: string): string
  /** The same where it may be. */
  optionalText(column: string): string
  /** An ISO date from 1900 to 2199. */
  date(column: string): string
  /**
   * A number of at most 1e12 in size for which `holds`; NaN where the field is no such one.
   *
   * @param unreadable - what to expect of a field that is no number at all, where the expectation gives a reason that does not hold then
   */
  number(column: string, holds: (value: number) => boolean, expectation: string, unreadable?: string): number
  /** That a field which could be read is wrong all the same. */
  fault(column: string, expectation: string): void
}

/** Larger numbers are mistyped, and their squares run out of floating point. */
const largestNumber = 1e12

/** A reader of a row. */
export function rowReader(row: CsvRow): RowReader {
  const faults: Fault[] = []
  const fault = (column: string, expectation: string): void => {
    faults.push(faultOf('input-value', `${row.place} ${column}`, { actual: row.field(column), expected: expectation }))
  }
  const optionalText = (column: string): string => {
    const text = row.field(column)
    if (isLongName(text)) fault(column, expected.shortText(mostCharacters))
    return text
  }
  return {
    faults, fault, optionalText,
    text: (column) => {
      const text = optionalText(column)
      if (text === '') fault(column, expected.text)
      return text
    },
    date: (column) => {
      const date = row.field(column)
      if (!isDate(date)) fault(column, expected.date)
      else if (date < dataDates.first || date > dataDates.last) fault(column, expected.dataDate)
      return date
    },
    number: (column, holds, expectation, unreadable = expectation) => {
      const text = row.field(column)
      const value = /^[+-]?(\d+\.?\d*|\.\d+)(e[+-]?\d+)?$/i.test(text) ? Number(text) : Number.NaN
      if (Math.abs(value) <= largestNumber && holds(value)) return value
      fault(column, Number.isNaN(value) ? unreadableAs(text) ?? unreadable : Math.abs(value) > largestNumber ? expected.magnitude : expectation)
      return Number.NaN
    },
  }
}

/** What a field that holds a number after all should have been written like; null for any other text. */
function unreadableAs(text: string): string | null {
  if (/^[+-]?[\d.,]+ ?%$/.test(text)) return expected.percentSign
  if (/^[+-]?[1-9]\d{0,2}([,'’\s]\d{3})+(\.\d+)?$/u.test(text)) return expected.thousands
  return /^[+-]?\d[\d.]*(,\d+)+$/.test(text) ? expected.decimalPoint : null
}
