/** Seeded randomness for the demo data: the same seed gives the same data on every run. */
export interface Draws {
  /** In (0, 1). */
  uniform(): number
  /** Standard normal. */
  normal(): number
  /** 0 .. below - 1. */
  integer(below: number): number
  chance(probability: number): boolean
  pick<T>(items: readonly T[]): T
  /** Index drawn in proportion to weights, shape (n), >= 0 and not all 0. */
  weighted(weights: readonly number[]): number
  poisson(mean: number): number
}

/** A 32-bit xorshift-and-Weyl generator (Marsaglia 2003, Xorshift RNGs, section 3.1) started from one integer. */
export function seededDraws(seed: number): Draws {
  let x = 123456789 ^ seed
  let y = 362436069
  let z = 521288629
  let w = 88675123
  let weyl = 6615241
  const next = (): number => {
    const t = x ^ (x << 11)
    x = y
    y = z
    z = w
    w = w ^ (w >>> 19) ^ t ^ (t >>> 8)
    weyl = (weyl + 362437) | 0
    return (w + weyl) >>> 0
  }
  for (let i = 0; i < 64; i++) next()

  const uniform = (): number => (next() + 0.5) / 4294967296
  const integer = (below: number): number => Math.floor(uniform() * below)
  const normal = (): number => Math.sqrt(-2 * Math.log(uniform())) * Math.cos(2 * Math.PI * uniform())
  const weighted = (weights: readonly number[]): number => {
    let left = uniform() * weights.reduce((sum, weight) => sum + weight, 0)
    for (let i = 0; i < weights.length; i++) {
      left -= weights[i]
      if (left < 0) return i
    }
    return weights.length - 1
  }
  return {
    uniform, normal, integer, weighted,
    chance: (probability) => uniform() < probability,
    pick: (items) => items[integer(items.length)],
    // A rounded normal is close enough to a Poisson count for means of a few dozen and more.
    poisson: (mean) => (mean > 60 ? Math.max(0, Math.round(mean + Math.sqrt(mean) * normal())) : countUntil(mean, uniform)),
  }
}

/** Poisson count by multiplying uniforms (Knuth, The Art of Computer Programming 2, section 3.4.1). */
function countUntil(mean: number, uniform: () => number): number {
  const floor = Math.exp(-mean)
  let count = 0
  for (let product = uniform(); product > floor; product *= uniform()) count += 1
  return count
}
