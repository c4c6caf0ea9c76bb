import type { Findings } from '../findings/schema.ts'
import { paretoKLimit } from '../diagnostics/pareto-k.ts'
import type { Posterior } from '../fit/posterior.ts'
import { readChecks } from './predictive-checks.ts'
import type { Reading } from './context.ts'

/** Effective draws below which intervals are not told with the usual confidence (Vehtari et al. 2021 ask for 400). */
const leastEffective = 400

/** Whether the draws of a fit can be relied on: Pareto k and effective draws. */
export function hasConverged({ paretoK, sigmas, effective }: Posterior): boolean {
  return paretoK !== null && paretoK <= paretoKLimit(sigmas.count) && effective >= leastEffective
}

/** Whether the fit can be trusted, by its own account: Pareto k, effective draws, posterior predictive checks. */
export function readDiagnostics(reading: Reading, seed: number, interval: number): Findings['diagnostics'] {
  const { posterior } = reading
  const trusted = hasConverged(posterior)
  const checks = readChecks(reading, seed, interval)
  return {
    method: 'importance sampling of the standard deviations, states integrated out and drawn exactly',
    pareto_k: posterior.paretoK, rhat: null, ess: posterior.effective,
    draws: posterior.draws.count, proposals: posterior.sigmas.count,
    converged: trusted, passed: trusted && checks.every((check) => check.passed),
    checks,
  }
}
