import { ModelError } from '../model-error.ts'
import type { Generator } from './generator.ts'

/**
 * A Latin hypercube: in every column each of the n strata [i/n, (i+1)/n) holds exactly one point, placed at random in it.
 *
 * @param n - points, at least 1
 * @param d - dimensions, at least 1
 * @param generator - moved on
 * @returns row-major, shape (n x d), in (0, 1)
 * @throws {ModelError} `hypercube-shape`
 * @see McKay, Beckman and Conover (1979), Technometrics 21:239-245
 * @example latinHypercube(1, 2, createGenerator(1, 0)).length // => 2
 */
export function latinHypercube(n: number, d: number, generator: Generator): Float64Array {
  if (!Number.isInteger(n) || !Number.isInteger(d) || n < 1 || d < 1) {
    throw new ModelError('hypercube-shape', `Unexpected shape ${n} x ${d}, expected whole numbers of at least 1`)
  }
  const points = new Float64Array(n * d)
  const strata = new Float64Array(n)
  for (let column = 0; column < d; column += 1) {
    for (let i = 0; i < n; i += 1) strata[i] = i
    generator.shuffle(strata)
    for (let row = 0; row < n; row += 1) points[row * d + column] = insideStratum(strata[row], generator.uniform(), n)
  }
  return points
}

/** Adding may round up to the next stratum, or to 1, which no quantile function takes: then the largest value below. */
function insideStratum(stratum: number, jitter: number, n: number): number {
  const point = (stratum + jitter) / n
  const next = (stratum + 1) / n
  return point < next ? point : next * (1 - Number.EPSILON / 2)
}
