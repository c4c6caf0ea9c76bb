import { describe, expect, test } from 'vitest'
import { dieboldMariano } from '../../model/statistics/diebold-mariano.ts'
import { numericColumns } from './numeric-columns.ts'

const near = (found: number | null, expected: number, tolerance: number) => { expect(Math.abs((found ?? Number.NaN) - expected)).toBeLessThan(tolerance) }

// Diebold and Mariano (1995), J. of Business and Economic Statistics 13:253-263; Harvey, Leybourne and Newbold (1997),
// International J. of Forecasting 13:281-291. Confirmed by dm.test of the R package forecast 8.20 and by formula in R 4.2.2.
describe('DM-01: two forecasts of WWWusage, one step ahead', () => {
  // The example of dm.test. Tolerance 1e-8.
  const { ets, arima } = numericColumns('usage-forecast-errors.csv')

  test('loss difference, statistic and p', () => {
    const { lossDifference, statistic, p } = dieboldMariano(ets, arima, 1)
    near(lossDifference, 1.91770245341462, 1e-8)
    near(statistic.value, 1.90777729307634, 1e-8)
    near(p.value, 0.0593178558822261, 1e-8)
  })

  test('it can fail: without the correction the statistic is 1.91738832', () => {
    const raw = dieboldMariano(ets, arima, 1).statistic.value! / 0.99498743710662
    near(raw, 1.91738832263458, 1e-8)
    expect(Math.abs(raw - 1.90777729307634)).toBeGreaterThan(0.009)
  })
})

describe('DM-03: twelve forecasts, two steps ahead', () => {
  // Tolerance 1e-10.
  const e1 = [1.2, -0.8, 0.5, 2.1, -1.4, 0.3, 0.9, -2.2, 1.1, 0.4, -0.6, 1.7]
  const e2 = [0.7, -0.5, 0.9, 1.2, -0.9, 0.8, 0.2, -1.5, 1.3, -0.1, -0.2, 1.1]

  test('loss difference, statistic and p', () => {
    const { lossDifference, statistic, p } = dieboldMariano(e1, e2, 2)
    near(lossDifference, 0.781666666666667, 1e-10)
    near(statistic.value, 3.01118002605073, 1e-10)
    near(p.value, 0.0118408718503697, 1e-10)
  })

  test('it can fail: one step ahead', () => { expect(Math.abs(dieboldMariano(e1, e2, 1).statistic.value! - 3.01118002605073)).toBeGreaterThan(0.01) })
})
