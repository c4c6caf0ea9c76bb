import type { Findings } from '../../model/findings/schema.ts'
import { accountingTable, checksTable, inputsTable, scalesTable, targetMixTable } from './method-tables.ts'
import { decompositionTable, opinionTable, periodsTable, spansTable } from './opinion-tables.ts'
import { concentrationTable, mixTable, offsetsTable } from './speaking-tables.ts'
import { inOrder, levelOrder } from './level-order.ts'
import type { Table } from './table.ts'
import { venueSeriesTable, venuesBeforeTable, venuesTable } from './venue-tables.ts'

const makers = [
  opinionTable, periodsTable, spansTable, decompositionTable, venuesTable, venueSeriesTable, venuesBeforeTable, mixTable, offsetsTable, concentrationTable,
  accountingTable, scalesTable, targetMixTable, checksTable, inputsTable,
] as const

/** Tables list venues as they find them: in the one order of the document. */
function withVenuesInOrder(findings: Findings): Findings {
  const order = levelOrder(findings)
  const sorted = <T extends { readonly venue: string }>(list: readonly T[]) => [...inOrder(list, 'venue', order, ({ venue }) => venue)]
  return { ...findings, venues: sorted(findings.venues), speaking: { ...findings.speaking, venues: sorted(findings.speaking.venues) } }
}

/**
 * Every table of a review: what charts draw, what the document prints and what `tables/NAME.csv` holds.
 * No figure is computed here: they are chosen, laid out, and withheld where the group is too small.
 */
export function tablesOf(findings: Findings): readonly Table[] {
  const ordered = withVenuesInOrder(findings)
  return makers.map((make) => make(ordered))
}
