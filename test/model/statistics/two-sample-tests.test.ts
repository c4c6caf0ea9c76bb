import { expect, test } from 'vitest'
import { createGenerator } from '../../../model/random/generator.ts'
import { twoMeans, twoShares } from '../../../model/statistics/two-sample-tests.ts'

test('the other way round: difference and interval turn, p stays; bases need not be whole', () => {
  const [one, other] = [{ share: 0.41, base: 312.7 }, { share: 0.36, base: 288.2 }]
  const [there, back] = [twoShares(one, other, 0.9), twoShares(other, one, 0.9)]
  expect([back.difference, back.low, back.high]).toEqual([-there.difference, -there.high, -there.low])
  expect(back.p.value).toBeCloseTo(there.p.value!, 14)
  const [ofMeans, reversed] = [twoMeans({ mean: 7.1, sd: 2, base: 30.5 }, { mean: 6.4, sd: 1, base: 80 }, 0.9), twoMeans({ mean: 6.4, sd: 1, base: 80 }, { mean: 7.1, sd: 2, base: 30.5 }, 0.9)]
  expect([reversed.low, reversed.high, reversed.p.value]).toEqual([-ofMeans.high, -ofMeans.low, ofMeans.p.value])
})

test('the interval of two means excludes 0 exactly where p is below what it leaves out', () => {
  const p = twoMeans({ mean: 7.1, sd: 2, base: 30.5 }, { mean: 6.4, sd: 1, base: 80 }, 0.9).p.value!
  expect(twoMeans({ mean: 7.1, sd: 2, base: 30.5 }, { mean: 6.4, sd: 1, base: 80 }, 1 - p).low).toBeCloseTo(0, 12)
  expect(twoMeans({ mean: 7.1, sd: 2, base: 30.5 }, { mean: 6.4, sd: 1, base: 80 }, 1 - p / 2).low).toBeLessThan(-0.01)
})

test('of equal shares one test in twenty says otherwise, within 3.5 standard errors; shares 12 points apart do far oftener', () => {
  const [samples, base] = [2000, 200]
  const generator = createGenerator(4, 0)
  const asked = (truth: number) => Array.from({ length: base }, () => (generator.uniform() < truth ? 1 : 0)).reduce<number>((sum, yes) => sum + yes, 0) / base
  const refused = (one: number, other: number) => Array.from({ length: samples }, () => twoShares({ share: asked(one), base }, { share: asked(other), base }, 0.9).p.value ?? 1)
    .filter((p) => p <= 0.05).length / samples
  const error = 3.5 * Math.sqrt((0.05 * 0.95) / samples)
  expect(Math.abs(refused(0.4, 0.4) - 0.05)).toBeLessThan(error)
  expect(refused(0.4, 0.52)).toBeGreaterThan(0.05 + 10 * error)
})

test('left open where nothing varies; the score interval stays open all the same', () => {
  const none = twoShares({ share: 0, base: 40 }, { share: 0, base: 60 }, 0.95)
  expect(none.p).toEqual({ value: null, reason: 'no-variation' })
  expect(none.low).toBeLessThan(-0.05)
  expect(none.high).toBeGreaterThan(0.05)
  expect(twoShares({ share: 1, base: 33.3 }, { share: 1, base: 0.7 }, 0.95).p.value).toBeNull()
  expect(twoShares({ share: 1, base: 20 }, { share: 0, base: 20 }, 0.95)).toMatchObject({ difference: 1, high: 1 })
  expect(twoMeans({ mean: 5, sd: 0, base: 9 }, { mean: 4, sd: 0, base: 9 }, 0.9)).toEqual({ difference: 1, low: 1, high: 1, p: { value: null, reason: 'no-variation' } })
})

test('refused by name', () => {
  expect(() => twoShares({ share: 1.2, base: 10 }, { share: 0.5, base: 10 }, 0.9)).toThrow('share 1.2')
  expect(() => twoShares({ share: 0.2, base: 10 }, { share: 0.5, base: 0 }, 0.9)).toThrow('of 0')
  expect(() => twoShares({ share: 0.2, base: 10 }, { share: 0.5, base: 10 }, 90)).toThrow('level 90')
  expect(() => twoMeans({ mean: 0, sd: -1, base: 10 }, { mean: 0, sd: 1, base: 10 }, 0.9)).toThrow('sd -1')
})
