import type { Findings } from '../findings/schema.ts'
import type { IntakeTables } from '../intake/intake-tables.ts'
import { priors, walkFactor } from '../fit/priors.ts'
import type { Reading } from './context.ts'
import { points } from './summarise.ts'

/** What the account says of itself and the review repeats. */
export interface AccountFacts {
  readonly smallestGroup: number
  /** Scores of the labels that mentions are coded by; null where none are. */
  readonly labelScores: readonly number[] | null
  readonly posterBounds: { readonly occasional: number; readonly regular: number }
  readonly preparedBy: string | null
  readonly reviewedBy: string | null
  readonly timeZone: string
  readonly reporting: 'month' | 'quarter' | 'week'
}

/** The accounting of rows, and how many mentions the period under review holds. */
export function readAccounting(tables: IntakeTables): Findings['accounting'] {
  const { accounting, timeline, cells } = tables
  let inPeriod = 0
  for (let c = 0; c < cells.count; c++) if (timeline.periodOf[cells.step[c]] === timeline.current) inPeriod += cells.mentions[c]
  return {
    received: accounting.received, rejected: accounting.rejected, duplicates: accounting.duplicates,
    out_of_scope: accounting.outOfScope, modelled: accounting.modelled,
    reasons: { ...accounting.reasons }, unmapped: accounting.unmapped.map((row) => ({ ...row })),
    authors: authorsAre(tables), ready_made: readyMadeIs(tables), in_period: inPeriod,
    first_step: timeline.steps[0], last_step: timeline.steps[timeline.steps.length - 1],
    last_day: timeline.lastDays[timeline.steps.length - 1],
  }
}

function authorsAre({ accounting, authors }: IntakeTables): Findings['accounting']['authors'] {
  if (accounting.withAuthor.every((mentions) => mentions === 0)) return 'unknown'
  return authors.exact ? 'known' : 'summed'
}

function readyMadeIs({ accounting, hindsight }: IntakeTables): Findings['accounting']['ready_made'] {
  if (!accounting.readyMade) return 'none'
  return hindsight === null ? 'all' : 'some'
}

/** Which days the period's figures are about: whole steps, cut at the end of what the review reads. */
export function readPeriodSteps({ tables: { timeline }, periodSteps }: Reading): Findings['period_steps'] {
  const last = periodSteps[periodSteps.length - 1]
  return { count: periodSteps.length, start: timeline.steps[periodSteps[0]], end: timeline.lastDays[last] }
}

/** What a colleague needs to make the figures again: base, target mix, priors, sizes, design effects. */
export function readMethod(reading: Reading, facts: AccountFacts): Findings['method'] {
  const { tables, mix, sampling, baseSteps, periodSteps } = reading
  const { factors, timeline, cells } = tables
  const walk = walkFactor(timeline.stepDays)
  return {
    base: { ...timeline.base },
    base_is_period: baseSteps.length === periodSteps.length && baseSteps.every((t, i) => t === periodSteps[i]),
    target_mix: factors.flatMap(({ name, levels }, f) => levels.map((level, l) => ({ factor: name, level: level.name, label: level.label, share: mix.shares[f][l] }))),
    target_source: Object.fromEntries(factors.map(({ name }, f) => [name, mix.source[f]])),
    priors: {
      initial: points * priors.initial, mu: points * priors.mu * walk, venue_drift: points * priors.venueDrift * walk,
      fixed_factor: points * priors.fixedFactor, tau: points * priors.tau,
    },
    cells: cells.count, steps: timeline.steps.length,
    venues: factors[0].levels.map(({ name, label }, v) => ({
      venue: name, label, standard_deviation: points * Math.sqrt(sampling.withinCell[v]), intraclass: sampling.intraclass[v],
      mean_design_effect: meanDesignEffect(reading, v),
    })),
    smallest_group: facts.smallestGroup, poster_bounds: { ...facts.posterBounds }, prepared_by: facts.preparedBy, reviewed_by: facts.reviewedBy,
    time_zone: facts.timeZone, reporting: facts.reporting,
  }
}

/** Mean of deff_c over the venue's mentions. */
function meanDesignEffect({ tables: { cells }, sampling }: Reading, venue: number): number {
  let mentions = 0
  let total = 0
  for (let c = 0; c < cells.count; c++) {
    if (cells.levels[0][c] !== venue) continue
    mentions += cells.mentions[c]
    total += cells.mentions[c] * sampling.designEffect[c]
  }
  return mentions === 0 ? 1 : total / mentions
}
