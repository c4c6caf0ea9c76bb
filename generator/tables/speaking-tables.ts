import type { Findings } from '../../model/findings/schema.ts'
import { inOrder, levelOrder } from './level-order.ts'
import { makeTable } from './make-table.ts'
import { periodStart } from './period-start.ts'
import type { Table } from './table.ts'

/** Shares of every level of every factor among the mentions of each period, and its share in the base. `start` is the period's first day. */
export function mixTable(findings: Findings): Table {
  const order = levelOrder(findings)
  const inBase = new Map(levelsOf(findings).map(({ factor, level, share_base: base }) => [`${factor} ${level}`, base]))
  const factors = [...new Set(findings.speaking.mix.map(({ factor }) => factor))]
  const rows = factors.flatMap((factor) => inOrder(findings.speaking.mix.filter((of) => of.factor === factor), factor, order, ({ level }) => level))
  return makeTable('mix', { factor: 'text', level: 'text', label: 'text', period: 'text', start: 'date', mentions: 'count', share: 'share', share_base: 'share' },
    rows.map((of) => ({
      factor: of.factor, level: of.level, label: of.label, period: of.period, start: periodStart(of.period), mentions: of.mentions, share: of.share,
      share_base: inBase.get(`${of.factor} ${of.level}`) ?? null,
    })))
}

/**
 * How much each level speaks above or below the average at the fixed mix, and how much of it there was: in the base, the period before, this one.
 * Levels with fewer authors than the smallest group are left out.
 */
export function offsetsTable(findings: Findings): Table {
  const shown = levelsOf(findings).filter((of) => of.authors >= findings.method.smallest_group)
  return makeTable('offsets', {
    factor: 'text', level: 'text', label: 'text', offset: 'change', low: 'change', high: 'change', mentions: 'count',
    share_base: 'share', share_previous: 'share', share: 'share',
  }, shown.map(({ factor, level, label, offset, mentions, share, share_base, share_previous }) => (
    { factor, level, label, offset: offset.mean, low: offset.low, high: offset.high, mentions, share_base, share_previous, share }
  )))
}

/** Every level of every factor, each factor's in the order of the document. */
function levelsOf(findings: Findings) {
  const order = levelOrder(findings)
  const { venues, topics, posters, factors } = findings
  const named = [
    { factor: 'venue', levels: venues.map((of) => ({ ...of, level: of.venue })) },
    { factor: 'topic', levels: topics.map((of) => ({ ...of, level: of.topic })) },
    { factor: 'poster', levels: posters.map((of) => ({ ...of, level: of.poster })) },
    ...factors,
  ]
  return named.flatMap(({ factor, levels }) => (
    inOrder(levels.map(({ level, label, offset, mentions, authors, share, share_base, share_previous }) => (
      { factor, level, label, offset, mentions, authors, share, share_base, share_previous }
    )), factor, order, ({ level }) => level)))
}

/** How far few authors write most of it: the period, the one before, and each venue. Small groups are left out. */
export function concentrationTable({ speaking, method }: Findings): Table {
  const scopes = [
    { scope: 'period', of: speaking.concentration.period },
    { scope: 'previous', of: speaking.concentration.previous },
    ...speaking.venues.map(({ venue, concentration }) => ({ scope: venue, of: concentration })),
  ]
  return makeTable('concentration', { scope: 'text', authors: 'count', mentions: 'count', top_share: 'share', gini: 'number', effective_authors: 'count' },
    scopes.flatMap(({ scope, of }) => (of === null || of.authors < method.smallest_group ? [] : [
      { scope, authors: of.authors, mentions: of.mentions, top_share: of.top_share, gini: of.gini, effective_authors: of.effective_authors },
    ])))
}
