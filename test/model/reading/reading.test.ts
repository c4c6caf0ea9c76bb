import { beforeAll, describe, expect, test } from 'vitest'
import { samplingVariance } from '../../../model/cells/sampling-variance.ts'
import { targetMix } from '../../../model/cells/target-mix.ts'
import { buildProblem } from '../../../model/fit/build-problem.ts'
import { localExecutor } from '../../../model/fit/executor.ts'
import { samplePosterior } from '../../../model/fit/posterior.ts'
import type { IntakeTables } from '../../../model/intake/intake-tables.ts'
import { createReading, type Reading } from '../../../model/reading/context.ts'
import { decompose, readDecomposition } from '../../../model/reading/decomposition.ts'
import { readLevels } from '../../../model/reading/levels.ts'
import { movementOf } from '../../../model/reading/movement.ts'
import { readOpinion } from '../../../model/reading/opinion.ts'
import { readVenues } from '../../../model/reading/venues.ts'
import { referenceTables } from '../../support/reference-cells.ts'
import { referencePosterior } from '../../support/reference-posterior.ts'

const tables = referenceTables()

async function readingOf(of: IntakeTables, given = {}): Promise<Reading> {
  const sampling = samplingVariance(of)
  const problem = buildProblem(of, sampling.variance)
  const posterior = await samplePosterior(problem, localExecutor(problem), { seed: 1, proposals: 4000, draws: 2000 })
  return createReading(of, of, targetMix(of, given), sampling, posterior, 0.9)
}

let reading: Reading
beforeAll(async () => { reading = await readingOf(tables) })

/** Pooled mean of a month, straight from the table. */
function rawOf(month: string): number {
  const { cells, timeline } = tables
  let mentions = 0
  let total = 0
  for (let c = 0; c < cells.count; c++) {
    if (timeline.periods[timeline.periodOf[cells.step[c]]].name !== month) continue
    mentions += cells.mentions[c]
    total += cells.mentions[c] * cells.mean[c]
  }
  return 100 * total / mentions
}

describe('decomposition of the change in the raw average', () => {
  test('the parts sum to the raw change in every draw, to 1e-9', () => {
    const { rawChange, columns } = decompose(reading)!
    for (let i = 0; i < reading.columns.count; i++) {
      expect(Math.abs(columns.reduce((total, { column }) => total + column[i], 0) - rawChange)).toBeLessThan(1e-9)
    }
    expect(100 * rawChange).toBeCloseTo(rawOf('2025-08') - rawOf('2025-07'), 9)
  })

  test('every part that the model has is there, once', () => {
    expect(readDecomposition(reading, 0.9)!.parts.map(({ part }) => part)).toEqual(['opinion', 'timing', 'venue_mix', 'venue_drift', 'topic_mix', 'poster_mix', 'unexplained'])
  })

  test('levels of a mix add up to its part, and the leading one is told', () => {
    const { parts } = readDecomposition(reading, 0.9)!
    const { columns, mix, centre, tables: { factors } } = reading
    const topic = parts.find(({ part }) => part === 'topic_mix')!
    const level = factors[1].levels.findIndex(({ name }) => name === topic.leading!.level)
    const sharesOf = (month: string) => {
      const { cells, timeline } = tables
      const inMonth = Array.from({ length: cells.count }, (_, c) => c).filter((c) => timeline.periods[timeline.periodOf[cells.step[c]]].name === month)
      const all = inMonth.reduce((total, c) => total + cells.mentions[c], 0)
      return factors[1].levels.map((_, l) => inMonth.reduce((total, c) => total + (cells.levels[1][c] === l ? cells.mentions[c] : 0), 0) / all)
    }
    const [before, after] = [sharesOf('2025-07'), sharesOf('2025-08')]
    expect(topic.leading!.share_from).toBeCloseTo(before[level], 12)
    expect(topic.leading!.share_to).toBeCloseTo(after[level], 12)
    const own = factors[1].levels.map((_, l) => 100 * (after[l] - before[l]) * columns.offset[1][l].reduce((total, x, i) => total + (x - centre[1][i]) / columns.count, 0))
    expect(own.reduce((a, b) => a + b, 0)).toBeCloseTo(topic.estimate.mean, 9)
    expect(topic.leading!.estimate.mean).toBeCloseTo(own[level], 9)
    expect(Math.max(...own.map((x) => x * Math.sign(topic.estimate.mean)))).toBeCloseTo(own[level] * Math.sign(topic.estimate.mean), 9)
    expect(mix.shares[1].length).toBe(own.length)
  })

  test('the opinion part is the change of adjusted opinion', () => {
    const opinion = readDecomposition(reading, 0.9)!.parts[0].estimate
    const { change } = readOpinion(reading)
    expect(opinion.mean).toBeCloseTo(change!.mean, 9)
    expect(opinion.low).toBeCloseTo(change!.low, 9)
  })

  test('unexplained does not swallow a mix: where two months have the same mix, the mix parts are 0', async () => {
    const july = tables.timeline.periods.findIndex(({ name }) => name === '2025-07')
    const { cells, timeline } = tables
    // four of July's five weeks, and August is those four again
    const fifth = timeline.periodOf.lastIndexOf(july)
    const chosen = Array.from({ length: cells.count }, (_, c) => c).filter((c) => cells.step[c] < fifth)
    const again = chosen.filter((c) => timeline.periodOf[cells.step[c]] === july)
    const order = [...chosen.map((c) => ({ c, step: cells.step[c] })), ...again.map((c) => ({ c, step: cells.step[c] + 5 }))].sort((a, b) => a.step - b.step)
    const pick = (column: Float64Array) => Float64Array.from(order, ({ c }) => column[c])
    const copied: IntakeTables = {
      ...tables,
      cells: {
        ...cells, count: order.length, step: Int32Array.from(order, ({ step }) => step), levels: cells.levels.map((level) => Int32Array.from(order, ({ c }) => level[c])),
        mentions: pick(cells.mentions), authors: pick(cells.authors), mean: pick(cells.mean), squares: pick(cells.squares), freedom: pick(cells.freedom),
        clustering: pick(cells.clustering), deff: pick(cells.deff),
      },
    }
    const parts = new Map(readDecomposition(await readingOf(copied), 0.9)!.parts.map(({ part, estimate }) => [part, estimate]))
    for (const part of ['venue_mix', 'topic_mix', 'poster_mix']) expect(Math.abs(parts.get(part)!.mean)).toBeLessThan(1e-9)
  })
})

describe('opinion', () => {
  test('the raw average is the pooled mean, by step and by period', () => {
    const opinion = readOpinion(reading)
    expect(opinion.raw).toBeCloseTo(rawOf('2025-08'), 9)
    expect(opinion.raw_change).toBeCloseTo(rawOf('2025-08') - rawOf('2025-07'), 9)
    expect(opinion.series.find(({ step }) => step === '2025-06-23')).toMatchObject({ raw: null, mentions: 0 })
  })

  test('movement since the base has a tighter interval than the level', () => {
    const { period, since_base } = readOpinion(reading)
    expect(since_base.sd).toBeLessThan(period.sd)
  })

  test('change, level and movement since base are the reference’s', () => {
    const opinion = readOpinion(reading)
    const reference = referencePosterior.posterior.marginal
    for (const [found, name] of [[opinion.period, 'period.2025-08'], [opinion.change!, 'period_change.2025-08'], [opinion.since_base, 'since_base.last_period']] as const) {
      const [mean, sd] = reference[name]
      expect(Math.abs(found.mean / 100 - mean) / sd).toBeLessThan(0.1)
      expect(Math.abs(found.sd / 100 / sd - 1)).toBeLessThan(0.1)
    }
  })
})

describe('the target mix', () => {
  test('moves the level and no movement', async () => {
    const other = readOpinion(await readingOf(tables, { topic: { fares: 1, onboard: 0, punctuality: 0 } }))
    const own = readOpinion(reading)
    expect(other.change!.mean).toBeCloseTo(own.change!.mean, 9)
    expect(Math.abs(other.period.mean - own.period.mean)).toBeGreaterThan(1)
  })

  test('an offset is told against it: offsets average to 0 there', () => {
    const topics = readLevels(reading, 'topic')
    const average = topics.reduce((total, { offset }, i) => total + reading.mix.shares[1][i] * offset.mean, 0)
    expect(average).toBeCloseTo(0, 9)
  })
})

describe('venues', () => {
  test('drift is 0 at the first step and the level moves with it', () => {
    for (const venue of readVenues(reading)) {
      expect(venue.series[0].drift).toEqual({ mean: 0, low: 0, high: 0, sd: 0 })
      const last = venue.series.at(-1)!
      const opinion = readOpinion(reading).series
      expect(last.level.mean - venue.series[0].level.mean).toBeCloseTo(last.drift.mean + opinion.at(-1)!.adjusted.mean - opinion[0].adjusted.mean, 9)
    }
  })

  test('shares sum to 1', () => {
    expect(readVenues(reading).reduce((total, { share }) => total + share, 0)).toBeCloseTo(1, 12)
  })

  test('spread is the standard deviation of the scores: two cells pooled by hand', async () => {
    // scores -1, 1 in one cell and 0, 0 in another: mean 0, squares 2, over 3 degrees of freedom
    const { sumCells } = await import('../../../model/reading/cell-sums.ts')
    const two: IntakeTables = {
      ...tables,
      cells: { ...tables.cells, count: 2, mentions: Float64Array.of(2, 2), mean: Float64Array.of(0, 0), squares: Float64Array.of(2, 0), freedom: Float64Array.of(1, 1) },
    }
    expect(sumCells(two, () => true).spread).toBeCloseTo(Math.sqrt(2 / 3), 12)
  })
})

test('a movement is announced only where its interval leaves zero', () => {
  expect(movementOf({ mean: 1, low: 0.1, high: 2, sd: 0.5 })).toBe('up')
  expect(movementOf({ mean: -1, low: -2, high: -0.1, sd: 0.5 })).toBe('down')
  expect(movementOf({ mean: 1, low: -0.1, high: 2, sd: 0.5 })).toBe('not-established')
})
