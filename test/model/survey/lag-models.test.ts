import { describe, expect, test } from 'vitest'
import { createGenerator } from '../../../model/random/generator.ts'
import { fitLagModels, forecastFrom, lagWeightsOf } from '../../../model/survey/lag-models.ts'
import { forecastEstimate } from '../../../model/survey/forecast-estimate.ts'

/** Waves that follow x at lag 2: y[w] = 10 + 3 x[w - 2] + noise. */
function pairsOf(waves: number, noise: number, seed: number, lags: readonly number[]) {
  const generator = createGenerator(seed, 0)
  let at = 0
  const x = Float64Array.from({ length: waves + 4 }, () => (at += generator.normal()))
  const y = Float64Array.from({ length: waves }, (_, w) => 10 + 3 * x[w + 2] + noise * generator.normal())
  return { x, y, pairs: lags.map((lag) => ({ lag, x: x.slice(4 - lag, 4 - lag + waves), y })) }
}

describe('the lags weighed', () => {
  test('the true one has most of the weight, and weights sum to 1', () => {
    const weights = lagWeightsOf(fitLagModels(pairsOf(30, 0.5, 1, [0, 1, 2, 3, 4]).pairs))
    expect(weights.reduce((sum, { weight }) => sum + weight, 0)).toBeCloseTo(1, 12)
    expect(weights.find(({ lag }) => lag === 2)!.weight).toBeGreaterThan(0.95)
  })
  test('without any relation no lag stands out', () => {
    const generator = createGenerator(4, 0)
    const { pairs } = pairsOf(30, 0, 2, [0, 1, 2, 3, 4])
    const y = Float64Array.from({ length: 30 }, () => generator.normal())
    const weights = lagWeightsOf(fitLagModels(pairs.map(({ lag, x }) => ({ lag, x, y }))))
    expect(Math.max(...weights.map(({ weight }) => weight))).toBeLessThan(0.6)
  })
  test('no scale of either series matters', () => {
    const { pairs } = pairsOf(12, 1, 3, [0, 1, 2])
    const scaled = pairs.map(({ lag, x, y }) => ({ lag, x: x.map((value) => 0.01 * value - 5), y: y.map((value) => 100 * value + 7) }))
    const [plain, other] = [lagWeightsOf(fitLagModels(pairs)), lagWeightsOf(fitLagModels(scaled))]
    plain.forEach(({ weight }, i) => { expect(other[i].weight).toBeCloseTo(weight, 8) })
  })
  test('lags with too few pairs, or partners that do not vary, are left out', () => {
    const y = Float64Array.of(1, 2, 3, 4, 5)
    expect(fitLagModels([{ lag: 0, x: new Float64Array(5).fill(2), y }, { lag: 1, x: Float64Array.of(1, 2, 3, 4), y: y.slice(1) }])).toEqual([])
  })
})

describe('against the regression written down', () => {
  // Of one lag, white errors: posterior moments of the g-prior are those of least squares, shrunk (Liang and others 2008, section 2.1).
  const x = Float64Array.of(1, 2, 4, 3, 6, 5)
  const y = Float64Array.of(2, 3, 9, 5, 11, 12)
  const model = fitLagModels([{ lag: 0, x, y }]).find(({ rho }) => rho === 0)!
  test('slope, intercept and variance', () => {
    const n = 6
    const [mx, my] = [21 / 6, 42 / 6]
    const sxx = x.reduce((sum, value) => sum + (value - mx) ** 2, 0)
    const syy = y.reduce((sum, value) => sum + (value - my) ** 2, 0)
    const sxy = x.reduce((sum, value, i) => sum + (value - mx) * (y[i] - my), 0)
    expect(model.slope).toBeCloseTo(n / (n + 1) * sxy / sxx, 12)
    expect(model.constant - model.slope * model.constantPerSlope).toBeCloseTo(my - model.slope * mx, 12)
    expect(model.variance).toBeCloseTo((syy - n / (n + 1) * sxy ** 2 / sxx) / (n - 1), 12)
  })
  test('the weight of white errors against those of rho 0.5, by the integral done on a grid', () => {
    // p(y | rho) up to what all rho share: over a, b and log s2, with |W| = sqrt(1 - rho^2)
    const evidence = (rho: number): number => {
      const white = (values: Float64Array) => values.map((value, i) => (i === 0 ? Math.sqrt(1 - rho * rho) * value : value - rho * values[i - 1]))
      const [u, v, w] = [white(new Float64Array(6).fill(1)), white(x), white(y)]
      const uv = dot(u, v) / dot(u, u)
      const beside = v.map((value, i) => value - uv * u[i])
      const priorPrecision = dot(beside, beside) / 6
      let sum = 0
      const step = 0.05
      for (let logS = -6; logS < 9; logS += step) {
        const s2 = Math.exp(logS)
        for (let b = -1; b < 5; b += step) {
          for (let a = -14; a < 16; a += 2 * step) {
            let squares = 0
            for (let i = 0; i < 6; i++) squares += (w[i] - a * u[i] - b * v[i]) ** 2
            sum += Math.exp(-0.5 * squares / s2 - 3 * logS - 0.5 * priorPrecision * b * b / s2 - 0.5 * logS)
          }
        }
      }
      return Math.sqrt(1 - rho * rho) * Math.sqrt(priorPrecision) * sum
    }
    const models = fitLagModels([{ lag: 0, x, y }])
    const weightAt = (rho: number) => models.find((candidate) => candidate.rho === rho)!.weight
    expect(weightAt(0.5) / weightAt(0) / (evidence(0.5) / evidence(0))).toBeCloseTo(1, 2)
  })
})

describe('forecasts', () => {
  test('their 90 % intervals hold about 90 % of waves of the law they assume', () => {
    let inside = 0
    const runs = 400
    for (let run = 0; run < runs; run++) {
      const { x, pairs, y } = pairsOf(13, 2, 100 + run, [1, 2, 3])
      const known = pairs.map(({ lag, x: partners }) => ({ lag, x: partners.slice(0, 12), y: y.slice(0, 12) }))
      const { low, high } = forecastEstimate(forecastFrom(fitLagModels(known), (lag) => x[4 - lag + 12]), 0.9, [-Infinity, Infinity])
      if (y[12] >= low && y[12] <= high) inside++
    }
    expect(inside / runs).toBeGreaterThan(0.86)
    expect(inside / runs).toBeLessThan(0.95)
  })
  test('a survey with a long memory of its own is forecast from where it stands', () => {
    const generator = createGenerator(9, 0)
    let own = 0
    const y = Float64Array.from({ length: 40 }, () => (own = 0.95 * own + generator.normal()))
    const x = Float64Array.from({ length: 40 }, () => generator.normal())
    const { mean } = forecastEstimate(forecastFrom(fitLagModels([{ lag: 1, x, y }]), () => 0), 0.9, [-Infinity, Infinity])
    expect(Math.abs(mean - y[39])).toBeLessThan(0.4 * Math.abs(y[39] - y.reduce((sum, value) => sum + value, 0) / 40))
  })
  test('a lag without a partner is left out', () => {
    const { pairs } = pairsOf(12, 1, 3, [1, 2])
    const components = forecastFrom(fitLagModels(pairs), (lag) => (lag === 1 ? 0 : null))
    expect(components.reduce((sum, { weight }) => sum + weight, 0)).toBeCloseTo(1, 12)
    expect(forecastFrom(fitLagModels(pairs), () => null)).toEqual([])
  })
})

function dot(a: Float64Array, b: Float64Array): number {
  return a.reduce((sum, value, i) => sum + value * b[i], 0)
}
