import type { AuditCount } from '../../model/inputs/small-inputs.ts'
import type { Account } from '../account/account.ts'
import { inputExpectations as expected } from '../faults/catalogue-inputs.ts'
import type { Fault } from '../faults/fault.ts'
import { labelNames, venueNames, type AccountNames } from './account-names.ts'
import type { CsvRow, TableColumns } from './csv-table.ts'
import { rowReader } from './row-reader.ts'

export const auditColumns: TableColumns = { needed: ['venue', 'true_label', 'coded_label', 'count'], optional: [] }

/** Reads a row of an audit file, or tells everything that is wrong with it. */
export function auditRowOf(account: Account): (row: CsvRow) => AuditCount | readonly Fault[] {
  const [venues, labels] = [venueNames(account), labelNames(account)]
  return (row) => {
    const read = rowReader(row)
    const unknown: Fault[] = []
    const named = (column: string, names: AccountNames): string => {
      const written = read.text(column)
      const name = names.nameOf(written)
      if (written !== '' && name === null) unknown.push(names.fault(written, `${row.place} ${column}`))
      return name ?? written
    }
    const count = {
      venue: named('venue', venues), trueLabel: named('true_label', labels), codedLabel: named('coded_label', labels),
      count: read.number('count', (posts) => Number.isSafeInteger(posts) && posts >= 0, expected.codings),
    }
    const faults = [...read.faults, ...unknown]
    return faults.length > 0 ? faults : count
  }
}

/**
 * Counts of the same venue and labels added up: an audit grows by a file a period, and a row a coding is as good as a table
 * of counts. In the order in which they first come.
 */
export function auditCounts(rows: readonly AuditCount[]): readonly AuditCount[] {
  const counts = new Map<string, AuditCount>()
  for (const row of rows) {
    const key = JSON.stringify([row.venue, row.trueLabel, row.codedLabel])
    counts.set(key, { ...row, count: row.count + (counts.get(key)?.count ?? 0) })
  }
  return [...counts.values()]
}
