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
}

/** Two parts of the same cell as one. */
export function joinParts(a: CellPart, b: CellPart): CellPart {
  const mentions = a.mentions + b.mentions
  const share = b.mentions / mentions
  const known = a.freedom === a.mentions - 1 && b.freedom === b.mentions - 1
  const apart = (b.mean - a.mean) ** 2 * a.mentions * share
  const weigh = (x: number, y: number): number => x + (y - x) * share
  return {
    step: a.step, levels: a.levels, mentions, authors: a.authors + b.authors, mean: weigh(a.mean, b.mean),
    // Where the spread of one part is not known, what lies between the two cannot be told from it either.
    squares: a.squares + b.squares + (known ? apart : 0),
    freedom: a.freedom + b.freedom + (known ? 1 : 0),
    clustering: weigh(a.clustering, b.clustering),
    deff: weigh(a.deff, b.deff),
  }
}
