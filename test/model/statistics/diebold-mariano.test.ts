import { expect, test } from 'vitest'
import { createGenerator } from '../../../model/random/generator.ts'
import { dieboldMariano } from '../../../model/statistics/diebold-mariano.ts'

test('the other way round the sign turns and p stays', () => {
  const [a, b] = [[1.2, -0.8, 0.5, 2.1, -1.4, 0.3], [0.7, -0.5, 0.9, 1.2, -0.9, 0.8]]
  const [there, back] = [dieboldMariano(a, b, 1), dieboldMariano(b, a, 1)]
  expect(back.lossDifference).toBe(-there.lossDifference)
  expect(back.statistic.value).toBe(-there.statistic.value!)
  expect(back.p).toEqual(there.p)
})

test('by hand: losses 4 and 0, 1 and 0: mean 2.5, variance 2.25, t of one degree of freedom', () => {
  const { lossDifference, statistic, p } = dieboldMariano([2, 1], [0, 0], 1)
  expect(lossDifference).toBe(2.5)
  expect(statistic.value).toBeCloseTo((2.5 / Math.sqrt(2.25 / 2)) * Math.sqrt(1 / 2), 14)
  expect(p.value).toBeCloseTo(1 - (2 / Math.PI) * Math.atan(statistic.value!), 14)
})

test('of equally good forecasts one test in ten says otherwise at most, within 3.5 standard errors; of one twice as wide most', () => {
  const [samples, n] = [2000, 28]
  const generator = createGenerator(6, 0)
  const errors = (sd: number) => Float64Array.from({ length: n }, () => sd * generator.normal())
  const refused = (sd: number) => Array.from({ length: samples }, () => dieboldMariano(errors(1), errors(sd), 1).p.value!).filter((p) => p <= 0.1).length / samples
  expect(refused(1)).toBeLessThan(0.1 + 3.5 * Math.sqrt(0.09 / samples))
  expect(refused(1)).toBeGreaterThan(0.05)
  expect(refused(2)).toBeGreaterThan(0.7)
})

test('left open, or refused by name', () => {
  expect(dieboldMariano([1, -1, 1], [1, 1, -1], 1)).toEqual({ lossDifference: 0, statistic: { value: null, reason: 'losses-alike' }, p: { value: null, reason: 'losses-alike' } })
  expect(dieboldMariano([0.1 + 0.2, 0.3, -0.3], [0.1, 0.1, -0.1], 1).p).toEqual({ value: null, reason: 'losses-alike' })
  expect(dieboldMariano([1, 0, 1, 0, 1, 0], [0, 1, 0, 1, 0, 1], 2).p).toEqual({ value: null, reason: 'variance-not-positive' })
  expect(() => dieboldMariano([1, 2], [1], 1)).toThrow('1, expected 2')
  expect(() => dieboldMariano([1], [1], 1)).toThrow('errors 1')
  expect(() => dieboldMariano([1, 2, 3], [1, 2, 4], 3)).toThrow('horizon 3')
  expect(() => dieboldMariano([1, 2, 3], [1, Number.NaN, 4], 1)).toThrow('errorsB[1] NaN')
})
