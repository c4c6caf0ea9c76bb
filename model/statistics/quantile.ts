import { ModelError } from '../model-error.ts'
import { requireFinite } from './moments.ts'
import { select } from './select.ts'

/**
 * Quantile of values in ascending order: linear between order statistics, (n - 1) p steps up from the smallest.
 *
 * @param sorted - shape (n), n >= 1, ascending, finite
 * @param p - in [0, 1]
 * @throws {ModelError} `values-too-few`, `probability-range`
 * @see Hyndman and Fan (1996), American Statistician 50:361-365, definition 7
 * @example sortedQuantile([1, 2, 4], 0.75) // => 3
 */
export function sortedQuantile(sorted: ArrayLike<number>, p: number): number {
  const { below, fraction } = position(sorted.length, p)
  return fraction === 0 ? sorted[below] : between(sorted[below], sorted[below + 1], fraction)
}

/**
 * The same of values in any order, which are left as they are.
 *
 * @param values - shape (n), n >= 1, finite
 * @param probabilities - shape (m), each in [0, 1]
 * @returns shape (m)
 * @throws {ModelError} `values-not-finite` (names the index), `values-too-few`, `probability-range`
 * @example [...quantiles([4, 1, 2], [0, 0.5])] // => [1, 2]
 */
export function quantiles(values: ArrayLike<number>, probabilities: ArrayLike<number>): Float64Array {
  requireFinite(values, 'values')
  const sorted = Float64Array.from(values).sort()
  return Float64Array.from(probabilities, (p) => sortedQuantile(sorted, p))
}

/**
 * The quantile at one p, by selection: linear in n where sorting is not. The values are reordered, so that all up to
 * the returned `below` are at most those behind it; a later call for a larger p may start there.
 *
 * @param scratch - shape (n), finite, reordered in place
 * @param from - everything before this index is known to be no larger than everything after it
 */
export function selectQuantile(scratch: Float64Array, p: number, from = 0): { readonly value: number; readonly below: number } {
  const { below, fraction } = position(scratch.length, p)
  select(scratch, below, from, scratch.length - 1)
  if (fraction === 0) return { value: scratch[below], below }
  let above = scratch[below + 1]
  for (let i = below + 2; i < scratch.length; i += 1) if (scratch[i] < above) above = scratch[i]
  return { value: between(scratch[below], above, fraction), below }
}

const between = (lower: number, upper: number, fraction: number) => lower + fraction * (upper - lower)

function position(n: number, p: number): { readonly below: number; readonly fraction: number } {
  if (n < 1) throw new ModelError('values-too-few', 'Unexpected number of values 0, expected at least 1')
  if (!(p >= 0 && p <= 1)) throw new ModelError('probability-range', `Unexpected probability ${p}, expected one in [0, 1]`)
  const exact = (n - 1) * p
  const below = Math.floor(exact)
  return { below, fraction: exact - below }
}
