import { expect, test } from 'vitest'
import { createGenerator } from '../../../model/random/generator.ts'
import { correlation } from '../../../model/statistics/correlation.ts'
import type { DrawSurrogate } from '../../../model/survey/persistence.ts'
import { fillMemory } from '../../../model/statistics/noisy-autoregression.ts'
import { maxStatisticP } from '../../../model/survey/surrogates.ts'

const waves = 24
const every = Int32Array.from({ length: waves }, (_, w) => w)

const white: DrawSurrogate = (target, generator) => { generator.fillNormal(target) }
const remembering = (coefficient: number): DrawSurrogate => (target, generator) => { fillMemory(target, { coefficient, innovation: 1 }, generator) }

function walks(seed: number, lags: number): readonly Float64Array[] {
  const generator = createGenerator(seed, 0)
  let at = 0
  const path = Array.from({ length: waves + lags }, () => (at += generator.normal()))
  return Array.from({ length: lags }, (_, lag) => Float64Array.from({ length: waves }, (__, w) => path[w + lag]))
}

/** White surveys that have nothing to do with the series: the largest |r| over the lags, and its p-value. */
function unrelatedP(run: number, lags: number): number {
  const generator = createGenerator(77, run)
  const survey = Float64Array.from({ length: waves }, () => generator.normal())
  const partners = walks(run, lags)
  const largest = Math.max(...partners.map((series) => Math.abs(correlation(series, survey)!)))
  return maxStatisticP(largest, partners.map((series) => ({ waves: every, partners: series })), white, waves, createGenerator(78, run))
}

test('of surveys unrelated to the series one in ten has a p-value of 0.10 or less, however many lags are looked at', () => {
  const runs = 150
  const small = Array.from({ length: runs }, (_, run) => unrelatedP(run, 20)).filter((p) => p <= 0.1).length / runs
  // binomial, 150 runs: 0.1 has a standard error of 0.024
  expect(small).toBeGreaterThan(0.03)
  expect(small).toBeLessThan(0.17)
})

test('looking at more lags makes the same correlation less remarkable', () => {
  const partners = walks(3, 20).map((series) => ({ waves: every, partners: series }))
  const p = (count: number) => maxStatisticP(0.5, partners.slice(0, count), white, waves, createGenerator(1, 0))
  expect(p(20)).toBeGreaterThan(p(1))
})

test('a survey with a memory shows large correlations by chance more often', () => {
  const partners = [{ waves: every, partners: Float64Array.from(every) }]
  const p = (coefficient: number) => maxStatisticP(0.5, partners, remembering(coefficient), waves, createGenerator(1, 0))
  expect(p(0.9)).toBeGreaterThan(3 * p(0))
})

test('nothing is less likely than one in two thousand', () => {
  expect(maxStatisticP(1, [{ waves: every, partners: walks(1, 1)[0] }], white, waves, createGenerator(1, 0))).toBe(1 / 2000)
})
