import { describe, expect, test } from 'vitest'
import { plainSplitRhat, splitRhat } from '../../../model/diagnostics/split-rhat.ts'
import { createGenerator } from '../../../model/random/generator.ts'
import { autoregression } from './simulated-chains.ts'

const independent = autoregression(0, 4, 1000, 51)
const rhat = (chains: readonly Float64Array[]) => splitRhat(chains).value ?? Number.NaN

describe('what R-hat is to see', () => {
  test('chains that agree are close to 1', () => { expect(Math.abs(rhat(independent) - 1)).toBeLessThan(0.005) })

  test.each<[string, (value: number, chain: number, draw: number) => number]>([
    ['one chain elsewhere', (value, chain) => (chain === 2 ? value + 1 : value)],
    ['one chain wider', (value, chain) => (chain === 2 ? value * 4 : value)],
    ['a common trend', (value, _, draw) => value + draw / 500],
  ])('%s', (_, change) => {
    expect(rhat(independent.map((chain, i) => chain.map((value, draw) => change(value, i, draw))))).toBeGreaterThan(1.05)
  })

  test('a single chain with a trend, too', () => {
    expect(rhat([independent[0].map((value, draw) => value + draw / 300)])).toBeGreaterThan(1.05)
    expect(rhat([independent[0]])).toBeLessThan(1.01)
  })

  test('an infinite mean hides a shift from the plain form, not from ranks', () => {
    const cauchy = Array.from({ length: 4 }, (_, stream) => {
      const generator = createGenerator(52, stream)
      return Float64Array.from({ length: 1000 }, () => generator.normal() / generator.normal() + (stream === 0 ? 2 : 0))
    })
    expect(rhat(cauchy)).toBeGreaterThan(1.05)
    expect(plainSplitRhat(cauchy).value).toBeLessThan(1.02)
  })
})

test('two-valued draws fold to a constant: location alone decides', () => {
  const coin = independent.map((chain) => chain.map((value) => (value > 0 ? 1 : -1)))
  expect(rhat(coin)).toBeLessThan(1.01)
})

test('halves that stand still, each elsewhere, leave it open', () => {
  expect(plainSplitRhat([Float64Array.of(1, 1, 2, 2)])).toEqual({ value: null, reason: 'constant' })
  expect(splitRhat([Float64Array.of(1, 1, 2, 2)])).toEqual({ value: null, reason: 'constant' })
  expect(splitRhat([Float64Array.of(1, 2, 3)])).toEqual({ value: null, reason: 'too-few-draws' })
})
