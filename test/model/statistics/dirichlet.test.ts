import { expect, test } from 'vitest'
import { createGenerator } from '../../../model/random/generator.ts'
import { fillDirichlet } from '../../../model/statistics/dirichlet.ts'

test('means a / sum and variances m (1 - m) / (sum + 1), within 3.5 standard errors; negative covariances', () => {
  const concentrations = [1, 2.5, 0.5]
  const [n, sum] = [100_000, 4]
  const generator = createGenerator(9, 0)
  const shares = new Float64Array(3)
  const [totals, squares] = [new Float64Array(3), new Float64Array(3)]
  let product = 0
  for (let i = 0; i < n; i += 1) {
    fillDirichlet(shares, concentrations, generator)
    expect(Math.abs(shares[0] + shares[1] + shares[2] - 1)).toBeLessThan(1e-12)
    shares.forEach((share, j) => { totals[j] += share; squares[j] += share * share })
    product += shares[0] * shares[1]
  }
  concentrations.forEach((a, j) => {
    const m = a / sum
    const variance = (m * (1 - m)) / (sum + 1)
    expect(Math.abs(totals[j] / n - m)).toBeLessThan(3.5 * Math.sqrt(variance / n))
    expect((squares[j] / n - (totals[j] / n) ** 2) / variance).toBeCloseTo(1, 1)
  })
  // -a b / (sum^2 (sum + 1))
  expect(product / n - (totals[0] * totals[1]) / n ** 2).toBeCloseTo(-2.5 / 80, 3)
})

test('so small that all gamma draws underflow together, shares still sum to 1', () => {
  const shares = new Float64Array(2)
  const generator = createGenerator(3, 0)
  for (let i = 0; i < 100; i += 1) {
    fillDirichlet(shares, [0.001, 0.001], generator)
    expect(shares[0] + shares[1]).toBeCloseTo(1, 12)
  }
})

test('refused by name', () => {
  const generator = createGenerator(1, 0)
  expect(() => { fillDirichlet(new Float64Array(2), [1], generator) }).toThrow('target 2')
  expect(() => { fillDirichlet(new Float64Array(0), [], generator) }).toThrow('target 0')
  expect(() => { fillDirichlet(new Float64Array(2), [1, 0], generator) }).toThrow('shape 0')
})
