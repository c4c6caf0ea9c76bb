import type { Findings } from '../findings/schema.ts'

type Survey = NonNullable<Findings['survey']>

/** Fewer pairs of wave and posts than this say nothing. */
export const pairsNeeded = 8
/** The rivals of the rule. */
const ruleRivals = ['carry-forward', 'past-mean']

function beatsBoth({ rmse, rivals }: NonNullable<Survey['forecast']>): boolean {
  return rivals.filter(({ rival }) => ruleRivals.includes(rival)).every((rival) => rmse < rival.rmse)
}

/** The p-values, adjusted for the lags looked at, at which a correlation counts. */
const clear = 0.05
const likely = 0.1

/**
 * The verdict on mix-adjusted opinion against the survey; the first rule that holds decides:
 * `too-few-waves` with fewer than 8 pairs; `contradicts` where the best r is negative, p <= 0.05; `leads` where it is positive, p <= 0.05, at a lag
 * above 0, and the forecasts' errors are smaller than those of both the last wave carried forward and the mean of past waves; `tracks` where it is
 * positive, p <= 0.10; else `not-established`.
 */
export function verdictOf(adjusted: Survey['candidates'][number], forecast: Survey['forecast']): Survey['verdict'] {
  const { best, adjusted_p: p } = adjusted
  if (adjusted.lags.every(({ pairs }) => pairs < pairsNeeded)) return 'too-few-waves'
  const r = best?.r ?? null
  // waves that do not vary go with nothing
  if (best === null || r === null || p === null) return 'not-established'
  if (r < 0 && p <= clear) return 'contradicts'
  if (r > 0 && p <= clear && best.lag > 0 && forecast !== null && beatsBoth(forecast)) return 'leads'
  return r > 0 && p <= likely ? 'tracks' : 'not-established'
}
