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
