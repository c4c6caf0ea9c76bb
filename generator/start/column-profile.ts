import { nameEvidence, type NameEvidence } from './column-names.ts'
import type { NumberSummary, Tally } from './score-forms.ts'
import { readTimes, type TimeReading } from './time-forms.ts'

/** A column at the beginning of a file: its name and its values in the order of the rows, empty where there is none. */
export interface HeadColumn {
  readonly name: string
  readonly values: readonly string[]
}

/** What the first rows say about a column. */
export interface ColumnProfile extends HeadColumn {
  readonly names: NameEvidence
  /** Rows with a value. */
  readonly filled: number
  readonly distinct: number
  /** Share of the filled rows whose value stands in other rows too. */
  readonly repeated: number
  /** Mean number of characters and of words of a value. */
  readonly characters: number
  readonly words: number
  /** Every value with its rows, the most frequent first. */
  readonly tally: Tally
  /** null unless nearly all values are numbers. */
  readonly numbers: NumberSummary | null
  readonly time: TimeReading | null
}

/** Share of the values that must be numbers in a column of numbers. */
const leastNumbers = 0.95

/** @param decimalCommas - whether `3,5` is a number */
export function profileOf(column: HeadColumn, decimalCommas: boolean): ColumnProfile {
  const filled = column.values.map((value) => value.trim()).filter((value) => value !== '')
  const tally = tallyOf(filled)
  const total = (measure: (value: string) => number): number => filled.reduce((sum, value) => sum + measure(value), 0) / Math.max(1, filled.length)
  return {
    ...column, names: nameEvidence(column.name), filled: filled.length, distinct: tally.length,
    repeated: tally.filter(({ rows }) => rows > 1).reduce((sum, { rows }) => sum + rows, 0) / Math.max(1, filled.length),
    characters: total((value) => value.length), words: total((value) => value.split(/\s+/).length),
    tally, numbers: numbersOf(tally, filled.length, decimalCommas), time: readTimes(column.values),
  }
}

function tallyOf(values: readonly string[]): Tally {
  const counts = new Map<string, number>()
  for (const value of values) counts.set(value, (counts.get(value) ?? 0) + 1)
  return [...counts].map(([value, rows]) => ({ value, rows })).sort((a, b) => b.rows - a.rows || (a.value < b.value ? -1 : 1))
}

/** The numbers among the values of a column; null where fewer than 95 % of its rows have one. */
export function numbersOf(tally: Tally, rows: number, decimalCommas: boolean): NumberSummary | null {
  const numeric = tally.flatMap(({ value, rows: count }) => {
    const text = decimalCommas && /^[-+]?\d+,\d+$/.test(value) ? value.replace(',', '.') : value
    return /^[-+]?(\d+\.?\d*|\.\d+)$/.test(text) ? [{ number: Number(text), rows: count }] : []
  })
  if (numeric.length === 0 || numeric.reduce((sum, value) => sum + value.rows, 0) < leastNumbers * rows) return null
  const numbers = numeric.map(({ number }) => number)
  const bound = (pick: (a: number, b: number) => number): number => numbers.reduce((most, number) => pick(most, number))
  return { low: bound(Math.min), high: bound(Math.max), whole: numbers.every(Number.isInteger), distinct: new Set(numbers).size }
}
