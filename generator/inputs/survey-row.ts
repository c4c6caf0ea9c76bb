import { dayNumber } from '../calendar/days.ts'
import { inputExpectations as expected } from '../faults/catalogue-inputs.ts'
import type { Fault } from '../faults/fault.ts'
import type { CsvRow, TableColumns } from './csv-table.ts'
import { rowReader, type RowReader } from './row-reader.ts'

export const surveyColumns: TableColumns = {
  needed: ['wave', 'field_start', 'field_end', 'metric', 'base', 'value', 'kind'],
  optional: ['segment', 'effective_base', 'sd'],
}

/** One row of a survey file: one figure of one wave. */
export interface SurveyRow {
  readonly place: string
  readonly wave: string
  readonly start: string
  readonly end: string
  readonly metric: string
  /** Empty for everyone. */
  readonly segment: string
  readonly kind: 'share' | 'mean'
  readonly base: number
  readonly effectiveBase: number
  readonly value: number
  readonly sd: number | null
}

/** In days: a longer fieldwork is a mistyped year. */
export const longestFieldwork = 366

/** Read a row of a survey file, or tell everything that is wrong with it. */
export function surveyRow(row: CsvRow): SurveyRow | readonly Fault[] {
  const read = rowReader(row)
  const names = { place: row.place, wave: read.text('wave'), metric: read.text('metric'), segment: read.optionalText('segment') }
  const dates = fieldwork(read)
  const bases = sampleSizes(row, read)
  const figure = measured(row, read)
  return read.faults.length > 0 || figure === null ? read.faults : { ...names, ...dates, ...bases, ...figure }
}

function fieldwork(read: RowReader): { readonly start: string; readonly end: string } {
  const [start, end] = [read.date('field_start'), read.date('field_end')]
  const days = dayNumber(end) - dayNumber(start) + 1
  if (days < 1) read.fault('field_end', expected.fieldEnd(start))
  if (days > longestFieldwork) read.fault('field_end', expected.fieldLength(start))
  return { start, end }
}

/** An effective base is never above the base: Kish (1965), Survey Sampling, section 11.7. */
function sampleSizes(row: CsvRow, read: RowReader): { readonly base: number; readonly effectiveBase: number } {
  const base = read.number('base', (n) => Number.isSafeInteger(n) && n >= 1, expected.base)
  if (row.field('effective_base') === '') return { base, effectiveBase: base }
  const effectiveBase = read.number('effective_base', (n) => n >= 1, expected.effectiveBase)
  if (effectiveBase > base) read.fault('effective_base', expected.effectiveWithin(base))
  return { base, effectiveBase }
}

function measured(row: CsvRow, read: RowReader): Pick<SurveyRow, 'kind' | 'value' | 'sd'> | null {
  const kind = row.field('kind').toLowerCase()
  if (kind === 'share') return { kind, value: read.number('value', (share) => share >= 0 && share <= 1, expected.share), sd: null }
  if (kind === 'mean') return { kind, value: read.number('value', () => true, expected.number), sd: read.number('sd', (sd) => sd >= 0, expected.sd) }
  read.fault('kind', expected.kind)
  return null
}
