import fc from 'fast-check'
import { expect, test } from 'vitest'
import { midpointSplit, midpointSplits, type WeightedMean } from '../../../model/statistics/kitagawa.ts'

const factor = (groups: number): fc.Arbitrary<WeightedMean> => fc.record({
  shares: fc.array(fc.integer({ min: 1, max: 100 }), { minLength: groups, maxLength: groups }).map((x) => x.map((v) => v / x.reduce((a, b) => a + b, 0))),
  rates: fc.array(fc.double({ min: -1, max: 1, noNaN: true }), { minLength: groups, maxLength: groups }),
})
const meanOf = ({ shares, rates }: WeightedMean) => Array.from(shares).reduce((sum, share, i) => sum + share * rates[i], 0)

test('the parts sum to the change; read backwards they change sign', () => {
  fc.assert(fc.property(factor(6), factor(6), (before, after) => {
    const forward = midpointSplit(before, after)
    const backward = midpointSplit(after, before)
    expect(forward.composition + forward.rate).toBeCloseTo(meanOf(after) - meanOf(before), 14)
    expect(backward.composition).toBeCloseTo(-forward.composition, 14)
    expect(forward.compositionByGroup.reduce((sum, part) => sum + part, 0)).toBeCloseTo(forward.composition, 14)
    expect(forward.rateByGroup.reduce((sum, part) => sum + part, 0)).toBeCloseTo(forward.rate, 14)
  }))
})

test('composition does not depend on the zero of the rates, as long as shares sum alike', () => {
  fc.assert(fc.property(factor(4), factor(4), (before, after) => {
    const raised = (mean: WeightedMean) => ({ ...mean, rates: Array.from(mean.rates, (rate) => rate + 3) })
    expect(midpointSplit(raised(before), raised(after)).composition).toBeCloseTo(midpointSplit(before, after).composition, 13)
  }))
})

test('only the mix moves: all is composition; only rates move: all is rate', () => {
  const [before, after] = [{ shares: [0.5, 0.5], rates: [1, 3] }, { shares: [0.2, 0.8], rates: [2, 5] }]
  expect(midpointSplit(before, { ...before, shares: after.shares })).toMatchObject({ rate: 0, composition: 0.6000000000000001 })
  expect(midpointSplit(before, { ...before, rates: after.rates })).toMatchObject({ rate: 1.5, composition: 0 })
})

test('it can fail: weighting rates by the old shares alone leaves a remainder', () => {
  const [before, after] = [{ shares: [0.5, 0.5], rates: [1, 3] }, { shares: [0.2, 0.8], rates: [2, 5] }]
  const rateAtOldShares = 0.5 * (2 - 1) + 0.5 * (5 - 3)
  expect(midpointSplit(before, after).composition + rateAtOldShares).not.toBeCloseTo(meanOf(after) - meanOf(before), 3)
})

test('several additive factors: all parts sum to the change', () => {
  fc.assert(fc.property(fc.tuple(factor(5), factor(6), factor(3)), fc.tuple(factor(5), factor(6), factor(3)), (before, after) => {
    const parts = midpointSplits(before, after)
    const change = after.reduce((sum, mean) => sum + meanOf(mean), 0) - before.reduce((sum, mean) => sum + meanOf(mean), 0)
    expect(parts.reduce((sum, part) => sum + part.composition + part.rate, 0)).toBeCloseTo(change, 13)
  }))
})

test('groups that do not match are refused by name', () => {
  const two = { shares: [0.5, 0.5], rates: [1, 2] }
  expect(() => midpointSplit(two, { shares: [1], rates: [1] })).toThrow('after.shares 1')
  expect(() => midpointSplit(two, { shares: [0.5, 0.5], rates: [1, Number.NaN] })).toThrow('after.rates[1] NaN')
  expect(() => midpointSplits([two], [])).toThrow('0 after')
})
