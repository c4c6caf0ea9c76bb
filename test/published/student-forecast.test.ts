import { describe, expect, test } from 'vitest'
import { mixtureCrps } from '../../model/statistics/mixture-crps.ts'

describe('continuous ranked probability score of one Student\'s t', () => {
  // Jordan, Krüger and Lerch (2019), Evaluating Probabilistic Forecasts with scoringRules, J. of Statistical Software 90(12), appendix A (closed
  // form, from memory): z (2 F(z) - 1) + 2 f(z) (v + z^2) / (v - 1) - 2 sqrt(v) B(1/2, v - 1/2) / ((v - 1) B(1/2, v/2)^2).
  // Values by mpmath 1.3.0 at 40 digits, for v = 3 also by quadrature of the integral itself.
  const cases = [[2, 0, 0.3034928278335035], [2, 1.5, 0.9508320782692387], [2, -4, 3.1319199525796937], [3, 0, 0.27566444771089604], [3, 1.5, 0.9572210251964112], [3, -4, 3.235076694538872], [5, 0, 0.25702536290064726], [5, 1.5, 0.9685284923237384], [5, -4, 3.3205141104662235], [30, 0, 0.23724820105529007], [30, 1.5, 0.9894283493817336], [30, -4, 3.4188360881265516]] as const
  const score = (z: number, freedom: number) => mixtureCrps(10 + 4 * z, [{ weight: 1, centre: 10, scale: 4, freedom }]) / 4

  test.each(cases)('freedom %d, observed %d scales from the centre', (freedom, z, expected) => { expect(Math.abs(score(z, freedom) - expected)).toBeLessThan(1e-9) })

  test('it can fail: one degree of freedom more', () => {
    for (const [freedom, z, expected] of cases) expect(Math.abs(score(z, freedom + 1) - expected)).toBeGreaterThan(1e-4)
  })
})
