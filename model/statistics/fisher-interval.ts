import { ModelError } from '../model-error.ts'
import { twoSidedQuantile, type Interval } from './wilson.ts'

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
