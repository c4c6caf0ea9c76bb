import { z } from 'zod'
import { bareEstimate, count, estimate, isoDate, movement, plain, points, probability, pValue, share } from './parts-schema.ts'
import { advice, benchmark, coder, hearing, importance, sensitivity, speaking, tipping, volume } from './listening-schema.ts'
import { competitors } from './competitors-schema.ts'
import { followUp, revisions } from './past-schema.ts'
import { event, outcome, survey } from './survey-schema.ts'

export type { Estimate, Movement } from './parts-schema.ts'

/**
 * The findings: the one thing that templates, charts and tables may read. Declared here once; the type and the
 * shipped JSON Schema are both made from it. Figures are in points (score x 100) unless said otherwise.
 */

const period = z.strictObject({ name: z.string(), start: isoDate, end: isoDate })

const accounting = z.strictObject({
  received: count, rejected: count, duplicates: count, out_of_scope: count, modelled: count,
  reasons: z.record(z.string(), count),
  unmapped: z.array(z.strictObject({ factor: z.string(), value: z.string(), mentions: count })),
  /** How authors are counted: known by handle (those without one count each), summed over ready-made cells, or not known at all. */
  authors: z.enum(['known', 'summed', 'unknown']),
  /** How much of it came as ready-made cells, whose mentions nobody has looked through for copies. */
  ready_made: z.enum(['none', 'some', 'all']),
  /** Mentions in the period under review. */
  in_period: count,
  first_step: isoDate, last_step: isoDate,
  /** Last day that the review reads: of the last step, or of the period under review. */
  last_day: isoDate,
})

const opinion = z.strictObject({
  series: z.array(z.strictObject({
    step: isoDate, adjusted: estimate, since_base: estimate,
    /** null where the step holds no mention. */
    raw: points.nullable(), mentions: count, authors: count,
    /** True where the step belongs to the period under review. */
    in_period: z.boolean(),
  })),
  /** Every period up to the one under review, oldest first; `change` is against the one before it. */
  periods: z.array(z.strictObject({ period: z.string(), adjusted: estimate, since_base: estimate, change: estimate.nullable(), raw: points.nullable(), mentions: count, authors: count })),
  period: estimate,
  /** The period before as it stands now, null where there is none; and as it was sealed last, null where it was not. */
  previous: estimate.nullable(), previous_sealed: estimate.nullable(),
  change: estimate.nullable(), probability_up: probability.nullable(),
  movement: movement.nullable(),
  since_base: estimate, movement_since_base: movement,
  /** Pooled raw average of all mentions; null where there is none. */
  raw: points.nullable(), raw_previous: points.nullable(), raw_change: points.nullable(),
  mentions: count, mentions_previous: count, authors: count,
})

const part = z.strictObject({
  /** opinion, timing, venue_mix, venue_drift, topic_mix, poster_mix, NAME_mix, unexplained. */
  part: z.string(),
  estimate,
  movement,
  /** Of a mix: the level whose change of share did most in the part's direction; its own estimate. null for other parts. */
  leading: z.strictObject({ level: z.string(), label: z.string(), share_from: share, share_to: share, estimate }).nullable(),
})

const decomposition = z.strictObject({
  from: z.string(), to: z.string(), raw_change: points,
  /** Standard error of the raw change by sampling alone, in the same cells: a lower bound. */
  chance_sd: points.min(0),
  /** Whether the raw change goes beyond that: not-established where sampling alone may bring it about, at the review's interval. */
  raw_movement: movement,
  parts: z.array(part),
  /**
   * The part other than opinion with the largest absolute mean among those whose interval leaves zero; null if there is none, or if it is what the model
   * does not explain and lies within the sampling error of the raw change.
   */
  largest: z.string().nullable(),
})

const venue = z.strictObject({
  venue: z.string(), label: z.string(), anchor: z.boolean(),
  mentions: count, mentions_previous: count, authors: count,
  share, share_previous: share.nullable(), share_base: share,
  /** Share of the venue's mentions, over the whole history, whose author is known. */
  authors_known: share,
  raw: points.nullable(), raw_previous: points.nullable(),
  /** Mean over the period's steps, at the target mix of the other factors. */
  level: estimate, level_previous: estimate.nullable(), level_base: estimate,
  /** Mean of d over the period less its mean over the base. */
  drift: estimate, movement: movement,
  /** Least-squares slope of the level over the last 13 weeks, points per 4 weeks; null with fewer than three steps. */
  slope: estimate.nullable(), slope_movement: movement.nullable(),
  probability_drift_down: probability,
  /** Standard deviation of scores inside the venue; null with fewer than two mentions. */
  spread: points.nullable(), spread_change: points.nullable(),
  /** alpha[v] less its mean at the target mix. */
  offset: estimate,
  first_step: isoDate, last_step: isoDate,
  /** `drift` is d itself. */
  series: z.array(z.strictObject({ step: isoDate, level: estimate, drift: estimate, raw: points.nullable(), mentions: count })),
})

const levelFinding = {
  label: z.string(), offset: estimate, mentions: count, mentions_previous: count,
  share, share_previous: share.nullable(), share_base: share, authors: count, raw: points.nullable(), raw_previous: points.nullable(),
}

const check = z.strictObject({ name: z.string(), venue: z.string().nullable(), observed: z.number(), predicted: bareEstimate, p: pValue, passed: z.boolean() })

const diagnostics = z.strictObject({
  method: z.string(),
  /** Of the largest importance weights; null where so few outweigh the rest that it can't be told. */
  pareto_k: plain.nullable(), rhat: plain.nullable(),
  /** Effective independent draws of the standard deviations. */
  ess: z.number(),
  draws: count, proposals: count,
  /** Whether the draws can be relied on: Pareto k and effective draws. */
  converged: z.boolean(),
  /** Whether the figures can be published without reservation: converged, and every check passed. */
  passed: z.boolean(),
  /** Posterior predictive checks: can the model reproduce what it was fitted to? */
  checks: z.array(check),
})

export const severities = ['note', 'caution', 'serious'] as const
const caveat = z.strictObject({
  /** Names the message of the catalogue that words it. */
  code: z.string(), severity: z.enum(severities), evidence: z.string(), meaning: z.string(), remedy: z.string(),
  /** The figures in the wording. */
  figures: z.record(z.string(), z.union([z.number(), z.string()])),
})
export type Caveat = z.infer<typeof caveat>

const method = z.strictObject({
  base: z.strictObject({ from: isoDate, to: isoDate }),
  /** True where the period under review is the base itself, step for step: nothing has moved since. */
  base_is_period: z.boolean(),
  target_mix: z.array(z.strictObject({ factor: z.string(), level: z.string(), label: z.string(), share })),
  /** `base`: shares of mentions pooled over the base; `account`: margins the account gives. Per factor. */
  target_source: z.record(z.string(), z.enum(['base', 'account'])),
  priors: z.record(z.string(), points),
  cells: count, steps: count,
  /** Pooled within-cell standard deviation and intraclass correlation by author, per venue. */
  venues: z.array(z.strictObject({ venue: z.string(), label: z.string(), standard_deviation: points, intraclass: plain.nullable(), mean_design_effect: plain })),
  smallest_group: count,
  /** Most mentions in 90 days of an occasional and of a regular author; above, an author is prolific. */
  poster_bounds: z.strictObject({ occasional: count, regular: count }),
  prepared_by: z.string().nullable(), reviewed_by: z.string().nullable(),
  time_zone: z.string(), reporting: z.enum(['month', 'quarter', 'week']),
})

export const findingsSchema = z.strictObject({
  schema: z.literal('tareline-findings/1'),
  account: z.string(), brand: z.string(), locale: z.string(),
  period, previous_period: period.nullable(),
  /** The steps that count as the period, those whose middle lies in it: how many, first and last day. */
  period_steps: z.strictObject({ count, start: isoDate, end: isoDate }),
  grid: z.enum(['day', 'week', 'month']), interval: share.min(0.5).max(0.99),
  accounting, opinion,
  /** null where there is no period before, or one of the two holds no mention. */
  decomposition: decomposition.nullable(),
  venues: z.array(venue),
  topics: z.array(z.strictObject({ topic: z.string(), ...levelFinding })),
  posters: z.array(z.strictObject({ poster: z.string(), ...levelFinding })),
  factors: z.array(z.strictObject({ factor: z.string(), levels: z.array(z.strictObject({ level: z.string(), ...levelFinding })) })),
  /** Posterior of the standard deviations of the model, in points; null for one that the model does not have. */
  scales: z.strictObject({
    mu: estimate, tau: estimate, venue_drift: z.record(z.string(), estimate),
    venue: estimate.nullable(), topic: estimate.nullable(), poster: estimate.nullable(),
    factors: z.record(z.string(), estimate),
  }),
  /** null where the account gives none; so with events and the outcome. */
  survey: survey.nullable(), events: z.array(event).nullable(), outcome: outcome.nullable(),
  speaking,
  /** null where the account gives none; so with importance. */
  benchmark: benchmark.nullable(), importance: importance.nullable(),
  /** null without a survey of shares or without known authors; without a period before. */
  volume: volume.nullable(), tipping: tipping.nullable(),
  coder, sensitivity, hearing: hearing.nullable(),
  /** null where the account gives none. */
  competitors: competitors.nullable(),
  /** null before the first seal; without advice in the last sealed review. */
  revisions: revisions.nullable(), follow_up: followUp.nullable(),
  caveats: z.array(caveat), advice: z.array(advice),
  diagnostics, method,
  inputs: z.array(z.strictObject({ path: z.string(), sha256: z.string(), rows: count })),
  program: z.strictObject({ version: z.string(), seed: z.number().int() }),
})

export type Findings = z.infer<typeof findingsSchema>
