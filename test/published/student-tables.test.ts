import { describe, expect, test } from 'vitest'
import { correlation } from '../../model/statistics/correlation.ts'
import { studentCdf } from '../../model/statistics/student-t.ts'

describe('NUM-01, Student\'s t', () => {
  // NIST/SEMATECH e-Handbook of Statistical Methods, section 1.3.6.7, to the printed digits (2.228 ..., recalled from memory); computed in
  // R 4.2.2. Tolerance 1e-10 relative.
  const published = [[1, 12.7062047361747], [2, 4.30265272974946], [5, 2.57058183563631], [10, 2.22813885198627], [30, 2.04227245630124], [120, 1.97993040508242]] as const
  const relative = (found: number, expected: number) => Math.abs(found / expected - 1)

  test.each(published)('freedom %d: %d leaves 2.5 % above', (freedom, t) => { expect(relative(studentCdf(-t, freedom), 0.025)).toBeLessThan(1e-10) })
  test('freedom 7: probability below 2.1', () => { expect(relative(studentCdf(2.1, 7), 0.963064401893539)).toBeLessThan(1e-10) })
  test('it can fail: one in the ninth place of t shows', () => { expect(relative(studentCdf(-2.22813885198627 - 1e-9, 10), 0.025)).toBeGreaterThan(1e-10) })
})

describe('FZ-03: tuna quality, t test of the correlation', () => {
  // Hollander and Wolfe (1973), p. 187; the example of cor.test in R, whose print (t 1.8411, p 0.1082) is taken over. Tolerance 1e-7.
  const r = correlation([44.4, 45.9, 41.9, 53.3, 44.7, 44.1, 50.7, 45.2, 60.1], [2.6, 3.1, 2.5, 5, 3.6, 4, 5.2, 2.8, 3.8])!
  const t = r * Math.sqrt(7 / (1 - r * r))

  test('t and its two-sided p', () => {
    expect(Math.abs(t - 1.84108263811534)).toBeLessThan(1e-7)
    expect(Math.abs(2 * studentCdf(-t, 7) - 0.108173054349494)).toBeLessThan(1e-7)
  })

  test('it can fail: eight degrees of freedom', () => { expect(Math.abs(2 * studentCdf(-t, 8) - 0.108173054349494)).toBeGreaterThan(1e-3) })
})
