import { expect, test } from 'vitest'
import { createGenerator } from '../../../model/random/generator.ts'
import { correctedCorrelation, reliability } from '../../../model/statistics/attenuation.ts'
import { correlation } from '../../../model/statistics/correlation.ts'
import { mean } from '../../../model/statistics/moments.ts'

test('with known sampling errors the correlation with the truth comes back; left as it is it falls short', () => {
  const [n, samples, rho, errorSd] = [200, 400, 0.6, 0.8]
  const generator = createGenerator(3, 0)
  const [plain, corrected] = [new Float64Array(samples), new Float64Array(samples)]
  for (let sample = 0; sample < samples; sample += 1) {
    const x = Float64Array.from({ length: n }, generator.normal)
    const measured = x.map((value) => rho * value + Math.sqrt(1 - rho * rho) * generator.normal() + errorSd * generator.normal())
    plain[sample] = correlation(x, measured)!
    corrected[sample] = correctedCorrelation(plain[sample], measured, measured.map(() => errorSd)).value!
  }
  expect(Math.abs(mean(corrected) - rho)).toBeLessThan(0.02)
  expect(Math.abs(mean(plain) - rho / Math.sqrt(1 + errorSd * errorSd))).toBeLessThan(0.02)
})

test('no sampling error, no correction; the sign stays', () => {
  expect(reliability([1, 2, 4], [0, 0, 0])).toEqual({ value: 1 })
  expect(correctedCorrelation(-0.4, [1, 2, 4], [0, 0, 0])).toEqual({ value: -0.4 })
  expect(correctedCorrelation(-0.4, [1, 3, 5], [1, 1, 1]).value).toBeCloseTo(-0.4 / Math.sqrt(0.75), 14)
})

test('left open, or refused by name', () => {
  expect(reliability([1], [0])).toEqual({ value: null, reason: 'too-few-values' })
  expect(reliability([2, 2], [0.1, 0.1])).toEqual({ value: null, reason: 'no-variation' })
  expect(correctedCorrelation(0.5, [1, 3, 5], [2, 2, 2])).toEqual({ value: null, reason: 'all-sampling-error' })
  expect(correctedCorrelation(0.9, [1, 3, 5], [1, 1, 1])).toEqual({ value: null, reason: 'beyond-one' })
  expect(() => correctedCorrelation(1.2, [1, 3], [1, 1])).toThrow('correlation 1.2')
  expect(() => reliability([1, 3], [1])).toThrow('1, expected 2')
  expect(() => reliability([1, 3], [1, -1])).toThrow('standardErrors[1] -1')
  expect(() => reliability([1, Number.NaN], [1, 1])).toThrow('values[1] NaN')
})
