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

/** Cells sorted by step. */
export interface FitCells {
  readonly count: number
  /** Shape (steps + 1): the cells of step t are start[t] .. start[t + 1] - 1. */
  readonly start: Int32Array
  readonly venue: Int32Array
  /** The other effects of the cells, one entry per factor. */
  readonly effects: readonly CellEffects[]
  /** For every two of those factors, shape (cells): the place in the border's corner of the cell's two columns. */
  readonly pairs: readonly Int32Array[]
  readonly mean: Float64Array
  /** V_c. */
  readonly variance: Float64Array
}

/** Where one factor of every cell goes. */
export interface CellEffects {
  /** Shape (cells): border column. */
  readonly column: Int32Array
  /** Shape (cells): venue x border + column, where a step's weights by venue and column are summed. */
  readonly cross: Int32Array
}
