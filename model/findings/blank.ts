import type { Estimate, Findings } from './schema.ts'

const zero: Estimate = { mean: 0, low: 0, high: 0, sd: 0 }

/** Findings of the right shape that hold nothing: for checking a template before there is anything to report. */
export const blankFindings: Findings = {
  schema: 'tareline-findings/1', account: '', brand: '', locale: 'en-GB',
  period: { name: '2000-01', start: '2000-01-01', end: '2000-01-31' }, previous_period: null,
  period_steps: { count: 0, start: '2000-01-03', end: '2000-01-30' }, grid: 'week', interval: 0.9,
  accounting: {
    received: 0, rejected: 0, duplicates: 0, out_of_scope: 0, modelled: 0, reasons: {}, unmapped: [], authors: 'known', ready_made: 'none', in_period: 0,
    first_step: '2000-01-03', last_step: '2000-01-31', last_day: '2000-01-31',
  },
  opinion: {
    series: [], periods: [], period: zero, previous: null, previous_sealed: null, change: null, probability_up: null, movement: null,
    since_base: zero, movement_since_base: 'not-established', raw: null, raw_previous: null, raw_change: null,
    mentions: 0, mentions_previous: 0, authors: 0,
  },
  decomposition: null, venues: [], topics: [], posters: [], factors: [],
  scales: { mu: zero, tau: zero, venue_drift: {}, venue: null, topic: null, poster: null, factors: {} },
  survey: null, events: null, outcome: null, speaking: { concentration: { period: null, previous: null }, venues: [], mix: [], staying: null, spread: [], pull: [] },
  benchmark: null, importance: null, volume: null, tipping: null,
  coder: { status: 'absent', reason: null, venues: [], correction: null, movement: null, audit_size: null },
  sensitivity: { scales: [], shift: 0, reliable: true }, hearing: null, competitors: null, revisions: null, follow_up: null, caveats: [], advice: [],
  diagnostics: { method: '', pareto_k: 0, rhat: null, ess: 0, draws: 0, proposals: 0, converged: true, passed: true, checks: [] },
  method: {
    base: { from: '2000-01-01', to: '2000-12-31' }, base_is_period: false, target_mix: [], target_source: {}, priors: {}, cells: 0, steps: 0, venues: [],
    smallest_group: 10, poster_bounds: { occasional: 1, regular: 5 }, prepared_by: null, reviewed_by: null, time_zone: 'UTC', reporting: 'month',
  },
  inputs: [], program: { version: '', seed: 0 },
}
