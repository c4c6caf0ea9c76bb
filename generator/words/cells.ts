import type { Cell, Column, ColumnKind, Row } from '../tables/table.ts'
import type { FormName } from './forms.ts'
import { write } from './forms.ts'
import { levelLabel, partName } from './labels.ts'
import { measure, measureChange, measureInterval, measureSize } from './measures.ts'
import { interval } from './numbers.ts'
import * as numbers from './numbers.ts'
import type { Words } from './words.ts'

const formOf: Readonly<Record<ColumnKind, FormName>> = {
  text: 'text', word: 'text', date: 'short-date', count: 'count', points: 'points', change: 'change', share: 'share', probability: 'probability-figure', number: 'number',
  'p-value': 'p-value', measure: 'measure', 'measure-change': 'measure-change', 'measure-size': 'measure-size', steps: 'steps',
}

/** Whether a column of the kind can head a row. */
export function isRowLabel(kind: string): boolean {
  return kind === 'text' || kind === 'word' || kind === 'date'
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
  if (typeof value === 'number') return `${write(value, formOf[column.kind], words, unitOf(row, column.kind))}${mark(column, row, words)}`
  if (column.kind === 'date') return String(write(value, 'short-date', words))
  return writeText(column.key, value, row, words, labels)
}

/** What a row's measures are counted in: the kind of its metric, or the grid. */
function unitOf(row: Row, kind: ColumnKind): string {
  const unit = kind === 'steps' ? row['grid'] : row['kind']
  return typeof unit === 'string' ? unit : ''
}

/** A survey's figure on a small base carries a mark. */
function mark({ kind }: Column, row: Row, words: Words): string {
  return kind === 'measure' && row['shown'] === 'flagged' ? words.say('mark-flagged') : ''
}

/**
 * What a row is called: a metric by its own label, with the segment if it is that of one, a series compared with the survey by the catalogue or its venue's label, a level as everywhere.
 *
 * @returns undefined where the row has no label
 */
export function rowLabel(row: Row, words: Words): string | undefined {
  const { label, level = row['venue'], series, metric, segment } = row
  if (typeof label !== 'string') return undefined
  if (typeof metric === 'string' && typeof segment === 'string') return words.say('metric-segment', { label, segment })
  if (series === 'venue') return words.say('venue-raw', { label: levelLabel({ label, level: typeof level === 'string' ? level : label }, words) })
  if (typeof series === 'string') return levelLabel({ label, series, level: label }, words)
  return typeof level === 'string' ? levelLabel({ label, level }, words) : label
}

const driftScale = 'venue_drift.'

/** So many characters tell two files apart where people compare them; the whole fingerprint is in the CSV and the findings. */
const fingerprintShown = 12

/** Columns that name a period. */
const ofPeriods = ['period', 'next_period', 'after', 'before']

function writeText(key: string, value: string, row: Row, words: Words, labels: Labels): string {
  if (key === 'label') return rowLabel(row, words) ?? value
  if (ofPeriods.includes(key)) return String(write(value, 'period', words))
  if (key === 'factor') return String(write(value, 'factor', words))
  if (key === 'sha256') return value.slice(0, fingerprintShown)
  if (key === 'venue') return labels.get(value) ?? value
  if (key === 'poster') return value === 'all' ? words.say('poster-all') : levelLabel({ label: value, poster: value }, words)
  if (key === 'scale' && value.startsWith(driftScale)) {
    const venue = value.slice(driftScale.length)
    return words.say('scale-venue_drift', { venue: labels.get(venue) ?? venue })
  }
  return key === 'scope' ? labels.get(value) ?? valueWord(words, key, value) : valueWord(words, key, value)
}

const measureFormats: Readonly<Partial<Record<ColumnKind, typeof measure>>> = { measure, 'measure-change': measureChange, 'measure-size': measureSize }

/** Two bounds in one cell: `1.2 to 5.0`. */
export function writeBounds(low: Cell, high: Cell, kind: ColumnKind, words: Words, row: Row = {}): string {
  if (typeof low !== 'number' || typeof high !== 'number') return words.say('cell-empty')
  const format = measureFormats[kind]
  if (format) return measureInterval({ low, high }, unitOf(row, kind), format, words)
  if (kind === 'share') return interval({ low, high }, (value) => numbers.share(value, words), words)
  return interval({ low, high }, kind === 'change' ? numbers.change : kind === 'number' ? numbers.number : numbers.points, words)
}
