import { ModelError } from '../model-error.ts'
import { normalQuantile } from './normal.ts'

export interface Interval {
  readonly low: number
  readonly high: number
}

/**
 * Interval for a proportion that stays inside [0, 1] and holds its level in small samples: the score test inverted,
 * without continuity correction.
 *
 * @param successes - in [0, n]; need not be whole where n is an effective size
 * @param n - above 0
 * @param level - in (0, 1)
 * @throws {ModelError} `proportion-invalid`, `level-range`
 * @see Wilson (1927), JASA 22:209-212; Newcombe (1998), Statistics in Medicine 17:857-872, method 3
 * @example wilsonInterval(0, 20, 0.95).low // => 0
 */
export function wilsonInterval(successes: number, n: number, level: number): Interval {
  if (!(n > 0 && n < Infinity && successes >= 0 && successes <= n)) {
    throw new ModelError('proportion-invalid', `Unexpected ${successes} of ${n}, expected a part of a finite number above 0`)
  }
  const z = twoSidedQuantile(level)
  const failures = n - successes
  const spread = z * Math.sqrt((successes * failures) / n + (z * z) / 4)
  // Where all or none succeed the bound on that side is the proportion itself, which rounding would miss.
  return {
    low: successes === 0 ? 0 : (successes + (z * z) / 2 - spread) / (n + z * z),
    high: failures === 0 ? 1 : (successes + (z * z) / 2 + spread) / (n + z * z),
  }
}

/**
 * Standard normal deviate that holds `level` between itself and its negative.
 *
 * @param level - in (0, 1)
 * @throws {ModelError} `level-range`
 */
export function twoSidedQuantile(level: number): number {
  if (!(level > 0 && level < 1)) throw new ModelError('level-range', `Unexpected level ${level}, expected one in (0, 1)`)
  return -normalQuantile((1 - level) / 2)
}
