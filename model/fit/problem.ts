import type { CoderCorrection } from '../coder/audit.ts'

/**
 * The linking model of one brand, as arrays:
 *
 *   y_c ~ Normal( mu[t] + alpha[v] + d[v,t] + kappa[k] + gamma[g] + ... ,  V_c + tau^2 )
 *
 * The states of one step are (mu[t], e[1,t], ..., e[W,t]) with e[v,t] = alpha[v] + d[v,t], one e per venue that
 * may drift. As d[v,1] = 0 exactly, e[v,1] is alpha[v] ~ Normal(0, sigma_alpha^2) and the walk of e is the walk of d:
 * folding the two saves a border column per venue and changes nothing. What stands still (anchored venues, topics,
 * poster classes, further factors) is in the border.
 */
export interface FitProblem {
  readonly steps: number
  /** W, venues with a walk of their own: 0 where there is one venue only (its drift can't be told from opinion). */
  readonly walks: number
  /** Shape (venues): component of the step's block that the venue loads on, 1..W; 0 for none. */
  readonly venueWalk: Int32Array
  /** Shape (venues): border column of an anchored venue's offset; -1 where there is none. */
  readonly venueFixed: Int32Array
  /** Groups of border columns that share one standard deviation. */
  readonly groups: readonly FixedGroup[]
  /** s, all border columns. */
  readonly border: number
  readonly cells: FitCells
  /** Where the coder's errors are undone: each draw of the states then has a draw of its own of what they are. null: cells are as they stand. */
  readonly coder: CoderCorrection | null
  /** Shape (steps): multiplier of sigma_mu^2 for the movement into the step; the first is not read. */
  readonly movementMultiplier: Float64Array
  /** The standard deviations, in the order of every `sigma` vector: mu, drift per walking venue, groups, tau. */
  readonly scales: readonly Scale[]
  readonly position: ScalePositions
  /** Prior standard deviation of mu[1]. */
  readonly initialSd: number
}

export interface FixedGroup {
  readonly name: string
  readonly from: number
  readonly count: number
  /** Position of its standard deviation in `scales`. */
  readonly scale: number
}

/** A standard deviation with its half-normal prior: `prior` is the sd of the underlying normal. */
export interface Scale {
  readonly name: string
  readonly prior: number
}

export interface ScalePositions {
  readonly mu: number
  /** Shape (walks). */
  readonly drift: Int32Array
  /** -1 where there is one venue. */
  readonly venue: number
  readonly tau: number
}

export interface FitCells {
  readonly count: number
  readonly mean: Float64Array
  /** As in the cells: for means that change with the coder's errors. */
  readonly mentions: Float64Array
  readonly levels: readonly Int32Array[]
  /** V_c. */
  readonly variance: Float64Array
  /** Cells of one step and venue. */
  readonly venues: CellRuns
  /** One entry per factor with effects in the border: cells of one step, venue and level. */
  readonly effects: readonly EffectRuns[]
  /** For every two of those factors, shape (cells): the place in the border's corner of the cell's two columns. */
  readonly pairs: readonly Int32Array[]
}

/** Cells in groups, so that a group's weights are summed before they are put anywhere. */
export interface CellRuns {
  /** Shape (cells): cells in the order of their groups. */
  readonly order: Int32Array
  /** Shape (groups + 1): group r is order[start[r]] .. order[start[r + 1] - 1]. */
  readonly start: Int32Array
  /** Shape (groups). */
  readonly step: Int32Array
  readonly venue: Int32Array
}

export interface EffectRuns extends CellRuns {
  /** Shape (groups): border column. */
  readonly column: Int32Array
}
