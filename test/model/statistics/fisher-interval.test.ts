import { expect, test } from 'vitest'
import { createGenerator } from '../../../model/random/generator.ts'
import { correlation } from '../../../model/statistics/correlation.ts'
import { fisherInterval } from '../../../model/statistics/fisher-interval.ts'

test('the 90 % interval covers the true correlation in 90 % of samples, within 3.5 standard errors; it can fail at 80 %', () => {
  const [rho, pairs, samples] = [0.6, 20, 2000]
  const generator = createGenerator(81, 0)
  const covered = { 0.9: 0, 0.8: 0 }
  for (let sample = 0; sample < samples; sample += 1) {
    const x = Float64Array.from({ length: pairs }, generator.normal)
    const y = x.map((value) => rho * value + Math.sqrt(1 - rho * rho) * generator.normal())
    const r = correlation(x, y) ?? Number.NaN
    for (const level of [0.9, 0.8] as const) {
      const found = fisherInterval(r, pairs, level)
      if (found !== null && found.low < rho && rho < found.high) covered[level] += 1
    }
  }
  const error = 3.5 * Math.sqrt(0.09 / samples)
  expect(Math.abs(covered[0.9] / samples - 0.9)).toBeLessThan(error)
  expect(Math.abs(covered[0.8] / samples - 0.9)).toBeGreaterThan(error)
})

test('left open, or refused by name', () => {
  expect(fisherInterval(1, 10, 0.9)).toEqual({ low: 1, high: 1 })
  expect(fisherInterval(0.5, 3, 0.9)).toBeNull()
  expect(() => fisherInterval(1.1, 10, 0.9)).toThrow('1.1')
  expect(() => fisherInterval(0.5, 10, 95)).toThrow('level 95')
})
