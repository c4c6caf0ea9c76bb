import { describe, expect, test } from 'vitest'
import { correlation } from '../../model/statistics/correlation.ts'
import { fisherInterval } from '../../model/statistics/fisher-interval.ts'

describe('FZ-01: 95 % intervals of three correlations', () => {
  // Fisher (1921), Metron 1:3-32; Fisher (1925), Statistical Methods for Research Workers, section 35. Confirmed by formula,
  // equal to cor.test of R 4.2.2 by construction. Tolerance 1e-9.
  const cases = [
    { r: 0.5, pairs: 30, low: 0.1704313651118, high: 0.728958556388355 },
    { r: 0.35, pairs: 120, low: 0.182188136884663, high: 0.497999598846477 },
    { r: -0.72, pairs: 15, low: -0.900231234877888, high: -0.329129883297987 },
  ]

  test.each(cases)('$r of $pairs pairs', ({ r, pairs, low, high }) => {
    const found = fisherInterval(r, pairs, 0.95)
    expect(Math.abs((found?.low ?? Number.NaN) - low)).toBeLessThan(1e-9)
    expect(Math.abs((found?.high ?? Number.NaN) - high)).toBeLessThan(1e-9)
  })

  test('it can fail: one pair more', () => {
    expect(Math.abs((fisherInterval(0.5, 31, 0.95)?.low ?? 0) - cases[0].low)).toBeGreaterThan(1e-3)
  })
})

describe('FZ-03: tuna quality', () => {
  // Hollander and Wolfe (1973), p. 187; the example of cor.test in R, whose print is taken over. Tolerance 1e-7.
  const lightness = [44.4, 45.9, 41.9, 53.3, 44.7, 44.1, 50.7, 45.2, 60.1]
  const panel = [2.6, 3.1, 2.5, 5, 3.6, 4, 5.2, 2.8, 3.8]
  const r = correlation(lightness, panel) ?? Number.NaN

  test('correlation and its 95 % interval', () => {
    expect(Math.abs(r - 0.571181557563829)).toBeLessThan(1e-7)
    const found = fisherInterval(r, 9, 0.95)
    expect(Math.abs((found?.low ?? Number.NaN) - -0.149742633036757)).toBeLessThan(1e-7)
    expect(Math.abs((found?.high ?? Number.NaN) - 0.895579461838739)).toBeLessThan(1e-7)
  })

  test('it can fail: two partners exchanged', () => {
    expect(Math.abs((correlation(lightness, panel.with(0, 3.1).with(1, 2.6)) ?? 0) - r)).toBeGreaterThan(1e-4)
  })
})
