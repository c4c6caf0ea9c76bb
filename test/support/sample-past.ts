import type { Findings } from '../../model/findings/schema.ts'
import { around, average, opinionAt, periodNames, ripple, stepsOf } from './sample-series.ts'

type Revisions = NonNullable<Findings['revisions']>
type Revised = Revisions['periods'][number]

const sealedNames = periodNames.slice(-7, -1)
const levelOf = (period: string) => average(stepsOf(period).map(opinionAt))

/** Six sealed months before the one under review, one of them revised, a change of venues after the third. */
export function sampleRevisions(): Revisions {
  const periods = sealedNames.map(revisedPeriod)
  return {
    periods, typical: { periods: 6, level: 0.6, half_width: 4.1, change: 0.4, change_half_width: 1.5, outside: 0 }, late: periods.reduce((sum, { late }) => sum + late, 0), gone: 2,
    breaks: [{ after: sealedNames[2], before: sealedNames[3], parts: ['venues'], bridged: true }],
  }
}

function revisedPeriod(period: string, i: number): Revised {
  const before = periodNames[periodNames.indexOf(period) - 1]
  const [moved, moved_change] = [0.9 * ripple(i, 2), 0.5 * ripple(i, 4)]
  const [now, change] = [levelOf(period), levelOf(period) - levelOf(before)]
  const late = 40 + 13 * i
  return {
    period, sealed_on: `${periodNames[periodNames.indexOf(period) + 1] ?? '2026-10'}-04`, level: around(now - moved, 4.1), change: around(change - moved_change, 1.5),
    revised: i === 1 ? { review: `${period}.r2`, revision: 2, sealed_on: '2026-08-20', reason: 'A board was counted twice', level: around(now - moved / 2, 4) } : null,
    level_now: around(now, 3.9), change_now: around(change, 1.4), moved, moved_change,
    parts: { late_posts: 0.3 * moved, account: i < 3 ? 0.2 * moved : 0, program: 0, later_posts: (i < 3 ? 0.5 : 0.7) * moved }, outside: false,
    late, gone: i === 0 ? 2 : 0, redefined: i < 3 ? ['venues'] : [], bridged: true, program_changed: false,
  }
}

/** Advice of the month before: one met, one on its way, one not, one that nothing was heard of. */
export function sampleFollowUp(): NonNullable<Findings['follow_up']> {
  return {
    period: '2026-09', review: '2026-09', sealed_on: '2026-10-05', met: 1, partly: 1, not_met: 1, unknown: 1,
    advice: [
      { code: 'hear-venue', where: 'Blogs', where_kind: 'venue', action: 'Blogs: 120 voices on top, by open call.', success: 'Blogs with livelier threads.', counts: { before: 210, sought: 330, now: 268 }, shares: null, width: { expected: 2.6, now: 2.8 }, outcome: 'partly' },
      { code: 'hear-segment', where: 'freight', where_kind: 'segment', action: 'Freight: 424 hauliers on top.', success: 'Hauliers nearer 16%.', counts: null, shares: { before: 0.04, sought: 0.16, now: 0.04 }, width: null, outcome: 'not-met' },
      { code: 'survey-waves', where: '', where_kind: 'survey', action: 'Two waves on top.', success: 'Waves number 22.', counts: { before: 20, sought: 22, now: 22 }, shares: null, width: null, outcome: 'met' },
      { code: 'standing-way-in', where: '', where_kind: 'all', action: 'Cards aboard, all year.', success: 'Busy writers weigh less.', counts: null, shares: { before: 0.27, sought: null, now: null }, width: null, outcome: 'unknown' },
    ],
  }
}
