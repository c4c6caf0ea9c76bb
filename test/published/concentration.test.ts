import { describe, expect, test } from 'vitest'
import { concentrationOf, topShare } from '../../model/statistics/concentration.ts'
import { sizeCounts } from '../model/statistics/size-counts.ts'

const of = (sizes: readonly number[]) => concentrationOf(sizeCounts(sizes))

describe('CON-01: ten incomes', () => {
  // Cowell (2000), example data; R package ineq, help of ineq. Printed value partly from memory; reproduced by computation
  // in R 4.2.2. Tolerance 1e-10. (Atkinson and Theil indices of the same check are no part of a review.)
  const incomes = [541, 1463, 2445, 3438, 4437, 5401, 6392, 8304, 11904, 22261]

  test('Gini coefficient, and the inverse of the Herfindahl index', () => {
    expect(of(incomes)?.gini).toBeCloseTo(0.462091130267624, 10)
    expect(1 / (of(incomes)?.effectiveAuthors ?? 0)).toBeCloseTo(0.184081230915485, 10)
  })

  test('it can fail: the small-sample correction n / (n - 1) is not applied', () => {
    expect(of(incomes)?.gini).not.toBeCloseTo(0.513434589186249, 3)
  })
})

describe('CON-02: edge cases', () => {
  // Definition G = sum over pairs of |x_i - x_j| / (2 n^2 mean). Confirmed by arithmetic. Tolerance 1e-12.
  const posts = [1, 1, 1, 2, 2, 3, 5, 10, 25, 150]

  test.each([[[5, 5, 5, 5], 0], [[0, 0, 0, 10], 0.75], [posts, 0.782]])('Gini coefficient of %j is %d', (sizes, expected) => {
    expect(of(sizes)?.gini).toBeCloseTo(expected, 12)
  })

  test('share of the most prolific tenth', () => { expect(topShare(sizeCounts(posts), 10)).toBeCloseTo(0.75, 12) })

  test('it can fail: one post more by the last author', () => {
    expect(Math.abs((of([...posts.slice(0, -1), 151])?.gini ?? 0) - 0.782)).toBeGreaterThan(1e-4)
  })
})

describe('CON-04: three counts', () => {
  // Simpson (1949), Nature 163:688; Hill (1973), Ecology 54:427-432. Confirmed by arithmetic. Tolerance 1e-12.
  test('inverse Simpson', () => { expect(of([50, 30, 20])?.effectiveAuthors).toBeCloseTo(2.63157894736842, 12) })

  test('it can fail: the unbiased form, without replacement, is another figure', () => {
    expect(of([50, 30, 20])?.effectiveAuthors).not.toBeCloseTo(1 / (1 - 0.626262626262626), 2)
  })
})
