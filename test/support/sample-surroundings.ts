import type { Caveat, Findings } from '../../model/findings/schema.ts'
import { around } from './sample-series.ts'

/** Caveats of each severity, as the model raises them; the wording is the catalogue's and is filled in by the build. */
export function sampleCaveats(): Caveat[] {
  const raise = (code: string, severity: Caveat['severity'], figures: Caveat['figures'] = {}): Caveat =>
    ({ code, severity, figures, evidence: `evidence of ${code}`, meaning: `meaning of ${code}`, remedy: `remedy of ${code}` })
  return [
    raise('pooled-average-misleads', 'serious', { raw_change: -2.27, change: 2.21 }),
    raise('benchmark-mismatch', 'serious', { margin: 'segment', known: 'yes', share: 0.307, unreached: 1, names: 'school parties' }),
    raise('talk-unlike-importance', 'caution', { share: 0.24 }),
    raise('moderates-leaving', 'caution', { gap: -15.2, change: -13.4 }),
    raise('coder-biased', 'caution', { correction: -1.9 }),
    raise('authors-partly-unknown', 'caution', { venue: 'Video comments', share: 0.29 }),
    raise('empty-steps', 'caution', { steps: 1 }),
    raise('values-unmapped', 'note', { factor: 'topic', values: 'harbour works', mentions: 118 }),
    raise('mix-moved', 'note', { factor: 'venue', level: 'Discussion boards', from: 0.24, to: 0.41 }),
    raise('no-sampling-error', 'note'),
    raise('survey-bases-small', 'note', { hidden: 1, flagged: 26 }),
    raise('conversation-pull', 'note', { venue: 'Discussion boards', lean: 'towards', slope: 0.24 }),
  ]
}

/** A fit whose diagnostics allow publishing. */
export function sampleDiagnostics(venues: readonly string[]): Findings['diagnostics'] {
  return {
    method: 'importance-sampling', pareto_k: 0.31, rhat: null, ess: 2840, draws: 4000, proposals: 8000, converged: true, passed: true,
    checks: venues.flatMap((venue, at) => [
      { name: 'spread', venue, observed: 1 + 0.02 * at, predicted: around(1, 0.12), p: 0.3 + 0.05 * at, passed: true },
      { name: 'memory', venue, observed: 3.1, predicted: around(3, 0.6), p: 0.44, passed: true },
    ]),
  }
}

/** What was assumed and on what it rests. */
export function sampleMethod(
  targetMix: Findings['method']['target_mix'], venues: readonly { readonly venue: string, readonly label: string }[],
): Findings['method'] {
  return {
    base: { from: '2024-05-06', to: '2025-05-05' }, base_is_period: false,
    target_mix: targetMix, target_source: { venue: 'base', topic: 'base', poster: 'base' },
    priors: { initial: 50, mu: 3, venue_drift: 2, fixed_factor: 30, tau: 20 },
    cells: 9104, steps: 130,
    venues: venues.map(({ venue, label }, at) => ({ venue, label, standard_deviation: 58 + 3 * at, intraclass: at === 4 ? null : 0.14 + 0.03 * at, mean_design_effect: 1.1 + 0.05 * at })),
    smallest_group: 10, poster_bounds: { occasional: 1, regular: 5 }, prepared_by: 'Ines Carrow', reviewed_by: null, time_zone: 'Europe/Lisbon', reporting: 'month',
  }
}
