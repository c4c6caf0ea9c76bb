import { describe, expect, test } from 'vitest'
import { intraclassCorrelation, oneWayAnova } from '../../model/statistics/intraclass.ts'
import { oneWaySums } from '../model/statistics/one-way-sums.ts'

const relative = (found: number, expected: number) => Math.abs(found / expected - 1)
const correlation = (groups: readonly (readonly number[])[]) => intraclassCorrelation(oneWaySums(groups)).value ?? Number.NaN

describe('ICC-01: one-way correlation of six targets by four judges', () => {
  // Shrout and Fleiss (1979), Intraclass correlations: uses in assessing rater reliability, Psychological Bulletin
  // 86:420-428, Tables 2 to 4. Printed value found; recomputed in R 4.2.2. 0.005 against print, 1e-9 against exact.
  const ratings = [[9, 2, 5, 8], [6, 1, 3, 2], [8, 4, 6, 8], [7, 1, 2, 6], [10, 5, 6, 9], [6, 2, 4, 7]]
  const printed = { betweenMeanSquare: 11.24, withinMeanSquare: 6.26, single: 0.17, average: 0.44 }
  const exact = { betweenMeanSquare: 11.2416666666667, withinMeanSquare: 6.26388888888889, single: 0.165741768405475, average: 0.442797133679269 }

  test.each([[printed, 0.005], [exact, 1e-9]] as const)('%j', (expected, tolerance) => {
    const table = oneWayAnova(oneWaySums(ratings))
    expect(Math.abs(table.betweenMeanSquare - expected.betweenMeanSquare)).toBeLessThan(tolerance)
    expect(Math.abs(table.withinMeanSquare - expected.withinMeanSquare)).toBeLessThan(tolerance)
    expect(table.groupSize).toBe(4)
    expect(Math.abs(correlation(ratings) - expected.single)).toBeLessThan(tolerance)
    expect(Math.abs((table.groupSize * table.betweenVariance) / table.betweenMeanSquare - expected.average)).toBeLessThan(tolerance)
  })

  test('it can fail: one rating changed by one', () => {
    expect(Math.abs(correlation([[9, 2, 5, 7], ...ratings.slice(1)]) - exact.single)).toBeGreaterThan(1e-3)
  })
})

describe('ICC-03: SiRstv', () => {
  // NIST Statistical Reference Datasets, Analysis of Variance, SiRstv. Certified values and data from memory; a
  // recomputation in R 4.2.2 reproduces them to all printed digits. Tolerance 1e-9 relative.
  const groups = [
    [196.3052, 196.124, 196.189, 196.2569, 196.3403], [196.3042, 196.3825, 196.1669, 196.3257, 196.0422],
    [196.1303, 196.2005, 196.2889, 196.0343, 196.1811], [196.2795, 196.1748, 196.1494, 196.1485, 195.9885],
    [196.2119, 196.1051, 196.185, 196.0052, 196.209],
  ]
  const certified = { between: 0.0511462616, within: 0.21663656, f: 1.18046237440255, residual: 0.104076068334656, icc: 0.0348351867768221 }

  test('sums of squares, F, residual deviation, intraclass correlation', () => {
    const sums = oneWaySums(groups)
    const table = oneWayAnova(sums)
    expect(relative(sums.betweenSquares, certified.between)).toBeLessThan(1e-9)
    expect(relative(sums.withinSquares, certified.within)).toBeLessThan(1e-9)
    expect(relative(table.betweenMeanSquare / table.withinMeanSquare, certified.f)).toBeLessThan(1e-9)
    expect(relative(Math.sqrt(table.withinMeanSquare), certified.residual)).toBeLessThan(1e-9)
    expect(relative(correlation(groups), certified.icc)).toBeLessThan(1e-9)
  })

  test('it can fail: the last digit of one measurement', () => {
    expect(relative(correlation([[196.3051, ...groups[0].slice(1)], ...groups.slice(1)]), certified.icc)).toBeGreaterThan(1e-4)
  })
})

describe('LMM-05: dyestuff, the figures of the analysis of variance', () => {
  // Davies (1947), dyestuff yields; Box and Tiao (1973), Bayesian Inference in Statistical Analysis. Closed form and the R
  // package lme4 1.1.31 agree; the published figures are from memory. Tolerance 1e-8 relative.
  const yields = [
    [1545, 1440, 1440, 1520, 1580], [1540, 1555, 1490, 1560, 1495], [1595, 1550, 1605, 1510, 1560],
    [1445, 1440, 1595, 1465, 1545], [1595, 1630, 1515, 1635, 1625], [1520, 1455, 1450, 1480, 1445],
  ]

  test('mean squares, components, intraclass correlation, F', () => {
    const table = oneWayAnova(oneWaySums(yields))
    expect(relative(table.betweenMeanSquare, 11271.5)).toBeLessThan(1e-8)
    expect(relative(table.withinMeanSquare, 2451.25)).toBeLessThan(1e-8)
    expect(relative(table.betweenVariance, 1764.05)).toBeLessThan(1e-8)
    expect(relative(table.betweenMeanSquare / table.withinMeanSquare, 4.59826619071901)).toBeLessThan(1e-8)
    expect(relative(correlation(yields), 0.418487414893364)).toBeLessThan(1e-8)
  })

  test('it can fail: without the first batch', () => {
    expect(relative(correlation(yields.slice(1)), 0.418487414893364)).toBeGreaterThan(1e-3)
  })
})
