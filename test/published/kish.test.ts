import { describe, expect, test } from 'vitest'
import { clusterDesignEffect, kishDesignEffect, kishEffectiveSize } from '../../model/statistics/kish.ts'

// DEFF-01. Kish (1965), Survey Sampling; Kish (1992), Weighting for unequal Pi, J. Official Statistics 8:183-200:
// deff = 1 + relvar(w) = n sum(w^2) / (sum w)^2. Printed value found; recomputed in R 4.2.2. Tolerance 1e-12.
const weights = [1, 1, 2, 4]

test('DEFF-01: design effect and effective size of four weights', () => {
  expect(kishDesignEffect(weights)).toBeCloseTo(1.375, 12)
  expect(kishEffectiveSize(weights)).toBeCloseTo(2.90909090909091, 12)
})

test('DEFF-01 can fail: with the last weight 5 both differ', () => {
  expect(Math.abs(kishDesignEffect([1, 1, 2, 5]) - 1.375)).toBeGreaterThan(0.01)
})

// DEFF-03. PracTools vignette "Design Effects and Effective Sample Size" (Zipf and Valliant): 1,000 at a design effect of
// 1.25 are worth 800. Tolerance: exact. Here with weights made to have that effect: a fifth of them 0.
test('DEFF-03: n / deff', () => {
  const thousand = Array.from({ length: 1000 }, (_, i) => (i % 5 === 0 ? 0 : 1))
  expect(kishDesignEffect(thousand)).toBe(1.25)
  expect(kishEffectiveSize(thousand)).toBe(800)
})

// DEFF-04. Kish (1965), section 5.4: deff = 1 + (b - 1) roh; grid as in UN Statistics Division (2008), Designing Household
// Survey Samples: Practical Guidelines, Series F No. 98, chapter 3. Printed value found; recomputed in R 4.2.2. Tolerance 1e-12.
const sizes = [5, 10, 15, 20, 30, 50]
const byRho: readonly (readonly [number, readonly number[]])[] = [
  [0.005, [1.02, 1.045, 1.07, 1.095, 1.145, 1.245]], [0.01, [1.04, 1.09, 1.14, 1.19, 1.29, 1.49]],
  [0.02, [1.08, 1.18, 1.28, 1.38, 1.58, 1.98]], [0.03, [1.12, 1.27, 1.42, 1.57, 1.87, 2.47]],
  [0.04, [1.16, 1.36, 1.56, 1.76, 2.16, 2.96]], [0.05, [1.2, 1.45, 1.7, 1.95, 2.45, 3.45]],
  [0.1, [1.4, 1.9, 2.4, 2.9, 3.9, 5.9]], [0.15, [1.6, 2.35, 3.1, 3.85, 5.35, 8.35]],
  [0.2, [1.8, 2.8, 3.8, 4.8, 6.8, 10.8]], [0.3, [2.2, 3.7, 5.2, 6.7, 9.7, 15.7]],
]

describe('DEFF-04: design effect of clusters', () => {
  test.each(byRho)('roh %d', (rho, row) => {
    row.forEach((expected, i) => { expect(clusterDesignEffect(sizes[i], rho)).toBeCloseTo(expected, 12) })
  })

  test('it can fail: b instead of b - 1 misses every cell of the table', () => {
    for (const [rho, row] of byRho) row.forEach((expected, i) => { expect(Math.abs(clusterDesignEffect(sizes[i] + 1, rho) - expected)).toBeGreaterThan(0.004) })
  })
})
