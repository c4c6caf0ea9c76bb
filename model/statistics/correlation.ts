import { ModelError } from '../model-error.ts'
import type { Decidable } from './decidable.ts'
import { mean } from './moments.ts'
import { twoSidedQuantile, type Interval } from './wilson.ts'

/**
 * Pearson's correlation.
 *
 * @param x - shape (pairs), finite
 * @param y - shape (pairs), finite
 * @returns in [-1, 1]; null where fewer than two pairs, or a side that does not vary, leave it open
 * @throws {ModelError} `pairs-differ`, `values-not-finite` (names the index)
 * @see Pearson (1896), Philosophical Transactions A 187:253-318
 * @example pearson([1, 2, 3], [2, 4, 6]) // => { value: 1 }
 */
export function pearson(x: ArrayLike<number>, y: ArrayLike<number>): Decidable<'too-few-pairs' | 'no-variation'> {
  if (x.length !== y.length) throw new ModelError('pairs-differ', `Unexpected number of partners ${y.length}, expected ${x.length}`)
  if (x.length < 2) return { value: null, reason: 'too-few-pairs' }
  const [one, other] = [standing(x), standing(y)]
  if (one === null || other === null) return { value: null, reason: 'no-variation' }
  let [squaresX, squaresY, products] = [0, 0, 0]
  for (let i = 0; i < one.length; i += 1) {
    squaresX += one[i] * one[i]
    squaresY += other[i] * other[i]
    products += one[i] * other[i]
  }
  return { value: Math.max(-1, Math.min(1, products / Math.sqrt(squaresX * squaresY))) }
}

/** Deviations from the mean in units of the largest, so that no square runs out of range; null where none deviates. */
function standing(values: ArrayLike<number>): Float64Array | null {
  const centre = mean(values)
  const deviations = Float64Array.from(values, (value) => value - centre)
  const largest = deviations.reduce((most, deviation) => Math.max(most, Math.abs(deviation)), 0)
  return largest === 0 ? null : deviations.map((deviation) => deviation / largest)
}

/**
 * Interval for a correlation, symmetric on the scale of its inverse hyperbolic tangent.
 *
 * @param r - in [-1, 1]
 * @param pairs - number of independent pairs, also an effective one; null is returned at 3 or fewer, where there is none
 * @param level - in (0, 1)
 * @throws {ModelError} `correlation-range`, `level-range`
 * @see Fisher (1921), Metron 1:3-32
 * @example fisherInterval(0.5, 3, 0.95) // => null
 */
export function fisherInterval(r: number, pairs: number, level: number): Interval | null {
  if (!(Math.abs(r) <= 1)) throw new ModelError('correlation-range', `Unexpected correlation ${r}, expected one in [-1, 1]`)
  const reach = twoSidedQuantile(level)
  if (!(pairs > 3)) return null
  const half = reach / Math.sqrt(pairs - 3)
  return { low: Math.tanh(Math.atanh(r) - half), high: Math.tanh(Math.atanh(r) + half) }
}
