import { mkdtemp, rm } from 'node:fs/promises'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { afterAll, beforeAll, describe, expect, test } from 'vitest'
import { readAccount } from '../../generator/account/read-account.ts'
import { readIntake } from '../../generator/intake/read-intake.ts'
import { samplingVariance } from '../../model/cells/sampling-variance.ts'
import { targetMix } from '../../model/cells/target-mix.ts'
import { buildProblem } from '../../model/fit/build-problem.ts'
import { localExecutor } from '../../model/fit/executor.ts'
import { samplePosterior } from '../../model/fit/posterior.ts'
import type { IntakeTables } from '../../model/intake/intake-tables.ts'
import { createReading, type Reading } from '../../model/reading/context.ts'
import { average, difference, sum } from '../../model/reading/draw-columns.ts'
import type { Analysis } from '../../model/analyse.ts'
import { estimateOf } from '../../model/statistics/estimate.ts'
import { analyseHere } from '../support/analyse-reference.ts'
import { pairedDifference, writeMoviesAccount } from './movies-account.ts'

// The main job on data that no one here made: `movies.json` of vega-datasets (BSD-3). Critics and audience are two venues, genres are topics.
let folder: string
let tables: IntakeTables
let analysis: Analysis
let reading: Reading

beforeAll(async () => {
  folder = await mkdtemp(join(tmpdir(), 'movies-'))
  await writeMoviesAccount(folder)
  tables = await readIntake(await readAccount(folder))
  analysis = await analyseHere(tables)
  const sampling = samplingVariance(tables)
  const problem = buildProblem(tables, sampling.variance)
  const posterior = await samplePosterior(problem, localExecutor(problem), { seed: 1, proposals: 4000, draws: 2000 })
  reading = createReading(tables, tables, targetMix(tables), sampling, posterior, 0.9)
})
afterAll(() => rm(folder, { recursive: true, force: true }))

/** Critics less audience at every step, by draw. */
function contrast(): Float64Array[] {
  const venues = tables.factors[0].levels.map(({ name }) => name)
  const [critics, audience] = [venues.indexOf('critics'), venues.indexOf('audience')]
  const { drift, offset } = reading.columns
  return tables.timeline.steps.map((_, t) => difference(sum(offset[0][critics], drift[critics][t]), sum(offset[0][audience], drift[audience][t])))
}

describe('critics against audience', () => {
  test('the fitted contrast, averaged over the years, holds the paired difference within its interval', () => {
    const found = estimateOf(average(contrast()), 0.9)
    const paired = pairedDifference()
    expect(paired.mean).toBeCloseTo(-0.178, 3)
    expect(found.low).toBeLessThan(paired.mean)
    expect(found.high).toBeGreaterThan(paired.mean)
    // and says something: the interval is a few hundredths wide, and far from 0
    expect(found.high - found.low).toBeLessThan(0.08)
    expect(found.high).toBeLessThan(-0.1)
  })

  test('the drift has the sign of the paired difference’s: critics grew harsher against the audience', () => {
    const steps = contrast()
    const early = average(steps.filter((_, t) => tables.timeline.steps[t] < '2000'))
    const late = average(steps.filter((_, t) => tables.timeline.steps[t] >= '2006'))
    const moved = difference(late, early)
    // the sign, in the mean and in most draws: the fit itself gives it a probability of about 0.86
    expect(estimateOf(moved, 0.9).mean).toBeLessThan(0)
    expect(moved.filter((x) => x < 0).length / moved.length).toBeGreaterThan(0.5)
  })

  test('it can fail: the venues taken the other way round', () => {
    expect(-estimateOf(average(contrast()), 0.9).low).toBeGreaterThan(pairedDifference().mean + 0.1)
  })
})

describe('what the data lack shows as caveats', () => {
  test('no authors at all, volumes that go up and down, genres that the base does not know', () => {
    expect(analysis.caveats.map(({ code }) => code)).toEqual(expect.arrayContaining(['authors-unknown', 'uneven-volume', 'thin-data', 'level-unseen-in-base']))
  })

  test('months, quarters, and no crash on an uneven history', () => {
    expect(analysis.grid).toBe('month')
    expect(analysis.period.name).toMatch(/^2009-Q\d$/)
    expect(tables.timeline.steps.length).toBe(144)
    expect(analysis.diagnostics.converged).toBe(true)
  })
})
