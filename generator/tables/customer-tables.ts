import type { Findings } from '../../model/findings/schema.ts'
import { estimateCells, makeTable } from './make-table.ts'
import type { Table } from './table.ts'

/**
 * Customers beside the authors heard, level by level, those first that are furthest below their share. A level is named with its margin where there
 * are several. Shares of fewer authors than the smallest group are null.
 */
export function benchmarkTable({ benchmark }: Findings): Table {
  const margins = benchmark?.margins ?? []
  const unreachable = benchmark?.unreachable ?? []
  return makeTable('benchmark', {
    margin: 'text', level: 'text', label: 'text', customers: 'share', heard: 'share', authors: 'count', gap: 'change', authors_needed: 'count', authors_needed_jointly: 'count', unreached: 'word',
  }, margins.flatMap(({ margin, levels }) => [...levels].sort((a, b) => (b.shortfall ?? 0) - (a.shortfall ?? 0) || (a.gap ?? 0) - (b.gap ?? 0)).map((of) => ({
    margin, level: of.level, label: margins.length > 1 ? `${of.level} (${margin})` : of.level, customers: of.customers, heard: of.heard, authors: of.authors, gap: of.gap,
    authors_needed: of.needed, authors_needed_jointly: of.needed_jointly, unreached: unreachable.some((level) => level.margin === margin && level.level === of.level),
  }))))
}

/** How unlike the customers the authors are by each margin. */
export function benchmarkMarginsTable({ benchmark }: Findings): Table {
  return makeTable('benchmark-margins', { margin: 'text', dissimilarity: 'share', authors: 'count', all_authors: 'count' },
    (benchmark?.margins ?? []).map(({ margin, dissimilarity, authors, all_authors }) => ({ margin, dissimilarity, authors, all_authors })))
}

/** What would be left of the change of opinion if one side had become `ratio` times likelier to post; a word marks the row at which nothing is. */
export function tippingTable({ tipping }: Findings): Table {
  return makeTable('tipping', { ratio: 'number', tipped_change: 'change', low: 'change', high: 'change', tips: 'word' },
    (tipping?.curve ?? []).map(({ ratio, change }) => ({ ratio, tipped_change: change.mean, low: change.low, high: change.high, tips: ratio === tipping?.ratio.mean })))
}

/** How often coder and people agree, venue by venue, why a venue is left as coded, and what correcting does to its mean score. */
export function coderTable({ coder }: Findings): Table {
  return makeTable('coder', { venue: 'text', label: 'text', codings: 'count', agreement: 'share', left_as_coded: 'text', correction: 'change', correction_low: 'change', correction_high: 'change' },
    coder.venues.map(({ venue, label, codings, agreement, refused, correction }) => (
      { venue, label, codings, agreement: codings === 0 ? null : agreement, left_as_coded: refused, ...estimateCells('correction', correction) }
    )))
}

/** Share of talk beside importance, the most important topic first: that is the question it answers, other than in tables of opinion. */
export function importanceTable({ importance }: Findings): Table {
  return makeTable('importance', { topic: 'text', level: 'text', label: 'text', importance: 'share', talk: 'share', gap: 'change', authors: 'count' },
    [...importance?.topics ?? []].sort((a, b) => b.importance - a.importance).map(({ topic, label, importance: weight, talk, gap, authors }) => (
      { topic, level: topic, label, importance: weight, talk, gap, authors }
    )))
}
