import { expect, test } from 'vitest'
import { normalCdf, normalQuantile } from '../../model/statistics/normal.ts'

// NUM-01, normal part. NIST/SEMATECH e-Handbook of Statistical Methods, section 1.3.6.7, to the printed digits (1.960 ...,
// recalled from memory); computed in R 4.2.2. Tolerance 1e-10 relative.
const published = [[0.9, 1.2815515655446], [0.95, 1.64485362695147], [0.975, 1.95996398454005], [0.995, 2.5758293035489], [0.9995, 3.29052673149193]] as const
const relative = (found: number, expected: number) => Math.abs(found / expected - 1)

test.each(published)('NUM-01: quantile at %d', (p, z) => { expect(relative(normalQuantile(p), z)).toBeLessThan(1e-10) })

test('NUM-01: probability below 1.96', () => { expect(relative(normalCdf(1.96), 0.97500210485178)).toBeLessThan(1e-10) })

test('NUM-01 can fail: one in the ninth place of the probability shows', () => {
  expect(relative(normalQuantile(0.975 + 1e-9), 1.95996398454005)).toBeGreaterThan(1e-9)
})
