import { describe, expect, test } from 'vitest'
import { createGenerator } from '../../../model/random/generator.ts'
import type { OutcomeInput } from '../../../model/inputs/small-inputs.ts'
import { analyseHere, noInputs } from '../../support/analyse-reference.ts'
import { simulateCells } from '../../support/simulate-cells.ts'

const steps = 100
const { tables, truth } = simulateCells({
  steps, venues: 2, topics: 1, posters: 1, mentionsPerStep: 400,
  sigmas: { mu: 0.04, venueDrift: [0.002, 0.002], venue: 0.1, topic: 0, poster: 0, tau: 0.02 },
}, createGenerator(8, 0))

/** Spans of four weeks. Growth, in percent: half the market's, and 0.8 per point that opinion had moved one span before. */
function spansOf(options: { readonly market?: boolean; readonly marketFrom?: number; readonly count?: number } = {}): OutcomeInput['spans'] {
  const generator = createGenerator(8, 1)
  const opinion = (span: number) => 100 * [0, 1, 2, 3].reduce((sum, week) => sum + truth.mu[Math.max(0, 4 * span + week)] / 4, 0)
  let [value, market] = [1000, 50]
  return Array.from({ length: options.count ?? 25 }, (_, i) => {
    const marketGrowth = generator.normal()
    const growth = 0.5 * marketGrowth + 0.8 * (opinion(i - 1) - opinion(i - 2)) + 0.4 * generator.normal()
    market *= Math.exp(marketGrowth / 100)
    if (i > 0) value *= Math.exp(growth / 100)
    return {
      start: `2024-01-${String(i + 1).padStart(2, '0')}`, end: `2024-02-${String(i + 1).padStart(2, '0')}`, startStep: 4 * i, days: new Float64Array(4).fill(7),
      value, market: options.market === false || i < (options.marketFrom ?? 0) ? null : market,
    }
  })
}

const outcomeOf = async (spans: OutcomeInput['spans']) => (await analyseHere(tables, { seed: 1 }, { ...noInputs, outcome: { spans } })).outcome

describe('growth beside opinion', () => {
  test('the lag and the effects that were built in are found', async () => {
    const found = await outcomeOf(spansOf())
    expect(found).toMatchObject({ market: true, looks: 4, best_lag: 1, span_days: 28, observations: 24, error_lags: 2 })
    const { effect, observations, adjusted_p: p } = found!.lags[1]
    expect(observations).toBe(23)
    // 0.8 per point, told for ten points; within three standard errors
    expect(Math.abs(effect.mean - 8)).toBeLessThan(3 * effect.sd)
    expect(effect.low).toBeGreaterThan(0)
    expect(p).toBeLessThan(0.001)
    expect(Math.abs(found!.market_effect!.mean - 0.5)).toBeLessThan(3 * found!.market_effect!.sd)
  })
  test('without a market growth stands alone', async () => {
    expect(await outcomeOf(spansOf({ market: false }))).toMatchObject({ market: false, market_effect: null, best_lag: 1 })
  })
  test('spans whose market is not known are left out', async () => {
    expect((await outcomeOf(spansOf({ marketFrom: 6 })))!.observations).toBe(18)
  })
  test('too short a series says nothing', async () => {
    expect(await outcomeOf(spansOf({ count: 12 }))).toMatchObject({ lags: [], best_lag: null, looks: 0, market_effect: null })
  })
  test('with nothing within the period there is none', async () => {
    expect(await outcomeOf([])).toBeNull()
  })
})
