import { describe, expect, test } from 'vitest'
import { createWorkspace, logEvidence } from '../../model/fit/evidence.ts'
import { conditionalCovariance, conditionalMean, createStateWorkspace } from '../../model/fit/states.ts'
import { maximise } from '../support/maximise.ts'
import { plainProblem, type PlainObservation } from '../support/plain-problem.ts'

// LMM-05. Source: Davies (1947) dyestuff data; Box and Tiao (1973), Bayesian Inference in Statistical Analysis; closed form and R lme4 1.1.31 agree,
// published figures (42.001, 49.510; 37.260; criterion 319.65) recalled from memory.
const dyestuff = [
  1545, 1440, 1440, 1520, 1580, 1540, 1555, 1490, 1560, 1495, 1595, 1550, 1605, 1510, 1560, 1445, 1440, 1595, 1465, 1545, 1595, 1630, 1515, 1635, 1625,
  1520, 1455, 1450, 1480, 1445,
]
const batches = 6
const grandMean = 1527.5
/** With one step nothing moves: this standard deviation plays no part. */
const unused = 1

function batchProblem(initialSd: number) {
  return plainProblem(dyestuff.map((value, i): PlainObservation => ({ step: 0, value: value - grandMean, group: Math.floor(i / 5) })), { steps: 1, groups: batches, initialSd })
}

describe('LMM-05, one-way random effects (dyestuff)', () => {
  const vague = 1e6
  const restricted = batchProblem(vague)
  const restrictedLog = (batch: number, residual: number) => logEvidence(restricted, Float64Array.of(unused, batch, residual), createWorkspace(restricted)) + Math.log(vague)
  const [batch, residual] = maximise((x) => restrictedLog(Math.exp(x[0]), Math.exp(x[1])), [Math.log(40), Math.log(50)]).map(Math.exp)

  test('restricted maximum likelihood is the likelihood under a diffuse mean', () => {
    expect(Math.abs(batch / 42.0005946299558 - 1)).toBeLessThan(1e-4)
    expect(Math.abs(residual / 49.5101000907292 - 1)).toBeLessThan(1e-4)
    // the criterion counts n - 1 constants, a diffuse mean n
    expect(Math.abs(-2 * restrictedLog(batch, residual) - Math.log(2 * Math.PI) - 319.654276842257)).toBeLessThan(1e-3)
  })

  test('maximum likelihood, at the mean held fixed', () => {
    const fixed = batchProblem(1e-4)
    const log = (b: number, r: number) => logEvidence(fixed, Float64Array.of(unused, b, r), createWorkspace(fixed))
    const [ml, mlResidual] = maximise((x) => log(Math.exp(x[0]), Math.exp(x[1])), [Math.log(40), Math.log(50)]).map(Math.exp)
    expect(Math.abs(ml / 37.2603461563896 - 1)).toBeLessThan(1e-4)
    expect(Math.abs(mlResidual / 49.510099786844 - 1)).toBeLessThan(1e-4)
    expect(Math.abs(log(ml, mlResidual) + 163.663529940568)).toBeLessThan(1e-3)
  })

  test('shrunken batch effects', () => {
    const published = [-17.6068512234638, 0.391263360522021, 28.5622253180653, -23.0845382707638, 56.7331872756084, -44.9952864599641]
    const effects = conditionalMean(restricted, Float64Array.of(unused, Math.sqrt(1764.05), Math.sqrt(2451.25)), createStateWorkspace(restricted)).slice(1)
    published.forEach((value, i) => { expect(Math.abs(effects[i] - value)).toBeLessThan(1e-4 * Math.abs(value) + 1e-5) })
  })

  test('it can fail: with one batch left out the batch variance differs', () => {
    const less = plainProblem(dyestuff.slice(5).map((value, i): PlainObservation => ({ step: 0, value: value - grandMean, group: Math.floor(i / 5) })), { steps: 1, groups: 5, initialSd: vague })
    const log = (x: readonly number[]) => logEvidence(less, Float64Array.of(unused, Math.exp(x[0]), Math.exp(x[1])), createWorkspace(less))
    expect(Math.abs(Math.exp(maximise(log, [Math.log(40), Math.log(50)])[0]) / 42.0005946299558 - 1)).toBeGreaterThan(1e-4)
  })
})

// SS-09. Source: linear-Gaussian conditioning, computed in R 4.2.2 in precision and in covariance form (no printed source). Tolerance 1e-8.
describe('SS-09, multilevel state space: weekly level, three venues’ biases, two survey waves', () => {
  const weekly = [[52, 54, 53, 57, 58, 60, 59, 62], [41, 40, 43, 44, 47, 45, 48, 50], [null, 61, 60, 63, null, 66, 67, 69]]
  const survey = [null, null, 49, null, null, null, null, 55]
  const venueSd = [3, 4, 5]
  const centre = 50
  const observations: PlainObservation[] = [
    ...weekly.flatMap((series, group) => series.flatMap((value, step) => (value === null ? [] : [{ step, value: value - centre, variance: venueSd[group] ** 2, group }]))),
    ...survey.flatMap((value, step) => (value === null ? [] : [{ step, value: value - centre, variance: 4 }])),
  ]
  const problem = plainProblem(observations, { steps: 8, groups: 3, initialSd: 20 })
  const sigma = Float64Array.of(1.5, 8, 1e-9)
  const published = {
    mean: [48.36104938409, 48.82864515726, 49.539349132058, 51.056252293155, 52.394407335571, 53.441157698168, 54.294780102367, 55.103671816186, 5.156936608816, -6.669007626528, 11.53817409108],
    sd: [2.118942585457, 1.859421356526, 1.563785794576, 1.806261098608, 1.900924810879, 1.875425983728, 1.782546251279, 1.57739738919, 1.790473373354, 1.996072113605, 2.39597352026],
    lastLevelWithBias: [-1.650971645846, -1.629083764178, -1.621267382161],
    logLikelihood: -66.945806423468,
  }

  test('log-likelihood', () => {
    expect(Math.abs(logEvidence(problem, sigma, createWorkspace(problem)) - published.logLikelihood)).toBeLessThan(1e-8)
  })

  test('means, standard deviations, covariances', () => {
    const work = createStateWorkspace(problem)
    const found = conditionalMean(problem, sigma, work)
    const each = published.mean.map((_, i) => Float64Array.from(published.mean, (__, k) => (k === i ? 1 : 0)))
    const covariance = conditionalCovariance(problem, sigma, each, work)
    const n = each.length
    published.mean.forEach((value, i) => {
      expect(Math.abs(found[i] + (i < 8 ? centre : 0) - value)).toBeLessThan(1e-8)
      expect(Math.abs(Math.sqrt(covariance[i * n + i]) - published.sd[i])).toBeLessThan(1e-8)
    })
    published.lastLevelWithBias.forEach((value, v) => { expect(Math.abs(covariance[7 * n + 8 + v] - value)).toBeLessThan(1e-8) })
  })

  test('it can fail: without the survey the level is elsewhere', () => {
    const posts = plainProblem(observations.filter(({ group }) => group !== undefined), { steps: 8, groups: 3, initialSd: 20 })
    const found = conditionalMean(posts, sigma, createStateWorkspace(posts))
    expect(Math.abs(found[0] + centre - published.mean[0])).toBeGreaterThan(1e-8)
  })
})
