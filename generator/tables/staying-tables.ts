import type { Findings } from '../../model/findings/schema.ts'
import { estimateCells, makeTable } from './make-table.ts'
import { periodStart } from './period-start.ts'
import type { Table } from './table.ts'

const stances = ['negative', 'middle', 'positive'] as const

/** Of the authors of each period and stance, how many posted in the next one too; stance by stance. `start` is the period's first day. */
export function stayingTable({ speaking }: Findings): Table {
  const periods = speaking.staying?.periods ?? []
  return makeTable('staying', { stance: 'text', period: 'text', start: 'date', next_period: 'text', authors: 'count', stayed: 'count', stayed_share: 'share', low: 'share', high: 'share' },
    stances.flatMap((stance) => periods.filter((of) => of.stance === stance).map((of) => (
      { stance, period: of.from, start: periodStart(of.from), next_period: of.to, authors: of.authors, stayed: of.stayed, stayed_share: of.share, low: of.low, high: of.high }
    ))))
}

/** How far scores lie apart inside each venue: in the base, now, and the difference; and the share at either end of the scale now. */
export function spreadTable({ speaking }: Findings): Table {
  return makeTable('spread', {
    venue: 'text', label: 'text', spread_base: 'points', spread: 'points', spread_change: 'change', low: 'change', high: 'change', movement: 'word', extremes: 'share',
  }, speaking.spread.map(({ venue, label, base, now, change, movement, series }) => ({
    venue, label, spread_base: base, spread: now, spread_change: change?.mean ?? null, low: change?.low ?? null, high: change?.high ?? null, movement,
    extremes: series.at(-1)?.extremes ?? null,
  })))
}

/** The same, period by period. */
export function spreadSeriesTable({ speaking }: Findings): Table {
  return makeTable('spread-series', { venue: 'text', label: 'text', period: 'text', start: 'date', mentions: 'count', spread: 'points', extremes: 'share' },
    speaking.spread.flatMap(({ venue, label, series }) => series.map(({ period, mentions, spread, extremes }) => (
      { venue, label, period, start: periodStart(period), mentions, spread, extremes }
    ))))
}

/** Points of a reply per point of the thread before it; `poster` is `all` where no class is told apart. */
export function pullTable({ speaking }: Findings): Table {
  return makeTable('pull', { venue: 'text', label: 'text', poster: 'text', replies: 'count', authors: 'count', slope_reply: 'number', slope_reply_low: 'number', slope_reply_high: 'number', leaning: 'word' },
    speaking.pull.map(({ venue, label, poster, replies, authors, slope, movement }) => (
      { venue, label, poster: poster ?? 'all', replies, authors, ...estimateCells('slope_reply', slope), leaning: movement }
    )))
}
