import { expect, test } from 'vitest'
import { createGenerator } from '../../../model/random/generator.ts'
import { fillMemory } from '../../../model/statistics/noisy-autoregression.ts'
import { autocorrelations } from '../../../model/statistics/autocorrelation.ts'
import { mean } from '../../../model/statistics/moments.ts'
import { surrogatesOf } from '../../../model/survey/persistence.ts'

const waves = 30
const errors = new Float64Array(waves).fill(0.3)

/** Mean lag-one autocorrelation of the surrogates of one survey of such a memory. */
function memoryOfSurrogates(coefficient: number, stream: number): number {
  const survey = new Float64Array(waves)
  fillMemory(survey, { coefficient, innovation: 1 }, createGenerator(5, stream))
  const draw = surrogatesOf(survey, errors)!
  const generator = createGenerator(6, stream)
  const surrogate = new Float64Array(waves)
  return mean(Float64Array.from({ length: 400 }, () => {
    draw(surrogate, generator)
    return autocorrelations(surrogate, 1)![0]
  }))
}

test('surrogates of a survey that wanders wander, those of one without memory hardly do', () => {
  const over = (coefficient: number) => mean(Float64Array.from({ length: 20 }, (_, stream) => memoryOfSurrogates(coefficient, stream)))
  expect(over(1)).toBeGreaterThan(0.65)
  expect(over(0)).toBeLessThan(0.3)
})

test('sampling error alone is not taken for opinion that moves: surrogates then have no memory', () => {
  const survey = new Float64Array(waves)
  createGenerator(5, 99).fillNormal(survey)
  const draw = surrogatesOf(survey, new Float64Array(waves).fill(1))!
  const surrogate = new Float64Array(waves)
  const generator = createGenerator(6, 99)
  const found = mean(Float64Array.from({ length: 400 }, () => {
    draw(surrogate, generator)
    return autocorrelations(surrogate, 1)![0]
  }))
  expect(Math.abs(found)).toBeLessThan(0.25)
})

test('waves that all say the same, or fewer than three, have no surrogates', () => {
  expect(surrogatesOf(new Float64Array(12).fill(40), new Float64Array(12).fill(2))).toBeNull()
  expect(surrogatesOf([40, 42], [2, 2])).toBeNull()
})

test('waves stated without error, a share of exactly none, are no obstacle', () => {
  const draw = surrogatesOf([0, 1, 3, 2, 4, 5], new Float64Array(6))!
  const surrogate = new Float64Array(6)
  draw(surrogate, createGenerator(1, 0))
  expect(surrogate.every(Number.isFinite)).toBe(true)
})
