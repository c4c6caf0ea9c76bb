import type { ImportanceInput } from '../../model/inputs/small-inputs.ts'
import type { Account } from '../account/account.ts'
import { inputExpectations as expected } from '../faults/catalogue-inputs.ts'
import { faultOf } from '../faults/catalogue.ts'
import type { Fault } from '../faults/fault.ts'
import { topicNames } from './account-names.ts'
import type { CsvRow } from './csv-table.ts'
import { rowReader } from './row-reader.ts'

/** A topic and how much it matters, on any scale. */
export interface WeightRow {
  readonly place: string
  readonly topic: string
  readonly weight: number
}

/** Reads a row of stated weights, or tells everything that is wrong with it. */
export function weightRowOf(account: Account): (row: CsvRow) => WeightRow | readonly Fault[] {
  const topics = topicNames(account)
  return (row) => {
    const read = rowReader(row)
    const written = read.text('topic')
    const topic = topics.nameOf(written)
    const weight = read.number('weight', (value) => value >= 0, expected.weight)
    const faults = [...read.faults, ...(written !== '' && topic === null ? [topics.fault(written, `${row.place} topic`)] : [])]
    return faults.length > 0 || topic === null ? faults : { place: row.place, topic, weight }
  }
}

/** Topics that come twice, and weights that say nothing. @param place - of the whole */
export function weightFaults(rows: readonly WeightRow[], place: string): readonly Fault[] {
  const firstOf = new Map<string, WeightRow>()
  const twice = rows.flatMap((row) => {
    const first = firstOf.get(row.topic)
    if (first === undefined) firstOf.set(row.topic, row)
    return first === undefined ? [] : [faultOf('importance-twice', row.place, { topic: row.topic, first: first.place })]
  })
  return [...twice, ...(rows.length > 0 && rows.every(({ weight }) => weight === 0) ? [faultOf('importance-nothing', place, {})] : [])]
}

/** Weights that sum to 1, of rows that are sound together. */
export function statedImportance(rows: readonly WeightRow[]): ImportanceInput {
  // Scaled by the largest first: a sum of very large numbers is no number.
  const largest = Math.max(...rows.map(({ weight }) => weight))
  const sum = rows.reduce((total, { weight }) => total + weight / largest, 0)
  return { kind: 'stated', topics: rows.map(({ topic, weight }) => ({ topic, weight: weight / largest / sum })) }
}
