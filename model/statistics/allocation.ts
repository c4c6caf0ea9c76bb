import { ModelError } from '../model-error.ts'

/**
 * How to spread n interviews over strata for the most precise mean of all: in proportion to size times standard deviation.
 * Numbers are left unrounded, and not held to the size of a stratum.
 *
 * @param sizes - shape (strata), or shares of the population; finite, >= 0
 * @param sds - shape (strata): standard deviation inside each; finite, >= 0
 * @param n - interviews in all, finite, >= 0
 * @returns shape (strata), summing to n
 * @throws {ModelError} `strata-differ`, `stratum-invalid` (names the figure), `strata-empty` (no stratum has size and deviation)
 * @see Neyman (1934), J. Royal Statistical Society 97:558-625; Cochran (1977), Sampling Techniques, section 5.5
 * @example [...neymanAllocation([30, 10], [1, 1], 8)] // => [6, 2]
 */
export function neymanAllocation(sizes: ArrayLike<number>, sds: ArrayLike<number>, n: number): Float64Array {
  return costAllocation(sizes, sds, new Float64Array(sizes.length).fill(1), n)
}

/**
 * The same where an interview costs more in one stratum than in another: in proportion to size times standard deviation over
 * the root of the cost, the most precise mean for the money.
 *
 * @param costs - shape (strata): of one interview; finite, > 0
 * @returns shape (strata), summing to n
 * @throws {ModelError} as `neymanAllocation`
 * @see Cochran (1977), Sampling Techniques, section 5.5
 * @example [...costAllocation([10, 10], [1, 1], [1, 4], 9)] // => [6, 3]
 */
export function costAllocation(sizes: ArrayLike<number>, sds: ArrayLike<number>, costs: ArrayLike<number>, n: number): Float64Array {
  requireStrata(sizes, sds, costs)
  requireFigure('n', n, 0)
  const claims = Float64Array.from(sizes, (size, i) => (size * sds[i]) / Math.sqrt(costs[i]))
  const total = claims.reduce((sum, claim) => sum + claim, 0)
  if (!(total > 0)) throw new ModelError('strata-empty', `Unexpected strata, none of ${claims.length} with a size and a standard deviation above 0, expected at least one`)
  return claims.map((claim) => (n * claim) / total)
}

function requireStrata(sizes: ArrayLike<number>, sds: ArrayLike<number>, costs: ArrayLike<number>): void {
  for (const [name, values, least] of [['sizes', sizes, 0], ['sds', sds, 0], ['costs', costs, Number.MIN_VALUE]] as const) {
    if (values.length !== sizes.length) throw new ModelError('strata-differ', `Unexpected length of ${name} ${values.length}, expected ${sizes.length} strata`)
    for (let i = 0; i < values.length; i += 1) requireFigure(`${name}[${i}]`, values[i], least)
  }
}

function requireFigure(name: string, value: number, least: number): void {
  if (!(value >= least && value < Infinity)) throw new ModelError('stratum-invalid', `Unexpected ${name} ${value}, expected a finite number of at least ${least}`)
}
