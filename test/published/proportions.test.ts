import { describe, expect, test } from 'vitest'
import { wilsonInterval } from '../../model/statistics/wilson.ts'

describe('PROP-01: Wilson interval, four cases, 95 %', () => {
  // Newcombe (1998), Two-sided confidence intervals for the single proportion, Statistics in Medicine 17:857-872, Table I,
  // method 3. Printed value found; recomputed in R 4.2.2. Tolerance 5e-5 against print; 1e-12 against the recomputation.
  const cases = [
    { x: 81, n: 263, printed: [0.2553, 0.3662], exact: [0.255288519878274, 0.3662095769828] },
    { x: 15, n: 148, printed: [0.0624, 0.1605], exact: [0.0623863995307363, 0.160487241723308] },
    { x: 0, n: 20, printed: [0, 0.1611], exact: [0, 0.161125158052819] },
    { x: 1, n: 29, printed: [0.0061, 0.1718], exact: [0.00611321429276265, 0.171755218793203] },
  ]

  test.each(cases)('$x of $n', ({ x, n, printed, exact }) => {
    const { low, high } = wilsonInterval(x, n, 0.95)
    expect(Math.abs(low - printed[0])).toBeLessThan(5e-5)
    expect(Math.abs(high - printed[1])).toBeLessThan(5e-5)
    expect(Math.abs(low - exact[0])).toBeLessThan(1e-12)
    expect(Math.abs(high - exact[1])).toBeLessThan(1e-12)
  })

  test('it can fail: the Wald interval of 1 in 29 reaches below 0', () => {
    const wald = 1 / 29 - 1.959963984540054 * Math.sqrt((1 / 29) * (28 / 29) / 29)
    expect(wald).toBeCloseTo(-0.0319267259982928, 12)
    expect(Math.abs(wilsonInterval(1, 29, 0.95).low - wald)).toBeGreaterThan(0.03)
  })
})
