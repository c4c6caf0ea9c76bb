import { describe, expect, test } from 'vitest'
import { costAllocation, neymanAllocation } from '../../model/statistics/allocation.ts'

describe('ALLOC-01: a hundred interviews over six strata', () => {
  // Cochran (1977), Sampling Techniques, chapter 5; Valliant, Dever and Kreuter (2018), Practical Tools for Designing and Weighting Survey Samples, chapter 3;
  // R package PracTools, vignette, strAlloc(alloc = "neyman"). Printed value found; recomputed in R 4.2.2. 1e-6; standard error within 1.
  const sizes = [215, 65, 252, 50, 149, 144]
  const sds = [26787207, 10645109, 6909676, 11085034, 9817762, 44553355]
  const found = neymanAllocation(sizes, sds, 100)
  const population = sizes.reduce((a, b) => a + b, 0)
  /** Standard error of the stratified mean, with the finite population correction (Cochran 1977, section 5.3). */
  const standardError = (allocation: ArrayLike<number>) =>
    Math.sqrt(sizes.reduce((sum, size, h) => sum + (size / population) ** 2 * (1 - allocation[h] / size) * (sds[h] ** 2 / allocation[h]), 0))

  test('interviews, and the standard error that goes with them', () => {
    ;[34.641683, 4.161947, 10.473487, 3.333804, 8.79897, 38.590108].forEach((printed, h) => { expect(Math.abs(found[h] - printed)).toBeLessThan(1e-6) })
    ;[34.6416828348418, 4.16194710977725, 10.4734873315489, 3.33380444542347, 8.79897037998571, 38.5901078984229].forEach((exact, h) => { expect(Math.abs(found[h] - exact)).toBeLessThan(1e-10) })
    expect(Math.abs(standardError(found) - 1727173)).toBeLessThan(1)
    expect(Math.abs(standardError(found) - 1727172.85682714)).toBeLessThan(1e-3)
  })

  test('it can fail: in proportion to size alone', () => {
    const proportional = neymanAllocation(sizes, sizes.map(() => 1), 100)
    ;[24.5714285714286, 7.42857142857143, 28.8, 5.71428571428571, 17.0285714285714, 16.4571428571429].forEach((exact, h) => { expect(Math.abs(proportional[h] - exact)).toBeLessThan(1e-10) })
    expect(standardError(proportional) - 1727173).toBeGreaterThan(100_000)
  })
})

describe('ALLOC-03: hours of television, three strata, interviews of unequal cost', () => {
  // Scheaffer, Mendenhall and Ott, Elementary Survey Sampling, chapter on stratified sampling (in the version of a course handout): weights 2583.33, 3100, 2325.
  // Printed value found; recomputed in R 4.2.2. 0.01 against the printed weights, 1e-9 against exact.
  const [sizes, sds, costs] = [[1550, 620, 930], [5, 15, 10], [9, 9, 16]]
  const found = costAllocation(sizes, sds, costs, 58)

  test('interviews, and weights as printed', () => {
    ;[18.7096774193548, 22.4516129032258, 16.8387096774194].forEach((exact, h) => { expect(Math.abs(found[h] - exact)).toBeLessThan(1e-9) })
    ;[2583.33, 3100, 2325].forEach((printed, h) => { expect(Math.abs(costAllocation(sizes, sds, costs, 2583.33 + 3100 + 2325)[h] - printed)).toBeLessThan(0.01) })
  })

  test('it can fail: without the costs it is Neyman\'s', () => {
    ;[17.0588235294118, 20.4705882352941, 20.4705882352941].forEach((exact, h) => { expect(Math.abs(neymanAllocation(sizes, sds, 58)[h] - exact)).toBeLessThan(1e-9) })
    expect(Math.abs(found[2] - neymanAllocation(sizes, sds, 58)[2])).toBeGreaterThan(3)
  })
})
