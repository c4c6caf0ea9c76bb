import { readFileSync } from 'node:fs'
import { describe, expect, test } from 'vitest'
import { createWorkspace, logEvidence } from '../../model/fit/evidence.ts'
import { localExecutor } from '../../model/fit/executor.ts'
import { samplePosterior } from '../../model/fit/posterior.ts'
import { conditionalCovariance, conditionalMean, createStateWorkspace } from '../../model/fit/states.ts'
import { mean, standardDeviation } from '../../model/statistics/moments.ts'
import { restrictedLogLikelihood } from '../../model/statistics/noisy-autoregression.ts'
import { weightedEstimate } from '../../model/statistics/weighted-estimate.ts'
import { maximise } from '../support/maximise.ts'
import { plainProblem } from '../support/plain-problem.ts'

// Data: annual flow of the Nile 1871-1970 (Cobb 1978), as in R datasets.
const rows = readFileSync(new URL('data/nile.csv', import.meta.url), 'utf8').trim().split('\n').slice(1)
const flow = rows.map((row) => Number(row.split(',').at(-1)))
const firstYear = 1871

/** A first level so vague that it is as good as diffuse; its own log scale is added back. */
const vague = 1e7
const nile = (values: readonly number[]) => plainProblem(values.map((value, step) => ({ step, value })), { steps: values.length, initialSd: vague })

/** Diffuse log-likelihood with all constants: -633.4646 at the maximum (-632.5456 where the diffuse observation is not charged its constant). */
function diffuse(values: readonly number[], eta2: number, eps2: number): number {
  const problem = nile(values)
  return logEvidence(problem, Float64Array.of(Math.sqrt(eta2), Math.sqrt(eps2)), createWorkspace(problem)) + Math.log(vague)
}

const maximum = (values: readonly number[]) => maximise((x) => diffuse(values, Math.exp(x[0]), Math.exp(x[1])), [Math.log(1400), Math.log(15000)], 1e-2).map(Math.exp)

describe('SS-01, maximum likelihood: Durbin and Koopman (2001; 2nd ed. 2012), section 2.10, Table 2.1', () => {
  const published = { level: 1469.1, observation: 15099, logLikelihood: -633.464563636245 }
  const [level, observation] = maximum(flow)

  test('variances within 0.1 %', () => {
    expect(Math.abs(level / published.level - 1)).toBeLessThan(1e-3)
    expect(Math.abs(observation / published.observation - 1)).toBeLessThan(1e-3)
  })

  test('log-likelihood, all constants kept', () => {
    expect(Math.abs(diffuse(flow, level, observation) - published.logLikelihood)).toBeLessThan(1e-4)
  })

  test('it can fail: without the first year the level variance differs', () => {
    expect(Math.abs(maximum(flow.slice(1))[0] / published.level - 1)).toBeGreaterThan(1e-3)
  })
})

// SS-02: the same book's Table 2.1; table values recalled from memory, the recomputation in R agrees to every printed digit.
test.each([
  [1, 8517.03767852173, -637.07895786633, -495.68], [0.036, 17136.5960864303, -633.922852033062, -492.53], [0.0745, 15687.6700202876, -633.498438476657, -492.1],
  [0.0974, 15096.3240338173, -633.464564091371, -492.07], [0.0973, 15098.6583362527, -633.464563638099, -492.07],
])('SS-02, concentrated log-likelihood at q = %s', (q, s2, withConstants, printed) => {
  const found = diffuse(flow, q * s2, s2)
  expect(Math.abs(found - withConstants)).toBeLessThan(1e-6)
  // of the waves' memory, too: a walk seen with error
  const walk = restrictedLogLikelihood(flow, flow.map(() => s2), { coefficient: 1, innovation: Math.sqrt(q * s2) })
  expect(Math.abs(walk - (flow.length / 2) * Math.log(2 * Math.PI) - withConstants)).toBeLessThan(1e-6)
  const concentrated = found + (flow.length / 2) * Math.log(2 * Math.PI) + (flow.length - 1) / 2
  expect(Math.abs(concentrated - printed)).toBeLessThan(0.01)
})

// SS-03: Durbin and Koopman (2012), sections 2.2-2.4; computed in R 4.2.2 by a filter and by inverting the precision matrix; statsmodels 0.13.5 agrees.
describe('SS-03, smoothed level at variances 15099 and 1469.1', () => {
  const years = [1871, 1872, 1898, 1899, 1912, 1920, 1945, 1970]
  const smoothedMean = [1111.6683191268, 1110.85766462181, 999.585218705268, 950.930086740026, 814.641278503084, 834.76325910375, 838.540536030631, 798.370292608364]
  const smoothedVariance = [4032.15794180848, 3242.93007322472, 2326.75695810271, 2326.75691724435, 2326.75686982876, 2326.75686981419, 2326.75717573052, 4032.15794180848]
  const problem = nile(flow)
  const sigma = Float64Array.of(Math.sqrt(1469.1), Math.sqrt(15099))
  const work = createStateWorkspace(problem)

  test('means', () => {
    const found = conditionalMean(problem, sigma, work)
    years.forEach((year, i) => { expect(Math.abs(found[year - firstYear] - smoothedMean[i])).toBeLessThan(1e-4) })
  })

  test('variances', () => {
    const picks = years.map((year) => Float64Array.from(flow, (_, t) => (t === year - firstYear ? 1 : 0)))
    const covariance = conditionalCovariance(problem, sigma, picks, work)
    years.forEach((_, i) => { expect(Math.abs(covariance[i * years.length + i] - smoothedVariance[i])).toBeLessThan(1e-3) })
  })
})

// SS-08: exact posterior by quadrature on a 321 x 601 grid in R 4.2.2 (no printed source). Tolerances: 1 % on means, 3 % on 5 % quantiles.
describe('SS-08, Bayesian local level: sigma_eps ~ half-normal(200), sigma_eta ~ half-normal(100), flat first level', () => {
  const years = [1871, 1872, 1898, 1899, 1912, 1920, 1945, 1970]
  const levelMean = [1110.90391988947, 1109.92099515217, 1000.05031318225, 943.493621838939, 807.682738616051, 833.526280867137, 839.833649896742, 793.16574452634]
  const levelSd = [65.6803304136213, 58.5250304637298, 51.1016767939484, 53.3982155426364, 56.7782595371488, 50.9126079315012, 50.6621872136946, 70.9460772346373]
  const problem = plainProblem(flow.map((value, step) => ({ step, value })), { steps: flow.length, initialSd: 1e5, priors: [100, 200] })
  const run = samplePosterior(problem, localExecutor(problem), { seed: 3, proposals: 8000, draws: 4000 })

  test('the two standard deviations', async () => {
    const { sigmas } = await run
    const of = (j: number) => weightedEstimate(Float64Array.from({ length: sigmas.count }, (_, i) => sigmas.values[2 * i + j]), sigmas.weights, 0.9)
    const expected = [[43.8879819901691, 21.2332217759643, 72.6101766443718], [122.093278018362, 101.451268891745, 142.847729253875]]
    expected.forEach(([centre, low, high], j) => {
      const found = of(j)
      expect(Math.abs(found.mean / centre - 1)).toBeLessThan(0.01)
      expect(Math.abs(found.low / low - 1)).toBeLessThan(0.03)
      expect(Math.abs(found.high / high - 1)).toBeLessThan(0.03)
    })
  })

  test('the level', async () => {
    const { draws } = await run
    years.forEach((year, i) => {
      const column = Float64Array.from({ length: draws.count }, (_, k) => draws.states[k * flow.length + year - firstYear])
      expect(Math.abs(mean(column) / levelMean[i] - 1)).toBeLessThan(0.01)
      // 4,000 draws tell a standard deviation to 1.1 %: four such errors
      expect(Math.abs(standardDeviation(column) / levelSd[i] - 1)).toBeLessThan(0.045)
    })
  })
})
