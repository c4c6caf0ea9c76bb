import type { BenchmarkMargin } from '../../model/inputs/small-inputs.ts'
import { inputExpectations as expected } from '../faults/catalogue-inputs.ts'
import { faultOf } from '../faults/catalogue.ts'
import type { Fault } from '../faults/fault.ts'
import { foldValue } from '../intake/level-names.ts'
import type { CsvRow, TableColumns } from './csv-table.ts'
import { rowReader } from './row-reader.ts'

export const benchmarkColumns: TableColumns = { needed: ['margin', 'level', 'share'], optional: [] }

/** One row of a benchmark file: the share of customers at one level of one trait. */
export interface BenchmarkRow {
  readonly place: string
  readonly margin: string
  readonly level: string
  readonly share: number
}

/** Shares are rounded when they are written down. */
const roundingOfSum = 0.005

/** Read a row of a benchmark file, or tell everything that is wrong with it. */
export function benchmarkRow(row: CsvRow): BenchmarkRow | readonly Fault[] {
  const read = rowReader(row)
  const level = { place: row.place, margin: read.text('margin'), level: read.text('level'), share: read.number('share', (share) => share >= 0 && share <= 1, expected.share) }
  return read.faults.length > 0 ? read.faults : level
}

/** Levels that come twice, and margins whose shares do not sum to 1, each told where it begins. @param rows - all of them, sound each */
export function benchmarkFaults(rows: readonly BenchmarkRow[]): readonly Fault[] {
  return byMargin(rows).flatMap((margin) => {
    const firstOf = new Map<string, BenchmarkRow>()
    const twice = margin.flatMap((row) => {
      const first = firstOf.get(foldValue(row.level))
      if (first === undefined) firstOf.set(foldValue(row.level), row)
      return first === undefined ? [] : [faultOf('benchmark-twice', row.place, { margin: row.margin, level: row.level, first: first.place })]
    })
    const sum = sumOf(margin)
    // A level too many spoils the sum: that is told once. A sum of 1.005 is off by a little more in floating point.
    const off = twice.length === 0 && Math.abs(sum - 1) > roundingOfSum + 1e-9
    return off ? [faultOf('benchmark-sum', `${margin[0]!.place} share`, { margin: margin[0]!.margin, sum })] : twice
  })
}

/** Margins and their levels in the order and spelling in which they first come; shares of a margin sum to 1. */
export function marginsOf(rows: readonly BenchmarkRow[]): readonly BenchmarkMargin[] {
  return byMargin(rows).map((margin) => ({
    margin: margin[0]!.margin, levels: margin.map(({ level, share }) => ({ level, share: share / sumOf(margin) })),
  }))
}

function byMargin(rows: readonly BenchmarkRow[]): readonly (readonly BenchmarkRow[])[] {
  const margins = new Map<string, BenchmarkRow[]>()
  for (const row of rows) margins.set(foldValue(row.margin), [...(margins.get(foldValue(row.margin)) ?? []), row])
  return [...margins.values()]
}

function sumOf(rows: readonly BenchmarkRow[]): number {
  return rows.reduce((sum, { share }) => sum + share, 0)
}
