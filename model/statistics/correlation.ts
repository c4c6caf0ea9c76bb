import { ModelError } from '../model-error.ts'
import { mean } from './moments.ts'

/**
 * Pearson correlation.
 *
 * @param x - shape (n), finite
 * @param y - shape (n), finite
 * @returns in [-1, 1]; null where there are fewer than two pairs or one of the two does not vary
 * @throws {ModelError} `pairs-differ`, `values-not-finite` (names the index)
 * @see Pearson (1896), Philosophical Transactions A 187:253-318
 * @example correlation(Float64Array.of(1, 2, 3), Float64Array.of(2, 4, 6)) // => 1
 */
export function correlation(x: ArrayLike<number>, y: ArrayLike<number>): number | null {
  if (x.length !== y.length) throw new ModelError('pairs-differ', `Unexpected number of partners ${y.length}, expected ${x.length}`)
  if (x.length < 2) return null
  const [one, other] = [standing(x), standing(y)]
  if (one === null || other === null) return null
  let [squaresX, squaresY, products] = [0, 0, 0]
  for (let i = 0; i < one.length; i += 1) {
    squaresX += one[i] * one[i]
    squaresY += other[i] * other[i]
    products += one[i] * other[i]
  }
  return Math.max(-1, Math.min(1, products / Math.sqrt(squaresX * squaresY)))
}

/** Deviations from the mean in units of the largest, so that no square runs out of range; null where none deviates. */
function standing(values: ArrayLike<number>): Float64Array | null {
  const centre = mean(values)
  const deviations = Float64Array.from(values, (value) => value - centre)
  const largest = deviations.reduce((most, deviation) => Math.max(most, Math.abs(deviation)), 0)
  return largest === 0 ? null : deviations.map((deviation) => deviation / largest)
}
