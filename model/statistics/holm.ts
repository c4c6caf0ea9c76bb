import { ModelError } from '../model-error.ts'

/**
 * P-values adjusted for their number, so that refusing those at or below alpha errs anywhere with probability alpha at
 * most, however they depend on each other.
 *
 * @param pValues - shape (tests), each in [0, 1]
 * @returns shape (tests), in the order given, in [0, 1]
 * @throws {ModelError} `p-invalid` (names the index)
 * @see Holm (1979), Scandinavian J. of Statistics 6:65-70
 * @example [...holmAdjusted([0.5, 0.01])] // => [0.5, 0.02]
 */
export function holmAdjusted(pValues: ArrayLike<number>): Float64Array {
  const tests = pValues.length
  for (let i = 0; i < tests; i += 1) {
    if (!(pValues[i] >= 0 && pValues[i] <= 1)) throw new ModelError('p-invalid', `Unexpected pValues[${i}] ${pValues[i]}, expected one in [0, 1]`)
  }
  const order = Array.from({ length: tests }, (_, i) => i).sort((one, other) => pValues[one] - pValues[other])
  const adjusted = new Float64Array(tests)
  let largest = 0
  for (const [rank, test] of order.entries()) {
    largest = Math.min(1, Math.max(largest, (tests - rank) * pValues[test]))
    adjusted[test] = largest
  }
  return adjusted
}
