import type { Findings } from '../../model/findings/schema.ts'
import { estimateCells, makeTable } from './make-table.ts'
import { periodStart } from './period-start.ts'
import type { Table } from './table.ts'

/** One row per competitor: its opinion, the brand's at the mix that both have, and how they differ, brand less competitor; null where nothing can be told. */
export function competitorsTable({ competitors }: Findings): Table {
  return makeTable('competitors', {
    brand: 'text', status: 'text', mentions: 'count', authors: 'count', rows: 'count', covered: 'share',
    level: 'points', level_low: 'points', level_high: 'points', own_level: 'points', own_level_low: 'points', own_level_high: 'points',
    difference: 'change', difference_low: 'change', difference_high: 'change', probability_above: 'probability',
    change: 'change', change_low: 'change', change_high: 'change', change_difference: 'change', change_difference_low: 'change', change_difference_high: 'change',
    since_base: 'change', since_base_low: 'change', since_base_high: 'change', since_base_difference: 'change', since_base_difference_low: 'change', since_base_difference_high: 'change',
  }, (competitors?.brands ?? []).map((of) => ({
    brand: of.brand, status: of.status, mentions: of.mentions, authors: of.authors, rows: of.rows, covered: of.covered,
    ...estimateCells('level', of.level), ...estimateCells('own_level', of.own_level), ...estimateCells('difference', of.difference.level), probability_above: of.probability_above,
    ...estimateCells('change', of.change.level), ...estimateCells('change_difference', of.change.difference),
    ...estimateCells('since_base', of.since_base.level), ...estimateCells('since_base_difference', of.since_base.difference),
  })))
}

/** One row per competitor that is compared and period: its opinion and, at the same mix, the brand's. */
export function competitorSeriesTable({ brand: own, competitors }: Findings): Table {
  return makeTable('competitor-series', { brand: 'text', own: 'text', period: 'text', start: 'date', own_level: 'points', own_level_low: 'points', own_level_high: 'points', level: 'points', level_low: 'points', level_high: 'points' },
    (competitors?.brands ?? []).flatMap(({ brand, series }) => series.map((at) => (
      { brand, own, period: at.period, start: periodStart(at.period), ...estimateCells('own_level', at.own), ...estimateCells('level', at.level) }
    ))))
}

/** One row per brand, the account's own first: its part of the mentions of all of them, in percent, as counted and at one mix of venues. */
export function mentionSharesTable({ brand, competitors }: Findings): Table {
  const voices = competitors === null || competitors.own.share === null ? [] : [{ brand, own: true, ...competitors.own }, ...competitors.brands.map((of) => ({ ...of, own: false }))]
  return makeTable('mention-shares', {
    brand: 'text', own: 'word', mentions: 'count', mentions_previous: 'count', mentions_base: 'count',
    share_counted: 'points', share_counted_low: 'points', share_counted_high: 'points', share_counted_base: 'points', share_counted_change: 'change', share_counted_change_low: 'change', share_counted_change_high: 'change',
    share_equal: 'points', share_equal_low: 'points', share_equal_high: 'points', share_equal_base: 'points', share_equal_change: 'change', share_equal_change_low: 'change', share_equal_change_high: 'change',
  }, voices.map((of) => ({
    brand: of.brand, own: of.own, mentions: of.mentions, mentions_previous: of.mentions_previous, mentions_base: of.mentions_base,
    ...estimateCells('share_counted', of.share?.now ?? null), share_counted_base: of.share?.base ?? null, ...estimateCells('share_counted_change', of.share?.change ?? null),
    ...estimateCells('share_equal', of.equal_share?.now ?? null), share_equal_base: of.equal_share?.base ?? null, ...estimateCells('share_equal_change', of.equal_share?.change ?? null),
  })))
}

/** One row per venue and brand, the account's own first: mentions of the period, and the venue's weight in the shares at one mix. */
export function competitorVenuesTable({ brand: own, competitors }: Findings): Table {
  return makeTable('competitor-venues', { venue: 'text', label: 'text', venue_weight: 'share', brand: 'text', mentions: 'count' },
    (competitors?.venues ?? []).flatMap(({ venue, label, weight, own: mentions, brands }) => [{ brand: own, mentions }, ...brands].map((of) => ({ venue, label, venue_weight: weight, ...of }))))
}
