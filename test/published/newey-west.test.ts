import { describe, expect, test } from 'vitest'
import { neweyWest } from '../../model/statistics/newey-west.ts'
import { numericColumns } from './numeric-columns.ts'

const relative = (found: number, expected: number) => Math.abs(found / expected - 1)

describe('HAC-01: investment on product and interest, lag 4', () => {
  // Greene (1993), Econometric Analysis, 2nd ed., Table 15.1 and Example 15.3 (standard errors printed there: 18.958, 0.0168, 3.342);
  // Zeileis (2004), J. of Statistical Software 11(10). Computed by the R package sandwich 3.0-2. Tolerance 1e-8 relative.
  const { investment, product, interest } = numericColumns('investment.csv')
  const design = [new Float64Array(investment.length).fill(1), product, interest]
  const found = neweyWest(design, investment, 4)
  const standardErrors = [18.9582981317974, 0.0167507858601938, 3.34237535268281]

  test('coefficients, standard errors and their print', () => {
    ;[-12.5336005909118, 0.169136454182171, -1.00143801342343].forEach((expected, j) => { expect(relative(found.coefficients[j], expected)).toBeLessThan(1e-8) })
    standardErrors.forEach((expected, j) => { expect(relative(found.standardErrors[j], expected)).toBeLessThan(1e-8) })
    expect([found.standardErrors[0].toFixed(3), found.standardErrors[1].toFixed(4), found.standardErrors[2].toFixed(3)]).toEqual(['18.958', '0.0168', '3.342'])
    expect(found.freedom).toBe(16)
  })

  test('covariance', () => {
    const covariance = [
      359.417068054114, -0.311550503518983, -4.08931930541792,
      -0.311550503518985, 0.000280588826934069, -0.00535593118833008,
      -4.0893193054179, -0.00535593118833007, 11.1714729982215,
    ]
    covariance.forEach((expected, at) => { expect(relative(found.covariance[at], expected)).toBeLessThan(1e-8) })
  })

  test('it can fail: three lags, or the factor for small samples', () => {
    expect(relative(neweyWest(design, investment, 3).standardErrors[1], standardErrors[1])).toBeGreaterThan(1e-3)
    expect(relative(neweyWest(design, investment, 4, { smallSample: true }).standardErrors[1], standardErrors[1])).toBeCloseTo(Math.sqrt(19 / 16) - 1, 8)
  })
})

describe('HAC-03: standard error of the mean of an autocorrelated series, lag 3', () => {
  // Newey and West (1987), Econometrica 55:703-708. Hand formula, equal to the R package sandwich 3.0-2. Tolerance 1e-10.
  const y = [
    2.4, 2.4, 2.4, 2.2, 2.1, 1.5, 2.3, 2.3, 2.5, 2, 1.9, 1.7, 2.2, 1.8, 3.2, 3.2, 2.7, 2.2, 2.2, 1.9, 1.9, 1.8, 2.7, 3, 2.3, 2, 2, 2.9, 2.9, 2.7, 2.7, 2.3, 2.6, 2.4, 1.8,
    1.7, 1.5, 1.4, 2.1, 3.3, 3.5, 3.5, 3.1, 2.6, 2.1, 3.4, 3, 2.9,
  ]
  const of = (lags: number) => neweyWest([new Float64Array(y.length).fill(1)], y, lags)

  test('mean, its variance and its standard error', () => {
    expect(Math.abs(of(3).coefficients[0] - 2.4)).toBeLessThan(1e-10)
    expect(Math.abs(of(3).covariance[0] - 0.0122439236111111)).toBeLessThan(1e-10)
    expect(Math.abs(of(3).standardErrors[0] - 0.110652264374079)).toBeLessThan(1e-10)
  })

  test('it can fail: as if the values were independent it is 0.0796 with divisor n - 1', () => {
    expect(of(0).standardErrors[0] * Math.sqrt(48 / 47)).toBeCloseTo(0.0796156547562695, 10)
    expect(of(3).standardErrors[0] - of(0).standardErrors[0]).toBeGreaterThan(0.03)
  })
})
