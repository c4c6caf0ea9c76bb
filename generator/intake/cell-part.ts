/** What one source says of one cell, before sources are put together. */
export interface CellPart {
  /** Day number on which the step begins. */
  readonly step: number
  /** In the order of the account's factors. */
  readonly levels: readonly string[]
  readonly mentions: number
  readonly authors: number
  readonly mean: number
  /** Sum of squared deviations from the mean, and its degrees of freedom: mentions - 1, or 0 where it is not known. */
  readonly squares: number
  readonly freedom: number
  readonly clustering: number
  /** NaN where it is to be computed from `clustering`. */
  readonly deff: number
  /** Mentions by number of their label; empty where these are not counted. */
  readonly labels: readonly number[]
}
