import { afterAll, expect, test } from 'vitest'
import { samplingVariance } from '../../../model/cells/sampling-variance.ts'
import { buildProblem } from '../../../model/fit/build-problem.ts'
import { localExecutor } from '../../../model/fit/executor.ts'
import { createGenerator } from '../../../model/random/generator.ts'
import { startFitThreads, type FitThreads } from '../../../generator/threads/fit-threads.ts'
import { referenceTables } from '../../support/reference-cells.ts'

const tables = referenceTables()
const problem = buildProblem(tables, samplingVariance(tables).variance)
const rows = 301
const generator = createGenerator(1, 0)
const sigmas = Float64Array.from({ length: rows * problem.scales.length }, (_, i) => problem.scales[i % problem.scales.length].prior * (0.05 + generator.uniform()))

const started: FitThreads[] = []
afterAll(async () => { await Promise.all(started.map((threads) => threads.close())) })

test.each([1, 2, 3])('with %i threads every row is the same to the last bit', async (threads) => {
  const local = localExecutor(problem)
  const shared = startFitThreads(problem, threads)
  started.push(shared)
  expect(await shared.executor.evidence(sigmas)).toEqual(await local.evidence(sigmas))
  expect(await shared.executor.states(sigmas, 7, 16)).toEqual(await local.states(sigmas, 7, 16))
})

test('it can fail: another first stream draws other states', async () => {
  const local = localExecutor(problem)
  expect(await local.states(sigmas, 7, 17)).not.toEqual(await local.states(sigmas, 7, 16))
})
