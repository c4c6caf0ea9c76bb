import { beforeAll, describe, expect, test } from 'vitest'
import { samplingVariance } from '../../../model/cells/sampling-variance.ts'
import { targetMix } from '../../../model/cells/target-mix.ts'
import { buildProblem } from '../../../model/fit/build-problem.ts'
import { localExecutor } from '../../../model/fit/executor.ts'
import { samplePosterior } from '../../../model/fit/posterior.ts'
import type { IntakeTables } from '../../../model/intake/intake-tables.ts'
import { createGenerator } from '../../../model/random/generator.ts'
import { createReading, type Reading } from '../../../model/reading/context.ts'
import { readDecomposition } from '../../../model/reading/decomposition.ts'
import { rawChangeChance } from '../../../model/reading/raw-chance.ts'
import { simulateCells } from '../../support/simulate-cells.ts'

async function readingOf(tables: IntakeTables): Promise<Reading> {
  const sampling = samplingVariance(tables)
  const problem = buildProblem(tables, sampling.variance)
  return createReading(tables, tables, targetMix(tables), sampling, await samplePosterior(problem, localExecutor(problem), { seed: 1, proposals: 1000, draws: 500 }), 0.9)
}

function simulated(mentionsPerStep: number): IntakeTables {
  const sigmas = { mu: 0.01, venueDrift: [0.005, 0.005], venue: 0.1, topic: 0.1, poster: 0.1, tau: 0.001 }
  return simulateCells({ steps: 40, venues: 2, topics: 2, posters: 2, mentionsPerStep, sigmas }, createGenerator(7, 0)).tables
}

/** The scores of the period under review moved by so much, each cell alike. */
function moved(tables: IntakeTables, by: number): IntakeTables {
  const { cells, timeline } = tables
  return { ...tables, cells: { ...cells, mean: cells.mean.map((y, c) => (timeline.periodOf[cells.step[c]] === timeline.current ? y + by : y)) } }
}

const mentionsIn = ({ cells, timeline }: IntakeTables, period: number) => cells.mentions.reduce((sum, n, c) => sum + (timeline.periodOf[cells.step[c]] === period ? n : 0), 0)

describe('the standard error of the raw change', () => {
  let few: Reading
  let many: Reading
  beforeAll(async () => { [few, many] = await Promise.all([readingOf(simulated(20)), readingOf(simulated(2000))]) })

  test('one variance for all, each author once: 100 sqrt(s2 / n + s2 / n)', () => {
    for (const { tables } of [few, many]) {
      const flat: SamplingOnly = { withinCell: 0.3, variance: tables.cells.mentions.map((n) => 0.3 / n) }
      const reading = { ...few, tables, fitted: tables, sampling: { ...few.sampling, variance: flat.variance } }
      const { current } = tables.timeline
      expect(rawChangeChance(reading)).toBeCloseTo(100 * Math.sqrt(flat.withinCell / mentionsIn(tables, current - 1) + flat.withinCell / mentionsIn(tables, current)), 9)
    }
  })

  test('a hundred times the mentions: a tenth of it', () => {
    expect(rawChangeChance(few)! / rawChangeChance(many)!).toBeGreaterThan(8)
    expect(rawChangeChance(few)! / rawChangeChance(many)!).toBeLessThan(12)
  })

  test('where an audit undoes the coder, it is that of the scores as coded', () => {
    const corrected = { ...many, fitted: simulated(2000), sampling: { ...many.sampling, variance: many.sampling.variance.map((v) => 4 * v) } }
    expect(rawChangeChance(corrected)).toBeCloseTo(rawChangeChance(many)!, 9)
  })

  test('none where a period holds no mention', () => {
    expect(rawChangeChance({ ...few, previousSteps: null })).toBeNull()
    const { cells, timeline } = few.tables
    const empty = { ...few.tables, cells: { ...cells, step: cells.step.map((t) => (timeline.periodOf[t] === timeline.current ? 0 : t)) } }
    expect(rawChangeChance({ ...few, tables: empty, fitted: empty })).toBeNull()
  })
})

interface SamplingOnly { readonly withinCell: number; readonly variance: Float64Array }

describe('what is given as the reason', () => {
  /** The decomposition where all cells of the period lie off the model by so many points: the fit stays the unmoved one. */
  async function withUnexplained(mentionsPerStep: number, by: number) {
    const reading = await readingOf(simulated(mentionsPerStep))
    const tables = moved(reading.tables, by)
    return readDecomposition({ ...reading, tables, fitted: tables }, 0.9)!
  }
  const unexplainedOf = ({ parts }: Awaited<ReturnType<typeof withUnexplained>>) => parts.find(({ part }) => part === 'unexplained')!

  test('on much data what the model does not explain is one', async () => {
    const found = await withUnexplained(2000, 0.07)
    expect(unexplainedOf(found).movement).toBe('up')
    expect(found).toMatchObject({ largest: 'unexplained', raw_movement: 'up' })
  })

  test('on thin data the same is chance: neither it nor a smaller part is named', async () => {
    const found = await withUnexplained(20, 0.12)
    expect(unexplainedOf(found).movement).toBe('up')
    expect(Math.abs(unexplainedOf(found).estimate.mean)).toBeLessThan(1.645 * found.chance_sd)
    expect(found.largest).toBeNull()
    expect(found.raw_movement).toBe('not-established')
  })
})
