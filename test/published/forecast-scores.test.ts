import { describe, expect, test } from 'vitest'
import { intervalScore, normalCrps, quantileLoss } from '../../model/statistics/forecast-scores.ts'

describe('CRPS-01: five normal forecasts', () => {
  // Gneiting and Raftery (2007), JASA 102:359-378, eq. 21; R package scoringRules 1.1.1, test of crps_norm (2.43657473).
  // Printed value found; recomputed in R 4.2.2. Tolerance 1e-8.
  const cases = [[0, 0, 1, 0.233694977255109], [-3, 0, 1, 2.43657472508634], [0, 2, 2, 1.20488271525523], [1.7, 0.5, 0.8, 0.795539203181962], [-2.7, 0, 0.9, 2.19291725257771]]

  test.each(cases)('%d against %d with standard deviation %d', (y, centre, sd, expected) => {
    expect(Math.abs(normalCrps(y, centre, sd) - expected)).toBeLessThan(1e-8)
  })

  test('it can fail: another standard deviation', () => {
    expect(Math.abs(normalCrps(0, 0, 1.01) - cases[0][3])).toBeGreaterThan(1e-3)
  })
})

describe('CRPS-03: interval score and quantile loss', () => {
  // Gneiting and Raftery (2007), eq. 43. Confirmed by arithmetic. Tolerance 1e-12.
  test.each([[0.5, 3.2], [2, 11.2], [-2.4, 19.2]])('interval -1.6 to 1.6 at 0.1, observed %d', (y, expected) => {
    expect(intervalScore(y, -1.6, 1.6, 0.1)).toBeCloseTo(expected, 12)
  })

  test.each([[0.7, 0.05], [2, 0.72]])('0.9 quantile 1.2, observed %d', (y, expected) => {
    expect(quantileLoss(y, 1.2, 0.9)).toBeCloseTo(expected, 12)
  })

  test('it can fail: the loss of the 0.1 quantile', () => { expect(quantileLoss(2, 1.2, 0.1)).not.toBeCloseTo(0.72, 2) })
})
