import type { Findings } from '../../model/findings/schema.ts'
import { estimateCells, makeTable } from './make-table.ts'
import type { Table } from './table.ts'

/** Width of the interval of the next period's change, venue by venue, if so many more authors were heard there. */
export function hearingTable({ hearing }: Findings): Table {
  return makeTable('hearing', { venue: 'text', label: 'text', cost_per_author: 'number', more_authors: 'count', width: 'points' },
    (hearing?.venues ?? []).flatMap(({ venue, label, cost_per_author, curve }) => curve.map(({ authors, width }) => (
      { venue, label, cost_per_author, more_authors: authors, width }
    ))))
}

/** Every piece of advice in its rank, with the gain that it is ranked by. */
export function adviceTable({ advice }: Findings): Table {
  return makeTable('advice', {
    rank: 'count', code: 'text', where: 'text', where_kind: 'text', how_many: 'count', helps: 'text', gain_share: 'share', gain: 'number', gain_low: 'number', gain_high: 'number', gain_of: 'text', cost: 'number', gain_per_cost: 'number',
  }, advice.map(({ code, where, where_kind, how_many, helps, gain_share, gain, gain_of, cost, gain_per_cost }, at) => (
    { rank: at + 1, code, where, where_kind, how_many, helps, gain_share, ...estimateCells('gain', gain), gain_of, cost, gain_per_cost }
  )))
}
