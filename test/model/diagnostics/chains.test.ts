import { describe, expect, test } from 'vitest'
import { foldChains, rankNormalise, splitChains, whyUndecided } from '../../../model/diagnostics/chains.ts'
import { normalQuantile } from '../../../model/statistics/normal.ts'

const lists = (chains: readonly Float64Array[]) => chains.map((chain) => [...chain])

test('halves: an odd middle draw belongs to neither', () => {
  expect(lists(splitChains([Float64Array.of(1, 2, 3, 4, 5)]))).toEqual([[1, 2], [4, 5]])
  expect(lists(splitChains([Float64Array.of(1, 2), Float64Array.of(3, 4)]))).toEqual([[1], [2], [3], [4]])
})

describe('folding', () => {
  test('about the middle draw, or between the middle two', () => {
    expect(lists(foldChains([Float64Array.of(5, 1, 2)]))).toEqual([[3, 1, 0]])
    expect(lists(foldChains([Float64Array.of(5, 1), Float64Array.of(2, 3)]))).toEqual([[2.5, 1.5], [0.5, 0.5]])
  })

  test('the middle two tie whatever their rounding, where distances from the median itself would not', () => {
    const [low, high] = [4.17753676756877, 4.26930915345846]
    const median = (low + high) / 2
    expect(Math.abs(low - median)).not.toBe(Math.abs(high - median))
    const [folded] = foldChains([Float64Array.of(low, -9, high, 9)])
    expect(folded[0]).toBe(folded[2])
  })
})

describe('rank normalising', () => {
  test('ties share their mean rank; the scores are those of Blom', () => {
    const [[a, b], [c, d]] = lists(rankNormalise([Float64Array.of(7, 1), Float64Array.of(7, 9)]))
    expect([a, b, c, d]).toEqual([2.5, 1, 2.5, 4].map((rank) => normalQuantile((rank - 0.375) / 4.25)))
  })

  test('any rising transformation gives the same scores; it can fail: a folding one does not', () => {
    const x = [Float64Array.of(-3, 0.5, 2), Float64Array.of(1, -0.2, 8)]
    expect(lists(rankNormalise(x.map((chain) => chain.map(Math.exp))))).toEqual(lists(rankNormalise(x)))
    expect(lists(rankNormalise(x.map((chain) => chain.map(Math.abs))))).not.toEqual(lists(rankNormalise(x)))
  })
})

test('minus zero and zero are one value', () => {
  const [scores] = rankNormalise([Float64Array.of(0, -0, 1)])
  expect(scores[0]).toBe(scores[1])
})

test('chains that cannot be compared are refused; what leaves a figure open is a reason', () => {
  const chain = Float64Array.of(1, 2, 3, 4)
  expect(() => whyUndecided([], 4)).toThrow('0')
  expect(() => whyUndecided([chain, chain.subarray(1)], 4)).toThrow('chains[1] 3')
  expect(whyUndecided([chain], 5)).toBe('too-few-draws')
  expect(whyUndecided([chain.with(2, Infinity)], 4)).toBe('not-finite')
  expect(whyUndecided([new Float64Array(4), new Float64Array(4).fill(1)], 4)).toBe('constant')
  expect(whyUndecided([chain], 4)).toBeNull()
})
