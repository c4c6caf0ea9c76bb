import { expect, test } from 'vitest'
import { paretoSmooth } from '../../model/diagnostics/pareto-k.ts'

// LOO-02. Vehtari et al. (2024), Pareto smoothed importance sampling, JMLR 25(72); Zhang and Stephens (2009), Technometrics
// 51:316-325. Computed by the R package loo 2.5.1, with its weakly informative prior of k: (M k + 5) / (M + 10). Tolerance 1e-6.
// Log ratios r_i = log(1 + ((1 - u_i)^-k - 1) / k), u_i = (i - 0.5) / 200: quantiles of a generalised Pareto distribution.
const published = [
  { k: 0.2, paretoK: 0.275774192645283, size: 134.509911613372, last: [0.0154087402452186, 0.0168388397348539, 0.0189155013034194, 0.0224606272707673, 0.0278804567708338] },
  { k: 0.5, paretoK: 0.495277070549711, size: 76.8582298948481, last: [0.0211488383240418, 0.0242013942344671, 0.0289310861586009, 0.0378013547381152, 0.0664950900461445] },
  { k: 0.8, paretoK: 0.714565726952414, size: 31.5039612228317, last: [0.0278141098705474, 0.0335104087926324, 0.042929114296704, 0.0623446447812031, 0.138051952509077] },
]
const logRatios = (k: number) => Float64Array.from({ length: 200 }, (_, i) => Math.log(1 + ((1 - (i + 0.5) / 200) ** -k - 1) / k))

test.each(published)('LOO-02: true k $k', ({ k, paretoK, size, last }) => {
  const smoothed = paretoSmooth(logRatios(k))
  expect(smoothed.tail).toBe(40)
  expect(Math.abs((smoothed.paretoK.value ?? Number.NaN) - paretoK)).toBeLessThan(1e-6)
  expect(Math.abs(smoothed.effectiveSize - size)).toBeLessThan(1e-6)
  last.forEach((expected, i) => { expect(Math.abs(smoothed.weights[195 + i] - expected)).toBeLessThan(1e-6) })
})

test('LOO-02 can fail: with another relative efficiency the tail, and so k, is another', () => {
  expect(Math.abs((paretoSmooth(logRatios(0.5), 2).paretoK.value ?? 0) - published[1].paretoK)).toBeGreaterThan(1e-3)
})
