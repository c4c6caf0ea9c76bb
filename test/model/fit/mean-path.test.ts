import { expect, test } from 'vitest'
import { samplingVariance } from '../../../model/cells/sampling-variance.ts'
import { buildProblem } from '../../../model/fit/build-problem.ts'
import { localExecutor } from '../../../model/fit/executor.ts'
import { meanPath } from '../../../model/fit/mean-path.ts'
import { samplePosterior } from '../../../model/fit/posterior.ts'
import { stateWidth } from '../../../model/fit/states.ts'
import { referenceTables } from '../../support/reference-cells.ts'

const tables = referenceTables()
const problem = buildProblem(tables, samplingVariance(tables).variance)

test('the mean path is the mean of the joint draws, within a tenth of a posterior standard deviation at every step', async () => {
  const path = await meanPath(problem, 1)
  const { draws } = await samplePosterior(problem, localExecutor(problem), { seed: 2, proposals: 2500, draws: 4000 })
  const width = stateWidth(problem)
  for (let t = 0; t < problem.steps; t++) {
    const at = Float64Array.from({ length: draws.count }, (_, i) => draws.states[i * width + t * (1 + problem.walks)])
    const mean = at.reduce((a, b) => a + b, 0) / at.length
    const sd = Math.sqrt(at.reduce((sum, x) => sum + (x - mean) ** 2, 0) / at.length)
    expect(Math.abs(path[t] - mean) / sd).toBeLessThan(0.1)
  }
})

test('the same seed gives the same path to the last bit, another seed another', async () => {
  expect(await meanPath(problem, 1)).toEqual(await meanPath(problem, 1))
  expect(await meanPath(problem, 2)).not.toEqual(await meanPath(problem, 1))
})
