import { readAudit } from '../coder/audit.ts'
import { rescoredTables } from '../coder/rescore.ts'
import type { Findings } from '../findings/schema.ts'
import type { AuditCount } from '../inputs/small-inputs.ts'
import type { IntakeTables } from '../intake/intake-tables.ts'
import type { Reading } from '../reading/context.ts'
import { extremeShare } from '../speaking/extremes.ts'
import { readFollowUp, lastBefore, type Seen } from './follow-up.ts'
import { auditOf, type Past } from './past.ts'
import { readRevisions } from './read-revisions.ts'
import type { PresentReading } from './why-moved.ts'

type LookedBack = Pick<Findings, 'opinion' | 'revisions' | 'follow_up'>

/** What the review says of those before it: the figure that was sealed for the period before, revisions of every sealed period, and what became of advice. */
export function lookBack(past: Past | null, reading: Reading, findings: Omit<Seen, 'extremes'>, audit: readonly AuditCount[] | null): LookedBack {
  const { opinion, coder } = findings
  if (past === null) return { opinion, revisions: null, follow_up: null }
  const { timeline } = reading.tables
  const before = timeline.current < 1 ? null : timeline.periods[timeline.current - 1].name
  const last = lastBefore(past.reviews, timeline.review.name)
  return {
    opinion: { ...opinion, previous_sealed: last !== null && last.period === before ? last.told.level : null },
    revisions: readRevisions(past, {
      periods: opinion.periods, definition: { ...past.definition, base: timeline.base }, reading: presentReading(reading, audit), audit: auditOf(coder), audited: coder.status === 'applied',
    }),
    follow_up: readFollowUp(past, timeline.review.name, { ...findings, extremes: extremeShare(reading.tables) }),
  }
}

function presentReading({ tables, mix, posterior: { problem, draws } }: Reading, audit: readonly AuditCount[] | null): PresentReading {
  const d = problem.scales.length
  const meanOf = (scale: number) => Array.from({ length: draws.count }, (_, row) => draws.sigmas[row * d + scale]).reduce((sum, value) => sum + value, 0) / draws.count
  return {
    tables, correct: (of) => corrected(of, audit),
    sigma: new Map(problem.scales.map(({ name }, i) => [name, meanOf(i)])),
    shares: new Map(tables.factors.map(({ name, levels }, f) => [name, new Map(levels.map((level, l) => [level.name, mix.shares[f][l]]))])),
  }
}

function corrected(tables: IntakeTables, audit: readonly AuditCount[] | null): IntakeTables {
  const correction = audit === null ? null : readAudit(tables, audit)
  return correction === null ? tables : rescoredTables(tables, correction)
}
