import { describe, expect, test } from 'vitest'
import { midpointSplit } from '../../model/statistics/kitagawa.ts'

const crude = (shares: readonly number[], rates: readonly number[]) => shares.reduce((sum, share, i) => sum + share * rates[i], 0)

describe('DEC-01: earnings of black and white men, United States 1980', () => {
  // Das Gupta (1993), Standardization and Decomposition of Rates: A User's Manual, US Census Bureau P23-186, Table 2.1, the
  // same arithmetic as Kitagawa (1955), JASA 50:1168-1194, with one group: earners per person as share, earnings per earner
  // as rate. Printed value found; recomputed in R 4.2.2. Tolerance 5e-4.
  const split = midpointSplit({ shares: [0.717892], rates: [10930] }, { shares: [0.825974], rates: [16591] })

  test('effects, and their part of the difference in percent', () => {
    expect(Math.abs(split.rate - 4369.913)).toBeLessThan(5e-4)
    expect(Math.abs(split.composition - 1487.262)).toBeLessThan(5e-4)
    expect((100 * split.rate) / (split.rate + split.composition)).toBeCloseTo(74.61, 2)
    expect(Math.abs(split.rate + split.composition - 5857.175)).toBeLessThan(5e-4)
  })

  test('it can fail: at the old share alone the effect of earnings is another', () => {
    expect(Math.abs((16591 - 10930) * 0.717892 - 4369.913)).toBeGreaterThan(100)
  })
})

describe('DEC-02: household headship, United States 1970 and 1985', () => {
  // Das Gupta (1993), Table 5.1; formula Kitagawa (1955). Printed value found; recomputed in R 4.2.2. Tolerance 5e-5.
  const share1970 = [12.9, 10.9, 9.5, 8, 7.8, 8.4, 8.6, 7.8, 7, 5.9, 4.7, 3.6, 4.9].map((percent) => percent / 100)
  const share1985 = [10.1, 11.2, 11.6, 10.9, 9.4, 7.7, 6.3, 6, 6.3, 5.9, 5.1, 4, 5.5].map((percent) => percent / 100)
  const rate1970 = [1.9, 25.8, 45.7, 49.6, 51.2, 51.6, 51.8, 54.9, 58.7, 60.4, 62.8, 66.6, 66.8]
  const rate1985 = [2.2, 24.3, 45.8, 52.5, 56.1, 55.6, 56, 57.4, 57.2, 61.2, 63.9, 68.6, 72.2]
  const rateByGroup = [0.0345, -0.16575, 0.0105499999999994, 0.27405, 0.4214, 0.322, 0.3129, 0.1725, -0.09975, 0.0472000000000003, 0.0539000000000001, 0.076, 0.2808]
  const compositionByGroup = [-0.0574, 0.0751499999999997, 0.96075, 1.48045, 0.8584, -0.3752, -1.2397, -1.0107, -0.40565, 0, 0.2534, 0.2704, 0.417]
  const split = midpointSplit({ shares: share1970, rates: rate1970 }, { shares: share1985, rates: rate1985 })

  test('crude rates as printed', () => {
    expect(Math.abs(crude(share1970, rate1970) - 44.7268)).toBeLessThan(5e-5)
    expect(Math.abs(crude(share1985, rate1985) - 47.694)).toBeLessThan(5e-5)
  })

  test('composition and rate, in total and by group', () => {
    expect(Math.abs(split.composition - 1.2269)).toBeLessThan(5e-5)
    expect(Math.abs(split.rate - 1.7403)).toBeLessThan(5e-5)
    expect((100 * split.composition) / 2.9672).toBeCloseTo(41.35, 2)
    rateByGroup.forEach((expected, i) => { expect(Math.abs(split.rateByGroup[i] - expected)).toBeLessThan(5e-5) })
    compositionByGroup.forEach((expected, i) => { expect(Math.abs(split.compositionByGroup[i] - expected)).toBeLessThan(5e-5) })
  })

  test('it can fail: two groups of rates exchanged', () => {
    const exchanged = rate1985.with(1, rate1985[2]).with(2, rate1985[1])
    expect(Math.abs(midpointSplit({ shares: share1970, rates: rate1970 }, { shares: share1985, rates: exchanged }).rate - 1.7403)).toBeGreaterThan(1e-3)
  })
})

describe('DEC-06: the mix moves against rising scores', () => {
  // Hand example of the formulas of Kitagawa (1955). Confirmed by arithmetic. Tolerance 1e-12.
  const before = { shares: [0.5, 0.3, 0.2], rates: [60, 40, 20] }
  const after = { shares: [0.3, 0.3, 0.4], rates: [55, 45, 25] }

  test('mix -7, within +1, together -6', () => {
    const { composition, rate } = midpointSplit(before, after)
    expect(composition).toBeCloseTo(-7, 12)
    expect(rate).toBeCloseTo(1, 12)
    expect(crude(after.shares, after.rates) - crude(before.shares, before.rates)).toBeCloseTo(-6, 12)
  })

  test('it can fail: mix at the old scores is -8', () => {
    expect(midpointSplit(before, { ...after, rates: before.rates }).composition).toBeCloseTo(-8, 12)
  })
})
