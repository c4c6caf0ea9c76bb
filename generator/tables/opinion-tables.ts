import type { Findings } from '../../model/findings/schema.ts'
import { estimateCells, makeTable, withheldBelow } from './make-table.ts'
import { periodStart } from './period-start.ts'
import type { Table } from './table.ts'

/** Opinion step by step: the adjusted level, what it gained on the base, and the raw average behind it. */
export function opinionTable({ opinion, method }: Findings): Table {
  return makeTable('opinion', {
    step: 'date', adjusted: 'points', low: 'points', high: 'points', since_base: 'change', since_base_low: 'change', since_base_high: 'change',
    raw: 'points', mentions: 'count', authors: 'count',
  }, opinion.series.map((at) => ({
    step: at.step, adjusted: at.adjusted.mean, low: at.adjusted.low, high: at.adjusted.high,
    ...estimateCells('since_base', at.since_base),
    raw: withheldBelow(at.raw, at.authors, method.smallest_group), mentions: at.mentions, authors: at.authors,
  })))
}

/** The same, period by period. `start` is the period's first day, for a time axis. A period that is the base itself has no change since. */
export function periodsTable({ opinion, method }: Findings): Table {
  return makeTable('periods', {
    period: 'text', start: 'date', adjusted: 'points', low: 'points', high: 'points', since_base: 'change', since_base_low: 'change', since_base_high: 'change',
    raw: 'points', mentions: 'count', authors: 'count',
  }, opinion.periods.map((of) => ({
    period: of.period, start: periodStart(of.period), adjusted: of.adjusted.mean, low: of.adjusted.low, high: of.adjusted.high,
    ...estimateCells('since_base', of.since_base.sd === 0 ? null : of.since_base),
    raw: withheldBelow(of.raw, of.authors, method.smallest_group), mentions: of.mentions, authors: of.authors,
  })))
}

/**
 * What moved the raw average: the parts, then their sum, the raw change, which is counted and so has no interval.
 * Empty where there is nothing to compare with.
 */
export function decompositionTable({ decomposition }: Findings): Table {
  const parts = decomposition?.parts.map(({ part, estimate }) => ({ part, mean: estimate.mean, low: estimate.low, high: estimate.high })) ?? []
  const total = decomposition === null ? [] : [{ part: 'raw_change', mean: decomposition.raw_change, low: null, high: null }]
  return makeTable('decomposition', { part: 'text', mean: 'change', low: 'change', high: 'change' }, [...parts, ...total])
}

/** The two stretches of time that charts mark: the base and the period under review, first and last day inclusive. */
export function spansTable({ method, period }: Findings): Table {
  return makeTable('spans', { span: 'text', start: 'date', end: 'date' }, [
    { span: 'base', start: method.base.from, end: method.base.to },
    { span: 'review', start: period.start, end: period.end },
  ])
}
