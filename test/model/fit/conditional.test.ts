import { describe, expect, test } from 'vitest'
import { samplingVariance } from '../../../model/cells/sampling-variance.ts'
import { targetMix } from '../../../model/cells/target-mix.ts'
import { buildProblem } from '../../../model/fit/build-problem.ts'
import { createWorkspace, logEvidence } from '../../../model/fit/evidence.ts'
import { conditionalCovariance, conditionalMean, createStateWorkspace } from '../../../model/fit/states.ts'
import { referenceTables } from '../../support/reference-cells.ts'
import { referencePosterior, sigmasOf } from '../../support/reference-posterior.ts'
import { referenceFunctions } from '../../support/reference-quantities.ts'

// Source: test/reference/mix-model.json, `conditional`: exact by dense linear algebra in R 4.2.2, two routes that agree to 1e-11 (7e-9 for drift_only).
const tables = referenceTables()
const sampling = samplingVariance(tables)
const mix = targetMix(tables)
const problem = buildProblem(tables, sampling.variance)
const functions = referenceFunctions(problem, tables, mix)

test('intake figures: within-cell variances, sampling variances and target mix are the reference’s', () => {
  const { s2, sampling_variance_sum: sum, target_mix: shares } = referencePosterior.intake
  tables.factors[0].levels.forEach(({ name }, v) => { expect(sampling.withinCell[v]).toBeCloseTo(s2[name], 12) })
  expect(sampling.variance.reduce((a, b) => a + b, 0)).toBeCloseTo(sum, 10)
  tables.factors.forEach(({ name, levels }, f) => { levels.forEach((level, i) => { expect(mix.shares[f][i]).toBeCloseTo(shares[name][level.name], 12) }) })
})

describe.each(referencePosterior.conditional.map((setting) => [setting.name, setting] as const))('standard deviations fixed: %s', (name, setting) => {
  const tolerance = name === 'drift_only' ? 1e-6 : 1e-8
  const sigma = sigmasOf(setting, problem.scales)

  test('log marginal likelihood', () => {
    expect(Math.abs(logEvidence(problem, sigma, createWorkspace(problem)) - setting.log_marginal_likelihood)).toBeLessThan(tolerance)
  })

  test('means and standard deviations of every quantity', () => {
    const work = createStateWorkspace(problem)
    const mean = conditionalMean(problem, sigma, work)
    const names = [...functions.keys()]
    const covariance = conditionalCovariance(problem, sigma, [...functions.values()], work)
    let compared = 0
    names.forEach((quantity, i) => {
      const [expectedMean, expectedSd] = setting.quantities[quantity]
      const found = functions.get(quantity)!.reduce((total, weight, k) => total + weight * mean[k], 0)
      expect(Math.abs(found - expectedMean), `mean of ${quantity}`).toBeLessThan(tolerance)
      expect(Math.abs(Math.sqrt(covariance[i * names.length + i]) - expectedSd), `sd of ${quantity}`).toBeLessThan(tolerance)
      compared += 1
    })
    // all but the drifts at the first step, which are 0 exactly
    expect(compared).toBe(Object.keys(setting.quantities).length - 3)
  })
})

test('it can fail: another sampling variance of one cell moves the likelihood', () => {
  const variance = sampling.variance.slice()
  variance[0] *= 1.001
  const [setting] = referencePosterior.conditional
  const other = buildProblem(tables, variance)
  const found = logEvidence(other, sigmasOf(setting, other.scales), createWorkspace(other))
  expect(Math.abs(found - setting.log_marginal_likelihood)).toBeGreaterThan(1e-8)
})
