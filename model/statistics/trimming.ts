import { ModelError } from '../model-error.ts'
import { ascendingRoot } from './ascending-root.ts'

export interface WeightBounds {
  /** >= 0 */
  readonly lower: number
  /** Above `lower`; may be infinite. */
  readonly upper: number
}

/**
 * Weights cut to bounds, their sum kept: what is cut off is spread equally over the others, and if that carries one of
 * them past a bound, it too is held there.
 *
 * @param weights - shape (rows), finite, >= 0
 * @param counts - shape (rows): respondents of each weight, finite, >= 0
 * @param bounds - of a weight; the mean weight must lie between them, or they could not hold
 * @returns shape (rows)
 * @throws {ModelError} `trim-bounds`
 * @see Potter (1990), A study of procedures to identify and trim extreme sampling weights, ASA Survey Research Methods (from memory); the
 *   rule of trimWeights in Lumley's R package survey with strict = TRUE
 * @example [...trimWeights([1, 1, 7], [1, 1, 1], { lower: 0, upper: 5 })] // => [2, 2, 5]
 */
export function trimWeights(weights: ArrayLike<number>, counts: ArrayLike<number>, { lower, upper }: WeightBounds): Float64Array {
  const { size, total, smallest, largest } = spanOf(weights, counts)
  const mean = total / size
  if (!(lower >= 0 && lower < upper && mean >= lower && mean <= upper)) {
    throw new ModelError('trim-bounds', `Unexpected bounds [${lower}, ${upper}], expected ascending ones with the mean weight ${mean} between them`)
  }
  const shift = ascendingRoot((by) => {
    let [sum, free] = [0, 0]
    for (let i = 0; i < weights.length; i += 1) {
      const weight = clipped(weights[i] + by, lower, upper)
      sum += counts[i] * weight
      if (weight > lower && weight < upper) free += counts[i]
    }
    return { value: sum - total, slope: free }
  }, mean - largest, mean - smallest, 0)
  return Float64Array.from(weights, (weight) => clipped(weight + shift, lower, upper))
}

/**
 * The nearest value within bounds.
 *
 * @example clipped(7, 0, 5) // => 5
 */
export const clipped = (value: number, lower: number, upper: number) => (value < lower ? lower : value > upper ? upper : value)

/** Of the rows with anyone in them. */
function spanOf(weights: ArrayLike<number>, counts: ArrayLike<number>) {
  let [size, total, smallest, largest] = [0, 0, Infinity, 0]
  for (let i = 0; i < weights.length; i += 1) {
    if (!(counts[i] > 0)) continue
    size += counts[i]
    total += counts[i] * weights[i]
    smallest = Math.min(smallest, weights[i])
    largest = Math.max(largest, weights[i])
  }
  return { size, total, smallest, largest }
}
