import { describe, expect, test } from 'vitest'
import { createGenerator } from '../../../model/random/generator.ts'
import type { IntakeTables } from '../../../model/intake/intake-tables.ts'
import { meanPath } from '../../../model/fit/mean-path.ts'
import { forecastWaves } from '../../../model/survey/rolling-forecast.ts'
import type { HeadlineWave } from '../../../model/survey/headline.ts'
import { simulateCells } from '../../support/simulate-cells.ts'

const steps = 60
const { tables, truth } = simulateCells({
  steps, venues: 3, topics: 2, posters: 1, mentionsPerStep: 200,
  sigmas: { mu: 0.03, venueDrift: [0.01, 0.002, 0.004], venue: 0.2, topic: 0.2, poster: 0, tau: 0.03 },
}, createGenerator(3, 0))

const noise = createGenerator(3, 1)
/** Waves of one week every four, saying four weeks later what opinion was. */
const waves: readonly HeadlineWave[] = Array.from({ length: 14 }, (_, w) => waveAt(4 * (w + 1), 50 + 50 * truth.mu[4 * w] + 2 * noise.normal()))

function waveAt(startStep: number, value: number): HeadlineWave {
  const day = (add: number) => new Date(Date.UTC(2024, 0, 1 + 7 * startStep + add)).toISOString().slice(0, 10)
  return { name: `w${startStep}`, start: day(0), end: day(6), startStep, days: Float64Array.of(7), value, standardError: 2.5 }
}

const lags = Array.from({ length: 13 }, (_, i) => i - 4)
const forecastOf = async (from: IntakeTables, said: readonly HeadlineWave[], wave: HeadlineWave) => (await forecastWaves(from, said, [wave], lags, meanPath, 1))[0]

/** Everything from a step on said, counted and labelled otherwise. */
function changedFrom(step: number): IntakeTables {
  const { cells } = tables
  const later = (c: number) => cells.step[c] >= step
  return {
    ...tables,
    cells: {
      ...cells,
      mean: cells.mean.map((mean, c) => (later(c) ? -0.9 * mean + 0.3 : mean)), mentions: cells.mentions.map((n, c) => (later(c) ? 3 * n : n)),
      squares: cells.squares.map((x, c) => (later(c) ? 7 * x : x)), levels: cells.levels.map((column) => column.map((level, c) => (later(c) ? 0 : level))),
    },
    variation: tables.variation.map((sums) => (sums === null ? null : { ...sums, betweenSquares: 5 * sums.betweenSquares })),
  }
}

describe('a forecast', () => {
  const wave = waves[10]
  test('does not change by one bit when everything after the fieldwork began is changed', async () => {
    const plain = await forecastOf(tables, waves, wave)
    expect(plain).not.toBeNull()
    expect(await forecastOf(changedFrom(wave.startStep), waves, wave)).toEqual(plain)
  })
  test('nor when that wave and those after it say otherwise', async () => {
    const otherwise = waves.map((each, w) => (w >= 10 ? { ...each, value: 3 } : each))
    expect(await forecastOf(tables, otherwise, wave)).toEqual(await forecastOf(tables, waves, wave))
  })
  test('it can fail: a change in the last step before the fieldwork is seen, and in the wave before', async () => {
    const plain = await forecastOf(tables, waves, wave)
    expect(await forecastOf(changedFrom(wave.startStep - 1), waves, wave)).not.toEqual(plain)
    expect(await forecastOf(tables, waves.map((each, w) => (w === 9 ? { ...each, value: 3 } : each)), wave)).not.toEqual(plain)
  })
  test('is not made from fewer than eight waves, nor where no post came before', async () => {
    const found = await forecastWaves(tables, waves, waves, lags, meanPath, 1)
    expect(found.map((forecast) => forecast !== null)).toEqual(waves.map((_, w) => w >= 8))
    expect(await forecastOf(changedFrom(steps), waves.map((each) => ({ ...each, start: '2020-01-01', end: '2020-01-02' })), { ...wave, startStep: 0 })).toBeNull()
  })
  test('does not know a wave whose fieldwork was not over', async () => {
    const overlapping = waves.map((each, w) => (w === 9 ? { ...each, end: waves[10].start } : each))
    expect((await forecastOf(tables, overlapping, wave))?.known).toHaveLength(9)
    expect((await forecastOf(tables, waves, wave))?.known).toHaveLength(10)
  })
})

describe('many waves', () => {
  /** A wave begins every day, on this grid of weeks: seven of them may be forecast from the same posts. */
  const rolling: readonly HeadlineWave[] = Array.from({ length: 210 }, (_, w) => {
    const start = new Date(Date.UTC(2024, 2, 4 + w)).toISOString().slice(0, 10)
    return { name: `d${w}`, start, end: start, startStep: 9 + Math.floor(w / 7), days: Float64Array.of(1), value: 50 + 3 * Math.sin(w), standardError: 2.5 }
  })
  /** A refit that answers when it is let, and how many were asked at once. */
  function watched() {
    const [problems, most] = [new Set<unknown>(), { asked: 0, atOnce: 0 }]
    const refit: typeof meanPath = async (problem) => {
      problems.add(problem)
      most.asked++
      most.atOnce = Math.max(most.atOnce, problems.size)
      await new Promise((resolve) => { setTimeout(resolve, 2) })
      problems.delete(problem)
      return Float64Array.from({ length: problem.steps }, (_, t) => Math.sin(t) + problem.cells.count / 1000)
    }
    return { refit, most }
  }

  test('that begin in the same step share one fit, and few problems are there at a time', async () => {
    const { refit, most } = watched()
    const found = await forecastWaves(tables, rolling.slice(0, 140), rolling.slice(0, 140), lags, refit, 1)
    expect(found.filter((forecast) => forecast !== null)).toHaveLength(132)
    // of the 20 weeks the first has no wave with eight before it, and the first wave of the second none either
    expect(most.asked).toBe(19)
    expect(most.atOnce).toBeGreaterThan(1)
    expect(most.atOnce).toBeLessThanOrEqual(8)
  })
  test('are each forecast as it would be alone', async () => {
    const { refit } = watched()
    const together = await forecastWaves(tables, rolling.slice(0, 60), rolling.slice(0, 60), lags, refit, 1)
    for (const w of [8, 20, 21, 59]) expect(together[w]).toEqual((await forecastWaves(tables, rolling, [rolling[w]], lags, refit, 1))[0])
  })
  test('are forecast from the last back, 150 at the most', async () => {
    const found = await forecastWaves(tables, rolling, rolling, lags, watched().refit, 1)
    expect(found).toHaveLength(210)
    expect(found.map((forecast) => forecast !== null)).toEqual(rolling.map((_, w) => w >= 60))
  })
  test('a fit that fails is told, and no other is begun', async () => {
    let asked = 0
    await expect(forecastWaves(tables, rolling, rolling, lags, () => Promise.reject(new Error(`fit ${++asked}`)), 1)).rejects.toThrow('fit 1')
    expect(asked).toBeLessThanOrEqual(8)
  })
})
