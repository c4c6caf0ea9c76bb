import type { Findings } from '../../model/findings/schema.ts'
import { estimateCells, makeTable, withheldBelow } from './make-table.ts'
import type { Table } from './table.ts'

/** One row per venue, the period under review; where that is the base itself there is no drift since. */
export function venuesTable({ venues, method }: Findings): Table {
  return makeTable('venues', {
    venue: 'text', label: 'text', mentions: 'count', authors: 'count', share: 'share', share_base: 'share', raw: 'points',
    level_base: 'points', level_base_low: 'points', level_base_high: 'points', level: 'points', level_low: 'points', level_high: 'points', drift: 'change', drift_low: 'change', drift_high: 'change',
    slope: 'change', slope_low: 'change', slope_high: 'change', probability_drift_down: 'probability', spread: 'points',
  }, venues.map((of) => ({
    venue: of.venue, label: of.label, mentions: of.mentions, authors: of.authors, share: of.share, share_base: of.share_base,
    raw: withheldBelow(of.raw, of.authors, method.smallest_group),
    ...estimateCells('level_base', of.level_base), ...estimateCells('level', of.level), ...estimateCells('drift', method.base_is_period ? null : of.drift), ...estimateCells('slope', of.slope),
    probability_drift_down: method.base_is_period ? null : of.probability_drift_down,
    spread: withheldBelow(of.spread, of.authors, method.smallest_group),
  })))
}

/** One row per venue and step. `drift` is the walk itself; `raw` is withheld by mentions, for authors are not counted by step and venue. */
export function venueSeriesTable({ venues, method }: Findings): Table {
  return makeTable('venue-series', {
    venue: 'text', label: 'text', step: 'date', level: 'points', low: 'points', high: 'points', drift: 'change', drift_low: 'change', drift_high: 'change',
    raw: 'points', mentions: 'count',
  }, venues.flatMap((of) => of.series.map((at) => ({
    venue: of.venue, label: of.label, step: at.step, level: at.level.mean, low: at.level.low, high: at.level.high,
    ...estimateCells('drift', at.drift),
    raw: withheldBelow(at.raw, at.mentions, method.smallest_group), mentions: at.mentions,
  }))))
}

/** Level in the base and in the period under review, two rows per venue: `when` is base or now. */
export function venuesBeforeTable({ venues }: Findings): Table {
  return makeTable('venues-before', { venue: 'text', label: 'text', when: 'text', level: 'points', low: 'points', high: 'points' },
    venues.flatMap((of) => ([['base', of.level_base], ['now', of.level]] as const).map(([when, level]) => (
      { venue: of.venue, label: of.label, when, level: level.mean, low: level.low, high: level.high }
    ))))
}
