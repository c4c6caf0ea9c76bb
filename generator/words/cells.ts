import type { Cell, Column, ColumnKind, Row } from '../tables/table.ts'
import type { FormName } from './forms.ts'
import { write } from './forms.ts'
import { levelLabel, partName } from './labels.ts'
import { interval } from './numbers.ts'
import * as numbers from './numbers.ts'
import type { Words } from './words.ts'

const formOf: Readonly<Record<ColumnKind, FormName>> = {
  text: 'text', date: 'short-date', count: 'count', points: 'points', change: 'change', share: 'share', probability: 'probability-figure', number: 'number',
}

/** Whether a column of the kind can head a row. */
export function isRowLabel(kind: string): boolean {
  return kind === 'text' || kind === 'date'
}

/** Labels of venues by name, for the tables that hold only the name. */
export type Labels = ReadonlyMap<string, string>

/**
 * A value that the findings name by a code, in words: `part-venue_mix`. A value that the catalogue doesn't know is
 * the account's own and stays as it is.
 */
export function valueWord(words: Words, column: string, value: string): string {
  if (column === 'part') return partName(value, words)
  const key = `${column}-${value}`
  return words.has(key) ? words.say(key) : value
}

/** A cell of a table as people read it. */
export function writeCell(column: Column, row: Row, words: Words, labels: Labels): string {
  const value = row[column.key] ?? null
  if (value === null) return words.say('cell-empty')
  if (typeof value === 'boolean') return words.say(value ? 'cell-yes' : 'cell-no')
  if (typeof value === 'number') return String(write(value, formOf[column.kind], words))
  if (column.kind === 'date') return String(write(value, 'short-date', words))
  return writeText(column.key, value, row, words, labels)
}

const driftScale = 'venue_drift.'

/** So many characters tell two files apart where people compare them; the whole fingerprint is in the CSV and the findings. */
const fingerprintShown = 12

function writeText(key: string, value: string, row: Row, words: Words, labels: Labels): string {
  const level = row['venue'] ?? row['level']
  if (key === 'label' && typeof level === 'string') return levelLabel({ label: value, level }, words)
  if (key === 'period') return String(write(value, 'period', words))
  if (key === 'factor') return String(write(value, 'factor', words))
  if (key === 'sha256') return value.slice(0, fingerprintShown)
  if (key === 'venue') return labels.get(value) ?? value
  if (key === 'scale' && value.startsWith(driftScale)) {
    const venue = value.slice(driftScale.length)
    return words.say('scale-venue_drift', { venue: labels.get(venue) ?? venue })
  }
  return key === 'scope' ? labels.get(value) ?? valueWord(words, key, value) : valueWord(words, key, value)
}

/** Two bounds in one cell: `1.2 to 5.0`. */
export function writeBounds(low: Cell, high: Cell, kind: ColumnKind, words: Words): string {
  if (typeof low !== 'number' || typeof high !== 'number') return words.say('cell-empty')
  return interval({ low, high }, kind === 'change' ? numbers.change : kind === 'number' ? numbers.number : numbers.points, words)
}
