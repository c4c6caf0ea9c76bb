import { describe, expect, test } from 'vitest'
import { fitGeneralisedPareto, generalisedParetoQuantile } from '../../../model/diagnostics/generalised-pareto.ts'

const sample = (k: number, sigma: number, n: number) =>
  Float64Array.from({ length: n }, (_, i) => generalisedParetoQuantile({ k, sigma }, (i + 0.5) / n))

describe.each([-0.3, 0.1, 0.5, 0.9])('true k %d', (k) => {
  test('is found from 5,000 quantiles, with its scale', () => {
    const fit = fitGeneralisedPareto(sample(k, 2, 5000))
    expect(Math.abs((fit?.k ?? Number.NaN) - k)).toBeLessThan(0.02)
    expect(Math.abs((fit?.sigma ?? Number.NaN) / 2 - 1)).toBeLessThan(0.03)
  })

  test('the quantile undoes the distribution function 1 - (1 + k x / sigma)^(-1 / k)', () => {
    for (const p of [0.01, 0.5, 0.99]) {
      expect(1 - (1 + (k * generalisedParetoQuantile({ k, sigma: 2 }, p)) / 2) ** (-1 / k)).toBeCloseTo(p, 12)
    }
  })
})

test('k near 0 is the exponential', () => {
  expect(generalisedParetoQuantile({ k: 0, sigma: 3 }, 0.5)).toBeCloseTo(generalisedParetoQuantile({ k: 1e-9, sigma: 3 }, 0.5), 7)
})

test('the unit of the exceedances changes the scale alone', () => {
  const [one, thousand] = [1, 1000].map((unit) => fitGeneralisedPareto(sample(0.4, 1, 50).map((x) => x * unit)))
  expect(thousand?.k).toBeCloseTo(one?.k ?? Number.NaN, 10)
  expect((thousand?.sigma ?? 0) / (one?.sigma ?? 1)).toBeCloseTo(1000, 6)
})

test('a short tail is drawn towards 0.5', () => {
  expect(fitGeneralisedPareto(sample(-0.3, 1, 10))?.k).toBeGreaterThan(0)
})

test('no scale in a tail that is flat or begins with zeros', () => {
  expect(fitGeneralisedPareto(new Float64Array(8).fill(2))).toBeNull()
  expect(fitGeneralisedPareto(Float64Array.of(0, 0, 0, 1, 2, 3))).toBeNull()
})
