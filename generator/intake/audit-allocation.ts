import { neymanAllocation } from '../../model/statistics/allocation.ts'

/** What posts are drawn from: shape (strata) each. */
export interface AuditStrata {
  /** Posts there are, at least 1. */
  readonly sizes: readonly number[]
  /** Standard deviation of scores inside the stratum. */
  readonly sds: readonly number[]
}

/**
 * How many posts to draw from each stratum: by size times standard deviation (Neyman 1934) as far as each may have, which is
 * `least` of them, or all where there are fewer, and no more than there are; rounded by largest remainders.
 *
 * @param total - of all strata, from `leastTotal` to the sum of the sizes
 * @returns shape (strata), whole, summing to `total`
 */
export function auditAllocation({ sizes, sds }: AuditStrata, total: number, least: number): readonly number[] {
  const low = sizes.map((size) => Math.min(size, least))
  const shares = held(sizes, sds, total, low)
  const whole = shares.map((share, stratum) => Math.max(low[stratum]!, Math.floor(share + rounding)))
  const left = total - whole.reduce((sum, count) => sum + count, 0)
  const open = sizes.flatMap((size, stratum) => (whole[stratum]! < size ? [stratum] : []))
  const byRemainder = open.sort((a, b) => (shares[b]! - whole[b]!) - (shares[a]! - whole[a]!) || a - b)
  for (const stratum of byRemainder.slice(0, left)) whole[stratum]! += 1
  return whole
}

/** The smallest sample that has `least` posts of every stratum, or all that it has. */
export function leastTotal(sizes: readonly number[], least: number): number {
  return sizes.reduce((sum, size) => sum + Math.min(size, least), 0)
}

/** A share is not rounded down for the last bit of a sum. */
const rounding = 1e-9

/**
 * Shares held between `low` and the sizes: those outside on the side that is further out in all are set to their bound, the
 * others share what is left, and so on. Setting both sides at once would set some that need not be in the end.
 */
function held(sizes: readonly number[], sds: readonly number[], total: number, low: readonly number[]): readonly number[] {
  const fixed = new Map<number, number>()
  for (;;) {
    const free = sizes.flatMap((_, stratum) => (fixed.has(stratum) ? [] : [stratum]))
    const left = total - [...fixed.values()].reduce((sum, count) => sum + count, 0)
    const shares = sharesOf(free.map((stratum) => sizes[stratum]!), free.map((stratum) => sds[stratum]!), left)
    const over = free.flatMap((stratum, index) => (shares[index]! > sizes[stratum]! ? [{ stratum, by: shares[index]! - sizes[stratum]!, bound: sizes[stratum]! }] : []))
    const under = free.flatMap((stratum, index) => (shares[index]! < low[stratum]! ? [{ stratum, by: low[stratum]! - shares[index]!, bound: low[stratum]! }] : []))
    if (over.length === 0 && under.length === 0) return sizes.map((_, stratum) => fixed.get(stratum) ?? shares[free.indexOf(stratum)]!)
    const excess = (side: typeof over): number => side.reduce((sum, { by }) => sum + by, 0)
    for (const { stratum, bound } of excess(over) > excess(under) ? over : under) fixed.set(stratum, bound)
  }
}

/** By size alone where nothing is known to vary. */
function sharesOf(sizes: readonly number[], sds: readonly number[], total: number): Float64Array {
  if (sizes.length === 0) return new Float64Array(0)
  return neymanAllocation(sizes, sds.some((sd) => sd > 0) ? sds : sizes.map(() => 1), total)
}
