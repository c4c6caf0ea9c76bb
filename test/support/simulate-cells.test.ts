import { describe, expect, test } from 'vitest'
import { createGenerator } from '../../model/random/generator.ts'
import { samplingVariance } from '../../model/cells/sampling-variance.ts'
import { targetMix } from '../../model/cells/target-mix.ts'
import { simulateCells } from './simulate-cells.ts'
import type { Simulation, SimulationOptions } from './simulate-cells.ts'
import { drawSigmas } from './simulated-states.ts'

const sigmas = { mu: 0.02, venueDrift: [0.01, 0.02, 0], venue: 0.2, topic: 0.15, poster: 0.1, tau: 0.05 }
const options: SimulationOptions = { steps: 60, venues: 3, topics: 4, posters: 2, mentionsPerStep: 300, sigmas }
const simulate = (changes: Partial<SimulationOptions> = {}, seed = 1): Simulation => simulateCells({ ...options, ...changes }, createGenerator(seed, 0))
const mean = (values: ArrayLike<number>) => Array.from(values).reduce((sum, value) => sum + value, 0) / values.length
const variance = (values: readonly number[]) => mean(values.map((value) => (value - mean(values)) ** 2))

/** Cell means less what the truth expects, in units of their standard deviation. */
function residuals({ tables, truth }: Simulation, expectedDrift = truth.drift): number[] {
  const { cells } = tables
  const { variance: v } = samplingVariance(tables)
  return Array.from({ length: cells.count }, (_, c) => {
    const [venue, topic, poster] = cells.levels.map((column) => column[c])
    const expected = truth.mu[cells.step[c]] + truth.offsets[0][venue] + expectedDrift[venue][cells.step[c]] + truth.offsets[1][topic] + truth.offsets[2][poster]
    return (cells.mean[c] - expected) / Math.sqrt(v[c] + truth.sigmas.tau ** 2)
  })
}

describe('cells', () => {
  test('lie about the truth as the model says', () => {
    const simulation = simulate()
    expect(simulation.tables.cells.count).toBeGreaterThan(1300)
    expect(Math.abs(mean(residuals(simulation)))).toBeLessThan(0.08)
    expect(Math.abs(variance(residuals(simulation)) - 1)).toBeLessThan(0.12)
  })

  test('it can fail: without the drift they do not', () => {
    const simulation = simulate({ paths: { drift: [Float64Array.from({ length: 60 }, (_, t) => -0.01 * t), null, null] } })
    expect(Math.abs(variance(residuals(simulation)) - 1)).toBeLessThan(0.12)
    expect(variance(residuals(simulation, simulation.truth.drift.map((path) => path.map(() => 0))))).toBeGreaterThan(1.5)
  })

  test('vary inside as asked', () => {
    for (const s2 of samplingVariance(simulate({ mentionVariance: 0.4 }).tables).withinCell) expect(Math.abs(s2 / 0.4 - 1)).toBeLessThan(0.05)
  })

  test('are sorted by step and level, and their counts follow the mix', () => {
    const { tables } = simulate({ mix: { venue: { from: [1, 1, 2], to: [2, 1, 1] } } })
    const { step, levels, mentions, count } = tables.cells
    const keys = Array.from({ length: count }, (_, c) => ((step[c] * 3 + levels[0][c]) * 4 + levels[1][c]) * 2 + levels[2][c])
    expect(keys.every((key, c) => c === 0 || key > keys[c - 1])).toBe(true)
    const share = (venue: number, from: number, to: number) => {
      const inside = keys.map((_, c) => c).filter((c) => step[c] >= from && step[c] < to)
      return inside.filter((c) => levels[0][c] === venue).reduce((sum, c) => sum + mentions[c], 0) / inside.reduce((sum, c) => sum + mentions[c], 0)
    }
    expect(Math.abs(share(0, 0, 6) - 0.26)).toBeLessThan(0.04)
    expect(Math.abs(share(0, 54, 60) - 0.49)).toBeLessThan(0.04)
    expect(Math.abs(mentions.reduce((sum, n) => sum + n, 0) / 60 - 300)).toBeLessThan(10)
  })
})

describe('the truth', () => {
  test('is the same for the same state of the generator, another for another', () => {
    expect(simulate()).toEqual(simulate())
    expect(simulate({}, 2).truth.mu).not.toEqual(simulate().truth.mu)
  })

  test('adjusted opinion is opinion plus the offsets at the target mix that the model uses', () => {
    const { tables, truth } = simulate()
    const { shares } = targetMix(tables)
    const standing = shares.reduce((sum, own, f) => sum + own.reduce((part, share, level) => part + share * truth.offsets[f][level], 0), 0)
    truth.adjusted.forEach((level, t) => expect(level - truth.mu[t]).toBeCloseTo(standing, 12))
    expect(Math.abs(standing)).toBeGreaterThan(0.001)
  })

  test('walks start at 0 for drifts and take steps of the given size', () => {
    const { truth } = simulate({ steps: 2000, mentionsPerStep: 5 })
    const moves = (path: ArrayLike<number>) => Array.from(path).slice(1).map((value, t) => value - path[t])
    expect(truth.drift.map((path) => path[0])).toEqual([0, 0, 0])
    expect(Math.sqrt(variance(moves(truth.mu))) / 0.02).toBeCloseTo(1, 1)
    expect(Math.sqrt(variance(moves(truth.drift[1]))) / 0.02).toBeCloseTo(1, 1)
    expect(Math.max(...truth.drift[2])).toBe(0)
  })

  test('keeps the paths it is given, and refuses one of another length', () => {
    const mu = Float64Array.from({ length: 60 }, (_, t) => 0.002 * t)
    expect(simulate({ paths: { mu } }).truth.mu).toEqual(mu)
    expect(() => simulate({ paths: { mu: mu.slice(1) } })).toThrow(RangeError)
  })

  test('a factor with one level has no effect, a lone venue no drift', () => {
    const { truth } = simulate({ venues: 1, posters: 1 })
    expect([truth.offsets[0], truth.offsets[2]]).toEqual([new Float64Array(1), new Float64Array(1)])
    expect(truth.drift).toEqual([new Float64Array(60)])
  })
})

test('standard deviations drawn from the priors are half-normal with the scales of the method', () => {
  const random = createGenerator(5, 0)
  const draws = Array.from({ length: 4000 }, () => drawSigmas(options, random))
  const rms = (values: readonly number[]) => Math.sqrt(mean(values.map((value) => value ** 2)))
  expect(rms(draws.map(({ mu }) => mu)) / 0.03).toBeCloseTo(1, 1)
  expect(rms(draws.map(({ venueDrift }) => venueDrift[2])) / 0.02).toBeCloseTo(1, 1)
  for (const key of ['venue', 'topic', 'poster'] as const) expect(rms(draws.map((draw) => draw[key])) / 0.3).toBeCloseTo(1, 1)
  expect(rms(draws.map(({ tau }) => tau)) / 0.2).toBeCloseTo(1, 1)
  expect(Math.min(...draws.map(({ mu }) => mu))).toBeGreaterThan(0)
})

test('the tables agree with themselves', () => {
  const { tables } = simulate()
  const { timeline, cells, authors, accounting, concentration } = tables
  const sum = (values: ArrayLike<number>) => Array.from(values).reduce((total, value) => total + value, 0)
  expect(timeline.steps).toHaveLength(60)
  expect(timeline.current).toBe(timeline.periods.length - 1)
  expect(sum(timeline.inBase)).toBe(20)
  expect([sum(authors.byStep), sum(authors.byPeriod), sum(authors.byPeriodLevel[1]), accounting.modelled, sum(accounting.withAuthor)]).toEqual(Array(5).fill(sum(cells.mentions)))
  expect(sum(concentration.filter(({ venue }) => venue === -1).map((row) => row.authors))).toBe(sum(cells.mentions))
})
