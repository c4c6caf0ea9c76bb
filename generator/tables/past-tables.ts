import type { Findings } from '../../model/findings/schema.ts'
import { estimateCells, makeTable } from './make-table.ts'
import { periodStart } from './period-start.ts'
import type { Table } from './table.ts'

/**
 * Every sealed period as first told, as it stands now, and what it moved by; the newest first. The four parts sum to `moved`; `moved_late` is null where late
 * posts can't be told apart, and all of `now` where the period is no part of the history any more. `resealed` is the level of the last revision.
 */
export function revisionsTable({ revisions }: Findings): Table {
  return makeTable('revisions', {
    period: 'text', start: 'date', sealed_on: 'date', told: 'points', told_low: 'points', told_high: 'points', now: 'points', now_low: 'points', now_high: 'points', outside: 'word',
    moved: 'change', moved_late: 'change', moved_account: 'change', moved_program: 'change', moved_later: 'change',
    change_told: 'change', change_told_low: 'change', change_told_high: 'change', change_now: 'change', change_now_low: 'change', change_now_high: 'change', moved_change: 'change',
    late: 'count', gone: 'count', resealed_on: 'date', resealed: 'points', bridged: 'word',
  }, [...revisions?.periods ?? []].reverse().map((of) => ({
    period: of.period, start: periodStart(of.period), sealed_on: of.sealed_on, ...estimateCells('told', of.level), ...estimateCells('now', of.level_now), outside: of.outside,
    moved: of.moved, moved_late: of.parts?.late_posts ?? null, moved_account: of.parts?.account ?? null, moved_program: of.parts?.program ?? null, moved_later: of.parts?.later_posts ?? null,
    ...estimateCells('change_told', of.change), ...estimateCells('change_now', of.change_now), moved_change: of.moved_change,
    late: of.late, gone: of.gone, resealed_on: of.revised?.sealed_on ?? null, resealed: of.revised?.level.mean ?? null, bridged: of.bridged,
  })))
}

/** Where what the figures mean changed, one row for each part of the definition; `between` lies midway between the starts of the two periods. */
export function breaksTable({ revisions }: Findings): Table {
  return makeTable('breaks', { after: 'text', before: 'text', between: 'date', definition: 'text', bridged: 'word' },
    (revisions?.breaks ?? []).flatMap(({ after, before, parts, bridged }) => parts.map((definition) => ({ after, before, between: midway(periodStart(after), periodStart(before)), definition, bridged }))))
}

/** What became of each piece of advice of the last sealed review: what it is measured by then, sought and now; widths are of whole intervals. */
export function followUpTable({ follow_up: followUp }: Findings): Table {
  return makeTable('follow-up', {
    code: 'text', where: 'text', where_kind: 'text', outcome: 'text', count_before: 'count', count_sought: 'count', count_now: 'count', share_before: 'share', share_sought: 'share', share_now: 'share',
    width_expected: 'points', width_now: 'points',
  }, (followUp?.advice ?? []).map(({ code, where, where_kind, outcome, counts, shares, width }) => ({
    code, where, where_kind, outcome, count_before: counts?.before ?? null, count_sought: counts?.sought ?? null, count_now: counts?.now ?? null,
    share_before: shares?.before ?? null, share_sought: shares?.sought ?? null, share_now: shares?.now ?? null, width_expected: width?.expected ?? null, width_now: width?.now ?? null,
  })))
}

function midway(from: string, to: string): string {
  return new Date((Date.parse(from) + Date.parse(to)) / 2).toISOString().slice(0, 10)
}
