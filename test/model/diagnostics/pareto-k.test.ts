import { describe, expect, test } from 'vitest'
import { paretoKLimit, paretoSmooth } from '../../../model/diagnostics/pareto-k.ts'
import { createGenerator } from '../../../model/random/generator.ts'
import { mean } from '../../../model/statistics/moments.ts'

/** Log ratios of a standard normal target to draws from a normal of another width: heavy where that is narrower. */
function normalRatios(width: number, draws: number) {
  const generator = createGenerator(71, 0)
  const points = Float64Array.from({ length: draws }, () => width * generator.normal())
  return { points, logRatios: points.map((x) => -0.5 * x * x + 0.5 * (x / width) ** 2) }
}

describe('an exponential proposal of rate b for one of rate 1: ratios have a Pareto tail of k = 1 - 1 / b exactly', () => {
  const [draws, streams] = [10_000, 20]
  const k = (rate: number) => {
    const found = Array.from({ length: streams }, (_, stream) => {
      const generator = createGenerator(72, stream)
      return paretoSmooth(Float64Array.from({ length: draws }, () => -(1 - 1 / rate) * Math.log(generator.uniform()))).paretoK.value ?? Number.NaN
    })
    return mean(found)
  }
  /** Standard error of the mean of the streams: (1 + k) / root of the tail in each (Smith 1987, Annals of Statistics 15:1174-1207). */
  const error = (expected: number) => (1 + expected) / Math.sqrt(3 * Math.sqrt(draws) * streams)

  test.each([1.25, 2, 5])('rate %d: within 3.5 standard errors', (rate) => {
    const expected = 1 - 1 / rate
    expect(Math.abs(k(rate) - expected)).toBeLessThan(3.5 * error(expected))
  })

  test('a wider proposal is safe; it can fail: rate 5 is not taken for rate 2', () => {
    expect(k(0.8)).toBeLessThan(0)
    expect(Math.abs(k(5) - 0.5)).toBeGreaterThan(3.5 * error(0.5))
  })
})

describe('a normal proposal', () => {
  test('the weighted draws have the variance of the target', () => {
    const { points, logRatios } = normalRatios(1.3, 20_000)
    const { weights } = paretoSmooth(logRatios)
    expect(Math.abs(points.reduce((sum, x, i) => sum + weights[i] * x * x, 0) - 1)).toBeLessThan(0.04)
    expect(Math.abs(points.reduce((sum, x) => sum + x * x, 0) / points.length - 1)).toBeGreaterThan(0.5)
  })

  test('weights sum to 1, keep the order of the ratios, and none exceeds the largest raw one', () => {
    const { logRatios } = normalRatios(0.6, 2000)
    const { weights, effectiveSize, tail } = paretoSmooth(logRatios)
    expect(weights.reduce((sum, weight) => sum + weight, 0)).toBeCloseTo(1, 12)
    const order = [...logRatios.keys()].sort((one, other) => logRatios[one] - logRatios[other])
    order.slice(1).forEach((draw, i) => { expect(weights[draw]).toBeGreaterThanOrEqual(weights[order[i]]) })
    const untouched = order[0]
    const largestRaw = Math.exp(Math.max(...logRatios) - logRatios[untouched]) * weights[untouched]
    expect(Math.max(...weights)).toBeLessThanOrEqual(largestRaw * (1 + 1e-12))
    expect(tail).toBe(Math.ceil(3 * Math.sqrt(2000)))
    expect(effectiveSize).toBeLessThan(2000)
  })
})

test('a constant added to all ratios changes nothing, however large', () => {
  const { logRatios } = normalRatios(0.7, 500)
  const moved = paretoSmooth(logRatios.map((value) => value - 5000))
  paretoSmooth(logRatios).weights.forEach((weight, i) => { expect(moved.weights[i] / weight).toBeCloseTo(1, 9) })
})

test('equal ratios, the proposal being the target: equal weights, nothing to smooth', () => {
  const even = paretoSmooth(new Float64Array(100))
  expect(even).toMatchObject({ paretoK: { value: null, reason: 'flat-tail' }, tail: 0 })
  expect(even.effectiveSize).toBeCloseTo(100, 10)
})

test('one draw that outweighs all others is no flat tail', () => {
  const logRatios = new Float64Array(100).fill(-1000).with(7, 0).with(8, -1)
  expect(paretoSmooth(logRatios)).toMatchObject({ paretoK: { value: null, reason: 'degenerate-tail' }, tail: 0 })
  expect(paretoSmooth(logRatios).effectiveSize).toBeLessThan(2)
})

test('few draws are weighted as they are', () => {
  expect(paretoSmooth(Float64Array.of(0, Math.log(3), -Infinity))).toMatchObject({ paretoK: { value: null, reason: 'too-few-draws' }, tail: 0 })
  const { weights } = paretoSmooth(Float64Array.of(0, Math.log(3), -Infinity))
  for (const [i, expected] of [0.25, 0.75, 0].entries()) expect(weights[i]).toBeCloseTo(expected, 14)
})

test('the limit falls with the number of draws', () => {
  expect(paretoKLimit(100)).toBe(0.5)
  expect(paretoKLimit(1e5)).toBe(0.7)
  expect(() => paretoKLimit(9)).toThrow('9')
})

test('ratios that cannot be are refused by name', () => {
  expect(() => paretoSmooth(Float64Array.of(0, Number.NaN))).toThrow('logRatios[1] NaN')
  expect(() => paretoSmooth(Float64Array.of(Infinity))).toThrow('logRatios[0] Infinity')
  expect(() => paretoSmooth(Float64Array.of(-Infinity))).toThrow('none of 1')
  expect(() => paretoSmooth(Float64Array.of(1), 0)).toThrow('efficiency 0')
})
