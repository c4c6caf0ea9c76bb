import { expect, test } from 'vitest'
import { normalCrps, quantileLoss } from '../../../model/statistics/forecast-scores.ts'
import { mixtureCrps } from '../../../model/statistics/mixture-crps.ts'
import { mixtureQuantile, type MixtureComponent } from '../../../model/statistics/mixture-forecast.ts'
import { normalCdf, normalDensity } from '../../../model/statistics/normal.ts'

const mixture: readonly MixtureComponent[] = [{ weight: 0.2, centre: -3, scale: 0.5, freedom: 6 }, { weight: 0.5, centre: 0, scale: 2, freedom: 12 }, { weight: 0.3, centre: 4, scale: 0.05, freedom: 30 }]

test.each([-20, -3, 0.7, 4, 4.02, 35])('with endless freedom it is the normal\'s, observed %d', (observed) => {
  const found = mixtureCrps(observed, [{ weight: 1, centre: 0.7, scale: 1.6, freedom: 1e13 }])
  expect(Math.abs(found - normalCrps(observed, 0.7, 1.6))).toBeLessThan(1e-9)
  expect(Math.abs(found - normalCrps(observed, 0.7, 1.61))).toBeGreaterThan(1e-4)
})

test.each([-5, 0.3, 4])('of two normals: Grimit and others (2006), observed %d, narrow beside wide', (observed) => {
  // CRPS = sum w_i A(y - m_i, s_i^2) - 1/2 sum w_i w_j A(m_i - m_j, s_i^2 + s_j^2), Quarterly J. of the Royal Meteorological Society 132:2925-2942
  const expected = (parts: readonly (readonly [number, number, number])[]) => {
    const a = (m: number, sd: number) => m * (2 * normalCdf(m / sd) - 1) + 2 * sd * normalDensity(m / sd)
    return parts.reduce((sum, [w, m, s]) => sum + w * a(observed - m, s) - 0.5 * parts.reduce((inner, [v, n, r]) => inner + w * v * a(m - n, Math.hypot(s, r)), 0), 0)
  }
  const parts = [[0.6, 0, 3], [0.4, 4, 0.001]] as const
  const found = mixtureCrps(observed, parts.map(([weight, centre, scale]) => ({ weight, centre, scale, freedom: 1e13 })))
  expect(Math.abs(found - expected(parts))).toBeLessThan(1e-9)
  expect(Math.abs(found - expected([[0.6, 0, 3], [0.4, 4.01, 0.001]]))).toBeGreaterThan(1e-4)
})

test.each([-4, 0.5, 4])('it is twice the quantile loss averaged over all quantiles, observed %d', (observed) => {
  const levels = Array.from({ length: 4000 }, (_, i) => (i + 0.5) / 4000)
  const average = levels.reduce((sum, p) => sum + 2 * quantileLoss(observed, mixtureQuantile(p, mixture), p), 0) / levels.length
  expect(Math.abs(mixtureCrps(observed, mixture) - average)).toBeLessThan(1e-5)
  expect(Math.abs(mixtureCrps(observed, mixture.slice(0, 2)) - average)).toBeGreaterThan(1e-3)
})

test('a unit and a zero move it as they should; far off it grows by one a unit', () => {
  const moved = mixture.map((one) => ({ ...one, centre: 100 + 1000 * one.centre, scale: 1000 * one.scale }))
  expect(mixtureCrps(100 + 1300, moved) / mixtureCrps(1.3, mixture)).toBeCloseTo(1000, 6)
  expect(mixtureCrps(5001, mixture) - mixtureCrps(5000, mixture)).toBeCloseTo(1, 6)
})

test('even with one degree of freedom the integral exists: (2 / pi) ln 2 at the centre', () => {
  // 2 times the integral over x > 0 of (1/2 - atan(x) / pi)^2 = (2 / pi^2) times that of arccot(x)^2, which is pi ln 2.
  expect(Math.abs(mixtureCrps(0, [{ weight: 1, centre: 0, scale: 1, freedom: 1 }]) - (2 / Math.PI) * Math.LN2)).toBeLessThan(1e-9)
})

test('refused by name', () => {
  expect(() => mixtureCrps(Number.NaN, mixture)).toThrow('observed NaN')
  expect(() => mixtureCrps(0, [{ weight: 1, centre: 0, scale: 0, freedom: 3 }])).toThrow('components[0]')
})
