import { expect, test } from 'vitest'
import { createGenerator } from '../../../model/random/generator.ts'
import { correlation } from '../../../model/statistics/correlation.ts'
import { effectivePairs, lagOnePairs, pairsFromProducts } from '../../../model/statistics/effective-pairs.ts'
import { fisherInterval } from '../../../model/statistics/fisher-interval.ts'
import { fillMemory } from '../../../model/statistics/noisy-autoregression.ts'

const drawn = (n: number, coefficient: number, stream: number) => {
  const series = new Float64Array(n)
  fillMemory(series, { coefficient, innovation: 1 }, createGenerator(7, stream))
  return series
}

test.each([[12, 0.8, 0.8], [36, 0.9, 0.5], [36, 0, 0]])('%d pairs, coefficients %d and %d: the 90 % interval of unrelated series covers 0 in 87 to 95 %', (n, one, other) => {
  const samples = 1500
  let [covered, plain] = [0, 0]
  for (let sample = 0; sample < samples; sample += 1) {
    const [x, y] = [drawn(n, one, 2 * sample), drawn(n, other, 2 * sample + 1)]
    const r = correlation(x, y)!
    const found = fisherInterval(r, effectivePairs(x, y).value!, 0.9)
    if (found === null || (found.low < 0 && found.high > 0)) covered += 1
    const naive = fisherInterval(r, n, 0.9)!
    if (naive.low < 0 && naive.high > 0) plain += 1
  }
  expect(covered / samples).toBeGreaterThan(0.87)
  expect(covered / samples).toBeLessThan(0.95)
  // It can fail: with every pair counted as independent the interval covers too seldom, unless they are.
  expect(plain / samples < 0.82).toBe(one > 0)
})

test('never more pairs than there are, nor fewer than two; which series is which does not matter', () => {
  const alternating = Array.from({ length: 8 }, (_, t) => (t % 2 === 0 ? 1 : -1) + t / 100)
  const rising = Array.from({ length: 8 }, (_, t) => t + (t % 3))
  expect(effectivePairs(alternating, rising)).toEqual({ value: 8 })
  expect(effectivePairs(rising, rising).value).toBeGreaterThanOrEqual(2)
  expect(effectivePairs(Array.from({ length: 60 }, (_, t) => t), Array.from({ length: 60 }, (_, t) => -t)).value).toBeLessThan(6)
  const [x, y] = [drawn(30, 0.8, 1), drawn(30, 0.6, 2)]
  expect(effectivePairs(x, y)).toEqual(effectivePairs(y, x))
  expect(effectivePairs(x, y).value).toBeLessThan(30)
})

test('the sum: more than n where it is negative, infinite where it cancels all', () => {
  expect(pairsFromProducts(10, [])).toBe(10)
  expect(pairsFromProducts(10, [-0.25])).toBe(20)
  expect(pairsFromProducts(10, [-0.5])).toBe(Infinity)
  expect(lagOnePairs(10, 0.5, -0.5)).toBeCloseTo(16.6667, 4)
})

test('left open, or refused by name', () => {
  expect(effectivePairs([1, 2], [1, 2])).toEqual({ value: null, reason: 'too-few-pairs' })
  expect(effectivePairs([1, 2, 3], [5, 5, 5])).toEqual({ value: null, reason: 'no-variation' })
  expect(() => effectivePairs([1, 2, 3], [1, 2])).toThrow('2, expected 3')
  expect(() => effectivePairs([1, 2, Number.NaN], [1, 2, 3])).toThrow('values[2] NaN')
  expect(() => pairsFromProducts(0, [])).toThrow('pairs 0')
  expect(() => pairsFromProducts(9, [0, Infinity])).toThrow('products[1] Infinity')
  expect(() => lagOnePairs(9, 1, 0.5)).toThrow('1 and 0.5')
})
