import { expect, test } from 'vitest'
import { createGenerator } from '../../../model/random/generator.ts'
import { autocorrelations } from '../../../model/statistics/autocorrelation.ts'
import { autoregressionCoefficient, fillAutoregression } from '../../../model/statistics/first-order-autoregression.ts'
import { mean, standardDeviation } from '../../../model/statistics/moments.ts'

test.each([[36, 0.5], [36, 0.3], [60, 0.6]])('%d values: on average the coefficient is the true %d within 0.01; the plain one falls short', (n, coefficient) => {
  const samples = 6000
  const generator = createGenerator(5, n)
  const series = new Float64Array(n)
  const [corrected, plain] = [new Float64Array(samples), new Float64Array(samples)]
  for (let sample = 0; sample < samples; sample += 1) {
    fillAutoregression(series, { mean: 3, sd: 2, coefficient }, generator)
    corrected[sample] = autoregressionCoefficient(series).value!
    plain[sample] = autocorrelations(series, 1)![0]
  }
  expect(Math.abs(mean(corrected) - coefficient)).toBeLessThan(0.01)
  expect(mean(plain)).toBeLessThan(coefficient - 0.04)
})

test('held inside [0, 0.97]', () => {
  expect(autoregressionCoefficient(Array.from({ length: 40 }, (_, t) => t))).toEqual({ value: 0.97 })
  expect(autoregressionCoefficient([1, -1, 1, -1, 1, -1, 1, -1])).toEqual({ value: 0 })
})

test('left open, or refused by name', () => {
  expect(autoregressionCoefficient([1, 2, 3, 2])).toEqual({ value: null, reason: 'too-few-values' })
  expect(autoregressionCoefficient([2, 2, 2, 2, 2])).toEqual({ value: null, reason: 'no-variation' })
  expect(() => autoregressionCoefficient([1, 2, 3, 4, Number.NaN])).toThrow('values[4] NaN')
  const generator = createGenerator(1, 0)
  expect(() => { fillAutoregression(new Float64Array(2), { mean: 0, sd: -1, coefficient: 0 }, generator) }).toThrow('sd -1')
  expect(() => { fillAutoregression(new Float64Array(2), { mean: 0, sd: 1, coefficient: 1 }, generator) }).toThrow('coefficient 1')
})

test('a series drawn has its mean, standard deviation and coefficient from the first value on; the same seed draws it again', () => {
  const drawn = { mean: 40, sd: 3, coefficient: 0.8 }
  const firsts = Float64Array.from({ length: 4000 }, (_, stream) => {
    const series = new Float64Array(2)
    fillAutoregression(series, drawn, createGenerator(9, stream))
    return series[0]
  })
  expect(Math.abs(mean(firsts) - 40)).toBeLessThan(3.5 * 3 / Math.sqrt(4000))
  expect(Math.abs(standardDeviation(firsts) / 3 - 1)).toBeLessThan(3.5 / Math.sqrt(8000))
  const [long, again] = [new Float64Array(40_000), new Float64Array(40_000)]
  fillAutoregression(long, drawn, createGenerator(9, 0))
  fillAutoregression(again, drawn, createGenerator(9, 0))
  expect(again).toEqual(long)
  expect(Math.abs(autocorrelations(long, 1)![0] - 0.8)).toBeLessThan(3.5 * 0.6 / 200)
  // A mean of 40,000 such values is worth one of 40,000 (1 - 0.8) / (1 + 0.8) independent ones.
  expect(Math.abs(mean(long) - 40)).toBeLessThan(3.5 * 3 / Math.sqrt(40_000 / 9))
  expect(Math.abs(standardDeviation(long) - 3)).toBeLessThan(0.15)
  expect(firsts[1]).not.toBe(firsts[0])
  fillAutoregression(new Float64Array(0), drawn, createGenerator(9, 0))
})
