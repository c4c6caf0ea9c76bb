import { beforeAll, describe, expect, test } from 'vitest'
import { samplingVariance } from '../../../model/cells/sampling-variance.ts'
import { targetMix } from '../../../model/cells/target-mix.ts'
import { buildProblem } from '../../../model/fit/build-problem.ts'
import { effortFor } from '../../../model/fit/effort.ts'
import { localExecutor } from '../../../model/fit/executor.ts'
import { samplePosterior, type Posterior } from '../../../model/fit/posterior.ts'
import { stateWidth } from '../../../model/fit/states.ts'
import { mean, standardDeviation } from '../../../model/statistics/moments.ts'
import { weightedEstimate } from '../../../model/statistics/weighted-estimate.ts'
import { referenceTables } from '../../support/reference-cells.ts'
import { referencePosterior } from '../../support/reference-posterior.ts'
import { referenceFunctions } from '../../support/reference-quantities.ts'

// Source: test/reference/mix-model.json, `posterior`: JAGS 4.3.1 (2 x 80,000 iterations) and a slice sampler with the states integrated out (2 x 8,000 sweeps).
// Bounds: every mean within 0.1 posterior standard deviations, every standard deviation within 10 percent.
const tables = referenceTables()
const problem = buildProblem(tables, samplingVariance(tables).variance)
const functions = referenceFunctions(problem, tables, targetMix(tables))
const width = stateWidth(problem)

let posterior: Posterior
beforeAll(async () => { posterior = await samplePosterior(problem, localExecutor(problem), { seed: 1, ...effortFor(problem) }) })

function columnOf(weights: Float64Array): Float64Array {
  const { count, states } = posterior.draws
  return Float64Array.from({ length: count }, (_, i) => weights.reduce((total, weight, k) => total + weight * states[i * width + k], 0))
}

describe.each(['marginal', 'jags'] as const)('against the long run `%s`', (run) => {
  const reference = referencePosterior.posterior[run]

  test('every linear quantity of the states', () => {
    const quantities = [...functions].filter(([name]) => name in reference)
    expect(quantities.length).toBeGreaterThan(150)
    for (const [name, weights] of quantities) {
      const column = columnOf(weights)
      const [expectedMean, expectedSd] = reference[name]
      expect(Math.abs(mean(column) - expectedMean) / expectedSd, `mean of ${name}, in posterior sds`).toBeLessThan(0.1)
      expect(Math.abs(standardDeviation(column) / expectedSd - 1), `sd of ${name}`).toBeLessThan(0.1)
    }
  })

  test('every standard deviation of the model', () => {
    const d = problem.scales.length
    problem.scales.forEach(({ name }, j) => {
      const values = Float64Array.from({ length: posterior.sigmas.count }, (_, i) => posterior.sigmas.values[i * d + j])
      const found = weightedEstimate(values, posterior.sigmas.weights, 0.9)
      const [expectedMean, expectedSd] = reference[`sigma.${name}`]
      expect(Math.abs(found.mean - expectedMean) / expectedSd, `mean of ${name}`).toBeLessThan(0.1)
      expect(Math.abs(found.sd / expectedSd - 1), `sd of ${name}`).toBeLessThan(0.1)
    })
  })
})

test('the draws are worth at least 1,000 independent ones, and the weights can be trusted', () => {
  expect(posterior.effective).toBeGreaterThan(1000)
  expect(posterior.paretoK).toBeLessThan(0.7)
})

test('it can fail: a fit that knows no drift is not within the bounds', async () => {
  const anchored = { ...tables, factors: tables.factors.map((factor, f) => (f === 0 ? { ...factor, levels: factor.levels.map((level) => ({ ...level, anchor: true })) } : factor)) }
  const still = buildProblem(anchored, samplingVariance(tables).variance)
  const other = await samplePosterior(still, localExecutor(still), { seed: 1, proposals: 4000, draws: 2000 })
  const step = tables.timeline.steps.length - 1
  const block = 1 + still.walks
  const change = Float64Array.from({ length: 2000 }, (_, i) => other.draws.states[i * stateWidth(still) + step * block] - other.draws.states[i * stateWidth(still)])
  const [, expectedSd] = referencePosterior.posterior.marginal['change.last_step_minus_first']
  expect(Math.abs(standardDeviation(change) / expectedSd - 1)).toBeGreaterThan(0.1)
})
