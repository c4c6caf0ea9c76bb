import { describe, expect, test } from 'vitest'
import { normalCdf } from '../../model/statistics/normal.ts'
import { twoShares } from '../../model/statistics/two-sample-tests.ts'

const near = (found: number | null, expected: number, tolerance: number) => { expect(Math.abs((found ?? Number.NaN) - expected)).toBeLessThan(tolerance) }

describe('PROP-02: Newcombe\'s hybrid score interval, five cases, 95 %', () => {
  // Newcombe (1998), Interval estimation for the difference between independent proportions, Statistics in Medicine 17:873-890,
  // Table II, method 10, cases a, b, d, e and g. Printed value found; recomputed in R 4.2.2. Tolerance 5e-5 against print; 1e-12 against the recomputation.
  const cases = [
    { a: 56, m: 70, b: 48, n: 80, printed: [0.0524, 0.3339], exact: [0.0524314724023649, 0.333872654036906] },
    { a: 9, m: 10, b: 3, n: 10, printed: [0.1705, 0.809], exact: [0.170522723934503, 0.809017973535488] },
    { a: 5, m: 56, b: 0, n: 29, printed: [-0.0381, 0.1926], exact: [-0.0381371479035369, 0.192560013855112] },
    { a: 0, m: 10, b: 0, n: 20, printed: [-0.1611, 0.2775], exact: [-0.161125158052819, 0.277532799862889] },
    { a: 10, m: 10, b: 0, n: 20, printed: [0.6791, 1], exact: [0.679086037141915, 1] },
  ]

  test.each(cases)('$a of $m against $b of $n', ({ a, m, b, n, printed, exact }) => {
    const { low, high } = twoShares({ share: a / m, base: m }, { share: b / n, base: n }, 0.95)
    near(low, printed[0], 5e-5)
    near(high, printed[1], 5e-5)
    near(low, exact[0], 1e-12)
    near(high, exact[1], 1e-12)
  })

  test('it can fail: the samples exchanged', () => {
    expect(Math.abs(twoShares({ share: 0.6, base: 80 }, { share: 0.8, base: 70 }, 0.95).low - 0.0524)).toBeGreaterThan(0.1)
  })
})

describe('PROP-05: heart attacks, 189 of 11034 with placebo, 104 of 11037 with aspirin', () => {
  // Agresti (2002), Categorical Data Analysis, section 2.2; published figures (difference 0.0077) from memory; recomputed in R 4.2.2. Tolerance 1e-8.
  const { difference, low, high, p } = twoShares({ share: 189 / 11034, base: 11034 }, { share: 104 / 11037, base: 11037 }, 0.95)

  test('difference, interval and pooled p', () => {
    near(difference, 0.0077, 5e-5)
    near(difference, 0.00770602397600478, 1e-8)
    near(low, 0.0047020297463815, 1e-8)
    near(high, 0.0107750837768823, 1e-8)
    near(p.value! / 5.69189697374084e-7, 1, 1e-8)
  })

  test('it can fail: the test that does not pool has z 5.00403 for 5.00139', () => {
    expect(2 * normalCdf(-5.00138820400838) / p.value!).toBeCloseTo(1, 8)
    expect(Math.abs((2 * normalCdf(-5.00402977165486)) / p.value! - 1)).toBeGreaterThan(0.01)
  })
})

describe('PROP-07: 56.0 against 52.0 %, 1,000 interviews each, worth 640', () => {
  // Arithmetic from the pooled z; computed in R 4.2.2. Tolerance 1e-10.
  test.each([[1000, 0.0727164422797564], [640, 0.15109197486901]])('base %d', (base, expected) => {
    near(twoShares({ share: 0.56, base }, { share: 0.52, base }, 0.95).p.value, expected, 1e-10)
  })

  test('it can fail: one interview less', () => {
    expect(Math.abs(twoShares({ share: 0.56, base: 999 }, { share: 0.52, base: 1000 }, 0.95).p.value! - 0.0727164422797564)).toBeGreaterThan(1e-5)
  })
})
