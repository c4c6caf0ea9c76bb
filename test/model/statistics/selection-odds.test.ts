import fc from 'fast-check'
import { expect, test } from 'vitest'
import { changeUnderRatio, tippingRatio } from '../../../model/statistics/selection-odds.ts'

const opinion = fc.double({ min: -0.99, max: 0.99, noNaN: true })
const ratios = fc.double({ min: 0.05, max: 20, noNaN: true })

test('at the tipping ratio nothing is left of the change; at 1 all of it', () => {
  fc.assert(fc.property(opinion, opinion, (before, after) => {
    expect(Math.abs(changeUnderRatio(before, after, tippingRatio(before, after).value!).value!)).toBeLessThan(1e-12)
    expect(changeUnderRatio(before, after, 1).value).toBeCloseTo(after - before, 12)
  }))
})

test('who hears the unhappy r times as often is put right: simulated by counting', () => {
  fc.assert(fc.property(opinion, opinion, ratios, (before, truth, ratio) => {
    const [content, unhappy] = [(1 + truth) / 2, (ratio * (1 - truth)) / 2]
    const heard = (content - unhappy) / (content + unhappy)
    expect(changeUnderRatio(before, heard, ratio).value).toBeCloseTo(truth - before, 10)
    expect(tippingRatio(truth, heard).value! / ratio).toBeCloseTo(1, 8)
  }))
})

test('the change left rises with the ratio; back and forth the tipping ratio is inverted', () => {
  fc.assert(fc.property(opinion, opinion, ratios, (before, after, ratio) => {
    expect(changeUnderRatio(before, after, ratio * 1.01).value!).toBeGreaterThan(changeUnderRatio(before, after, ratio).value!)
    expect(tippingRatio(before, after).value! * tippingRatio(after, before).value!).toBeCloseTo(1, 10)
    if (Math.abs(after - before) > 1e-9) expect(tippingRatio(before, after).value! > 1).toBe(after < before)
  }))
})

test('by hand: 75 % content heard as 50 %: odds 3 to 1', () => { expect(tippingRatio(0.5, 0).value).toBe(3) })

test('draws off the scale are left open, ratios that are none refused', () => {
  for (const [before, after] of [[1, 0], [0, -1], [1.1, 0], [0, Number.NaN]]) expect(tippingRatio(before, after)).toEqual({ value: null, reason: 'off-scale' })
  expect(changeUnderRatio(0, 1.01, 2)).toEqual({ value: null, reason: 'off-scale' })
  expect(changeUnderRatio(1, -1, 2)).toEqual({ value: -2 })
  for (const ratio of [0, -1, Infinity, Number.NaN]) expect(() => changeUnderRatio(0, 0, ratio)).toThrow(`ratio ${ratio}`)
})
