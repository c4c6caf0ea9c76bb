import { describe, expect, test } from 'vitest'
import { verdictOf } from '../../../model/survey/verdict.ts'

const lag = (r: number, at: number, pairs = 30) => ({ lag: at, r, low: r - 0.1, high: r + 0.1, pairs, effective_pairs: 10, corrected: null })
const candidate = (r: number | null, at: number, p: number | null, pairs = 30) => ({
  series: 'adjusted' as const, venue: null, label: 'adjusted', lags: [{ ...lag(0, at, pairs), r }], best_lag: r === null ? null : at, best: r === null ? null : lag(r, at), adjusted_p: p,
})
const score = { rmse: 2, crps: 1, coverage: 0.9 }
const forecast = (carried: number, mean: number) => ({
  ...score, origins: 22, rmse_ratio: 2 / carried, dm_p: 0.1, waves: [],
  rivals: [
    { ...score, rival: 'carry-forward' as const, rmse: carried, rmse_ratio: 2 / carried, crps_ratio: null, dm_p: null },
    { ...score, rival: 'past-mean' as const, rmse: mean, rmse_ratio: 2 / mean, crps_ratio: null, dm_p: null },
  ],
})

describe('the first rule that holds decides', () => {
  test.each([
    ['too-few-waves', candidate(null, 0, null, 7), null],
    ['not-established', candidate(null, 0, null, 8), null],
    ['contradicts', candidate(-0.6, 4, 0.05), forecast(3, 3)],
    ['leads', candidate(0.6, 4, 0.05), forecast(3, 3)],
    ['tracks', candidate(0.6, 4, 0.051), forecast(3, 3)],
    ['tracks', candidate(0.6, 0, 0.01), forecast(3, 3)],
    ['tracks', candidate(0.6, -2, 0.01), forecast(3, 3)],
    ['tracks', candidate(0.6, 4, 0.01), forecast(3, 1.9)],
    ['tracks', candidate(0.6, 4, 0.01), forecast(2, 3)],
    ['tracks', candidate(0.6, 4, 0.01), null],
    ['tracks', candidate(0.6, 4, 0.1), forecast(3, 3)],
    ['not-established', candidate(0.6, 4, 0.101), forecast(3, 3)],
    ['not-established', candidate(-0.6, 4, 0.051), forecast(3, 3)],
    ['not-established', candidate(0, 4, 0.01), forecast(3, 3)],
  ])('%s', (verdict, adjusted, forecasts) => {
    expect(verdictOf(adjusted, forecasts)).toBe(verdict)
  })
})
