import { ModelError } from '../model-error.ts'
import { ascendingRoot } from './ascending-root.ts'
import { kishEffectiveSize } from './kish.ts'
import { clipped, trimWeights, type WeightBounds } from './trimming.ts'

/** Respondents by several traits at once. */
export interface JointCounts {
  /** Shape (margins)(rows): the level that each row has in each margin. */
  readonly levels: readonly ArrayLike<number>[]
  /** Shape (rows): respondents, finite, >= 0; need not be whole. */
  readonly counts: ArrayLike<number>
}

/** Bounds are of a weight in parts of the mean weight; none unless given. */
export interface RakingOptions extends Partial<WeightBounds> {
  /** Rounds over all margins at most; 1,000 unless given. */
  readonly cycles?: number
  /** Largest difference of a weighted share to its target at which margins count as met; 1e-10 unless given. */
  readonly tolerance?: number
}

export interface Raking {
  /** Shape (rows), of mean 1 over the respondents weighed; 0 for rows that are not. */
  readonly weights: Float64Array
  /** Whether all margins are met. */
  readonly converged: boolean
  readonly cycles: number
  /** Largest difference of a weighted share to its target. */
  readonly error: number
  /** Least and greatest weight. */
  readonly lowest: number
  readonly highest: number
  /** Respondents whose weight stands at a bound. */
  readonly bounded: number
  /** Respondents weighed. */
  readonly size: number
  /** How many equally weighted ones they are worth (Kish); the design effect is size / effectiveSize. */
  readonly effectiveSize: number
  /** Respondents of a level whose target is 0, who are not weighed. */
  readonly excluded: number
  /** Levels that should be there, and of which nobody is. */
  readonly unreachable: readonly { readonly margin: number; readonly level: number; readonly target: number }[]
}

/** Where margins can't be met weights may shrink without end: not to 0, from which nothing brings them back. */
const tiniest = 1e-100

/** A level of a margin: its rows, the respondents in them, and the sum of weights they are to have. */
interface Stratum {
  readonly rows: readonly number[]
  readonly size: number
  readonly target: number
}

/**
 * Weights under which a sample has the margins of a population, as near to its own joint composition as can be: margins are
 * fitted one after the other, over and over (iterative proportional fitting). With bounds, each fit multiplies the weights of
 * a level by the factor that brings it to its target once they are cut to the bounds, so that no weight is ever outside them
 * and margins are met if any such weights can be found.
 *
 * A level with a target and no respondent is unreachable: the targets of the other levels of its margin are raised in
 * proportion until they sum to 1. Respondents of a level with target 0 are not weighed. Where the bounds leave no way to
 * meet all margins, the weights stand where the last cycle left them, brought to mean 1 within the bounds.
 *
 * @param table - at least one margin
 * @param targets - shape (margins)(levels): shares of the population, finite, >= 0, of any scale per margin
 * @returns null where nobody can be weighed
 * @throws {ModelError} `margins-differ`, `level-invalid`, `counts-invalid` (name the place), `target-invalid` (names margin and level), `raking-options`
 * @see Deming and Stephan (1940), Annals of Mathematical Statistics 11:427-444; convergence inside bounds: Bregman (1967),
 *   USSR Computational Mathematics 7:200-217 (from memory), as each fit is a projection on a convex set
 * @example rake({ levels: [[0, 1]], counts: [6, 2] }, [[0.75, 0.25]]).effectiveSize // => 8
 */
export function rake(table: JointCounts, targets: readonly ArrayLike<number>[], options: RakingOptions = {}): Raking | null {
  const { lower = 0, upper = Infinity, cycles: most = 1000, tolerance = 1e-10 } = options
  requireOptions(lower, upper, most, tolerance)
  const bounds = { lower: Math.max(lower, tiniest), upper }
  requireTable(table, targets)
  const weighed = weighedCounts(table, targets)
  const size = sumOf(weighed)
  if (size === 0) return null
  const { strata, unreachable } = strataOf(table, weighed, targets, size)
  let weights: Float64Array = weighed.map((count) => (count > 0 ? 1 : 0))
  let [cycles, error] = [0, largestError(strata, weights, weighed, size)]
  while (error > tolerance && cycles < most) {
    for (const stratum of strata) fit(stratum, weights, weighed, bounds)
    cycles += 1
    error = largestError(strata, weights, weighed, size)
  }
  if (error > tolerance) {
    weights = ofMeanOne(weights, weighed, size, bounds)
    error = largestError(strata, weights, weighed, size)
  }
  const used = weights.filter((_, row) => weighed[row] > 0)
  return {
    weights, converged: error <= tolerance, cycles, error,
    lowest: used.reduce((least, weight) => Math.min(least, weight), Infinity),
    highest: used.reduce((largest, weight) => Math.max(largest, weight), 0),
    bounded: atBounds(weights, weighed, { lower, upper }),
    size, effectiveSize: kishEffectiveSize(weights, weighed),
    excluded: sumOf(table.counts) - size,
    unreachable,
  }
}

/** Counts, 0 for rows with a level that nobody of the population has. */
function weighedCounts({ levels, counts }: JointCounts, targets: readonly ArrayLike<number>[]): Float64Array {
  return Float64Array.from(counts, (count, row) => (levels.every((margin, m) => targets[m][margin[row]] > 0) ? count : 0))
}

function strataOf({ levels }: JointCounts, weighed: Float64Array, targets: readonly ArrayLike<number>[], size: number) {
  const strata: Stratum[] = []
  const unreachable: { readonly margin: number; readonly level: number; readonly target: number }[] = []
  for (const [margin, shares] of targets.entries()) {
    const rows = Array.from({ length: shares.length }, (): number[] => [])
    weighed.forEach((count, row) => { if (count > 0) rows[levels[margin][row]].push(row) })
    const all = sumOf(shares)
    const reached = rows.reduce((sum, found, level) => (found.length > 0 ? sum + shares[level] : sum), 0)
    for (const [level, found] of rows.entries()) {
      if (found.length > 0) strata.push({ rows: found, size: found.reduce((sum, row) => sum + weighed[row], 0), target: (shares[level] / reached) * size })
      else if (shares[level] > 0) unreachable.push({ margin, level, target: shares[level] / all })
    }
  }
  return { strata, unreachable }
}

/** Multiply the weights of a stratum, cut to the bounds, so that they sum to its target, or come as near to it as the bounds let them. */
function fit({ rows, size, target }: Stratum, weights: Float64Array, counts: Float64Array, { lower, upper }: WeightBounds): void {
  const mean = target / size
  if (mean <= lower || mean >= upper) {
    for (const row of rows) weights[row] = mean <= lower ? lower : upper
    return
  }
  let [total, smallest, largest] = [0, Infinity, 0]
  for (const row of rows) {
    total += counts[row] * weights[row]
    smallest = Math.min(smallest, weights[row])
    largest = Math.max(largest, weights[row])
  }
  const plain = target / total
  const inside = smallest * plain >= lower && largest * plain <= upper
  const factor = inside ? plain : ascendingRoot((by) => clippedTotal(by), mean / largest, mean / smallest, plain)
  for (const row of rows) weights[row] = clipped(weights[row] * factor, lower, upper)

  function clippedTotal(by: number) {
    let [value, slope] = [-target, 0]
    for (const row of rows) {
      const weight = clipped(weights[row] * by, lower, upper)
      value += counts[row] * weight
      if (weight > lower && weight < upper) slope += counts[row] * weights[row]
    }
    return { value, slope }
  }
}

function largestError(strata: readonly Stratum[], weights: Float64Array, counts: Float64Array, size: number): number {
  let largest = 0
  for (const { rows, target } of strata) {
    const total = rows.reduce((sum, row) => sum + counts[row] * weights[row], 0)
    largest = Math.max(largest, Math.abs(total - target) / size)
  }
  return largest
}

function ofMeanOne(weights: Float64Array, counts: Float64Array, size: number, bounds: WeightBounds): Float64Array {
  const scale = size / weights.reduce((sum, weight, row) => sum + counts[row] * weight, 0)
  return trimWeights(weights.map((weight) => weight * scale), counts, bounds).map((weight, row) => (counts[row] > 0 ? weight : 0))
}

/** A weight comes to its bound in the limit only. */
function atBounds(weights: Float64Array, counts: Float64Array, { lower, upper }: WeightBounds): number {
  const near = 1e-6
  return weights.reduce((sum, weight, row) => (weight <= lower * (1 + near) || weight >= upper * (1 - near) ? sum + counts[row] : sum), 0)
}

const sumOf = (values: ArrayLike<number>) => Array.prototype.reduce.call(values, (sum, value) => (sum as number) + (value as number), 0) as number

function requireOptions(lower: number, upper: number, cycles: number, tolerance: number): void {
  if (!(lower >= 0 && lower < 1 && upper > 1 && cycles >= 1 && tolerance > 0)) {
    throw new ModelError('raking-options', `Unexpected bounds [${lower}, ${upper}], cycles ${cycles}, tolerance ${tolerance}, expected lower in [0, 1), upper above 1, cycles >= 1, tolerance > 0`)
  }
}

function requireTable({ levels, counts }: JointCounts, targets: readonly ArrayLike<number>[]): void {
  if (levels.length === 0 || levels.length !== targets.length) throw new ModelError('margins-differ', `Unexpected number of margins ${levels.length}, expected ${targets.length}, and at least 1`)
  for (let row = 0; row < counts.length; row += 1) {
    if (!(counts[row] >= 0 && counts[row] < Infinity)) throw new ModelError('counts-invalid', `Unexpected counts[${row}] ${counts[row]}, expected a finite number of at least 0`)
  }
  for (const [margin, shares] of targets.entries()) {
    for (let level = 0; level < shares.length; level += 1) {
      if (!(shares[level] >= 0 && shares[level] < Infinity)) throw new ModelError('target-invalid', `Unexpected targets[${margin}][${level}] ${shares[level]}, expected a finite number of at least 0`)
    }
    if (levels[margin].length !== counts.length) throw new ModelError('margins-differ', `Unexpected length of levels[${margin}] ${levels[margin].length}, expected ${counts.length} rows`)
    for (let row = 0; row < counts.length; row += 1) {
      const level = levels[margin][row]
      if (!(Number.isInteger(level) && level >= 0 && level < shares.length)) throw new ModelError('level-invalid', `Unexpected levels[${margin}][${row}] ${level}, expected one of ${shares.length}`)
    }
  }
}
