import type { Findings } from '../../model/findings/schema.ts'
import { makeTable } from './make-table.ts'
import { periodStart } from './period-start.ts'
import type { Table } from './table.ts'

/** Shares of every level of every factor among the mentions of each period. `start` is the period's first day. */
export function mixTable({ speaking }: Findings): Table {
  return makeTable('mix', { factor: 'text', level: 'text', label: 'text', period: 'text', start: 'date', mentions: 'count', share: 'share' },
    speaking.mix.map((of) => ({
      factor: of.factor, level: of.level, label: of.label, period: of.period, start: periodStart(of.period), mentions: of.mentions, share: of.share,
    })))
}

/** How much each level speaks above or below the target mix; levels with fewer authors than the smallest group are left out. */
export function offsetsTable({ venues, topics, posters, factors, method }: Findings): Table {
  const levels = [
    ...venues.map((of) => ({ ...of, factor: 'venue', level: of.venue })),
    ...topics.map((of) => ({ ...of, factor: 'topic', level: of.topic })),
    ...posters.map((of) => ({ ...of, factor: 'poster', level: of.poster })),
    ...factors.flatMap(({ factor, levels: of }) => of.map((level) => ({ ...level, factor }))),
  ]
  return makeTable('offsets', {
    factor: 'text', level: 'text', label: 'text', offset: 'change', low: 'change', high: 'change', mentions: 'count', share: 'share',
  }, levels.filter((of) => of.authors >= method.smallest_group).map(({ factor, level, label, offset, mentions, share }) => (
    { factor, level, label, offset: offset.mean, low: offset.low, high: offset.high, mentions, share }
  )))
}

/** How far few authors write most of it: the period, the one before, and each venue. Small groups are left out. */
export function concentrationTable({ speaking, method }: Findings): Table {
  const scopes = [
    { scope: 'period', of: speaking.concentration.period },
    { scope: 'previous', of: speaking.concentration.previous },
    ...speaking.venues.map(({ venue, concentration }) => ({ scope: venue, of: concentration })),
  ]
  return makeTable('concentration', { scope: 'text', authors: 'count', mentions: 'count', top_share: 'share', gini: 'number', effective_authors: 'number' },
    scopes.flatMap(({ scope, of }) => (of === null || of.authors < method.smallest_group ? [] : [
      { scope, authors: of.authors, mentions: of.mentions, top_share: of.top_share, gini: of.gini, effective_authors: of.effective_authors },
    ])))
}
