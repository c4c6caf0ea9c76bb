import { describe, expect, test } from 'vitest'
import { bulkEffectiveSize, meanEffectiveSize, tailEffectiveSize } from '../../../model/diagnostics/effective-size.ts'
import { independentDraws } from '../../../model/diagnostics/independent-draws.ts'
import { autoregression } from './simulated-chains.ts'

const figure = (diagnostic: { readonly value: number | null }) => diagnostic.value ?? Number.NaN

describe('first-order autoregression, whose effective size is known', () => {
  test.each([-0.5, 0, 0.5, 0.9])('coefficient %d: within 10 % on 4 x 20,000 draws', (phi) => {
    const expected = (80_000 * (1 - phi)) / (1 + phi)
    const chains = autoregression(phi, 4, 20_000, 61)
    expect(Math.abs(figure(meanEffectiveSize(chains)) / expected - 1)).toBeLessThan(0.1)
    expect(Math.abs(figure(bulkEffectiveSize(chains)) / expected - 1)).toBeLessThan(0.1)
  })

  test('it can fail: a coefficient of 0.6 is not taken for 0.5', () => {
    const expected = (80_000 * 0.5) / 1.5
    expect(Math.abs(figure(meanEffectiveSize(autoregression(0.6, 4, 20_000, 61))) / expected - 1)).toBeGreaterThan(0.2)
  })
})

test('the bulk does not depend on a rising transformation, the size for the mean does', () => {
  const chains = autoregression(0.5, 2, 2000, 62)
  const raised = chains.map((chain) => chain.map((value) => Math.exp(3 * value)))
  expect(figure(bulkEffectiveSize(raised))).toBe(figure(bulkEffectiveSize(chains)))
  expect(figure(meanEffectiveSize(raised))).not.toBeCloseTo(figure(meanEffectiveSize(chains)), 0)
})

test('the tail is that of the poorer end', () => {
  const chains = autoregression(0.3, 4, 1000, 63)
  const stuck = chains.map((chain) => chain.map((value, i) => (i % 100 < 5 ? 5 + value / 100 : Math.min(value, 4))))
  expect(figure(tailEffectiveSize(stuck))).toBeLessThan(0.6 * figure(bulkEffectiveSize(stuck)))
  expect(figure(tailEffectiveSize(chains.map((chain) => chain.map((value) => -value))))).toBeGreaterThan(0)
  expect(figure(tailEffectiveSize(chains, 0.5))).not.toBe(figure(tailEffectiveSize(chains)))
})

test('alternating chains are worth more than their number, though no more than S log10(S)', () => {
  const chains = [Float64Array.from({ length: 1000 }, (_, i) => (i % 2 === 0 ? 1 : -1) + i * 1e-9)]
  expect(independentDraws(chains)).toBe(1000 * Math.log10(1000))
})

test('too few draws, or an end that nothing lies beyond, leave it open', () => {
  expect(bulkEffectiveSize([Float64Array.from({ length: 11 }, (_, i) => i)])).toEqual({ value: null, reason: 'too-few-draws' })
  const mostlyOne = [Float64Array.from({ length: 100 }, (_, i) => (i === 50 ? 0 : 1))]
  expect(tailEffectiveSize(mostlyOne)).toEqual({ value: null, reason: 'constant' })
})
