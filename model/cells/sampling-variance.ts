import type { FitTables } from '../intake/intake-tables.ts'
import { clusterDesignEffect } from '../statistics/kish.ts'
import { intraclassCorrelation } from '../statistics/intraclass.ts'

/** How exactly each cell's mean is known, and from what. */
export interface SamplingVariance {
  /** Shape (cells): V_c = s2_v deff_c / n_c. */
  readonly variance: Float64Array
  /** Shape (cells): deff_c. */
  readonly designEffect: Float64Array
  /** Shape (venues): s2_v, the pooled within-cell variance of scores. */
  readonly withinCell: Float64Array
  /** Shape (venues): rho_v; null where it can't be decided (no known author, or none who posted twice): then deff_c = 1. */
  readonly intraclass: readonly (number | null)[]
}

/** Fewer degrees of freedom than this do not carry a variance of their own (model.md 1.1). */
const leastFreedom = 5

/**
 * Sampling variance of every cell mean, with the design effect of posts clustered in authors:
 * deff_c = 1 + (b_c - 1) rho_v (Kish 1965, section 5.4), rho_v the one-way ANOVA intraclass correlation by author.
 * A design effect given ready-made is taken as it is.
 */
export function samplingVariance(tables: FitTables): SamplingVariance {
  const { cells, factors, variation } = tables
  const venues = factors[0].levels.length
  const venueOf = cells.levels[0]
  const withinCell = pooledVariance(venueOf, cells.squares, cells.freedom, venues)
  const intraclass = variation.map((sums) => (sums === null ? null : intraclassCorrelation(sums).value))
  const designEffect = new Float64Array(cells.count)
  const variance = new Float64Array(cells.count)
  for (let c = 0; c < cells.count; c++) {
    const v = venueOf[c]
    const given = cells.deff[c]
    designEffect[c] = Number.isNaN(given) ? clusterDesignEffect(cells.clustering[c], intraclass[v] ?? 0) : given
    variance[c] = withinCell[v] * designEffect[c] / cells.mentions[c]
  }
  return { variance, designEffect, withinCell, intraclass }
}

/** s2 per group; the pooled s2 of all groups where a group's own rests on too little or is 0. */
function pooledVariance(group: Int32Array, squares: Float64Array, freedom: Float64Array, groups: number): Float64Array {
  const sum = new Float64Array(groups)
  const free = new Float64Array(groups)
  let allSquares = 0
  let allFree = 0
  for (let c = 0; c < group.length; c++) {
    sum[group[c]] += squares[c]
    free[group[c]] += freedom[c]
    allSquares += squares[c]
    allFree += freedom[c]
  }
  const pooled = allFree > 0 ? allSquares / allFree : 0
  return sum.map((x, v) => (free[v] >= leastFreedom && x > 0 ? x / free[v] : pooled))
}
