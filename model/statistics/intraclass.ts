import type { AuthorVariation } from '../intake/intake-tables.ts'
import { ModelError } from '../model-error.ts'
import type { Decidable } from './decidable.ts'

/** One-way analysis of variance with random groups, here the authors. */
export interface OneWayAnova {
  readonly betweenMeanSquare: number
  readonly withinMeanSquare: number
  /** n0: the group size that stands for unequal ones; the common size where all agree. */
  readonly groupSize: number
  /** Variance component between groups by the method of moments; below 0 where groups differ less than chance has it. */
  readonly betweenVariance: number
}

export type IntraclassReason = 'too-few-authors' | 'no-author-twice' | 'no-variation'

/**
 * Mean squares and variance components from sums.
 *
 * @param sums - k >= 2 authors with N > k mentions
 * @throws {ModelError} `variation-invalid` (names the sum that cannot be), `variation-undecidable`
 * @see Searle, Casella and McCulloch (1992), Variance Components, section 3.6: n0 = (N - sum m^2 / N) / (k - 1)
 * @example oneWayAnova({ authors: 2, mentions: 4, squaredSizes: 8, betweenSquares: 4, withinSquares: 2 }).betweenVariance // => 1.5
 */
export function oneWayAnova(sums: AuthorVariation): OneWayAnova {
  requireValid(sums)
  const { authors, mentions, squaredSizes, betweenSquares, withinSquares } = sums
  if (authors < 2 || mentions <= authors) {
    throw new ModelError('variation-undecidable', `Unexpected ${mentions} mentions by ${authors} authors, expected two authors or more, one of them twice`)
  }
  const betweenMeanSquare = betweenSquares / (authors - 1)
  const withinMeanSquare = withinSquares / (mentions - authors)
  const groupSize = (mentions - squaredSizes / mentions) / (authors - 1)
  return { betweenMeanSquare, withinMeanSquare, groupSize, betweenVariance: (betweenMeanSquare - withinMeanSquare) / groupSize }
}

/**
 * Intraclass correlation of mentions by the same author: the share of the variance that lies between authors, floored at 0.
 *
 * @param sums - of the one-way analysis of variance by author
 * @returns in [0, 1]; null where fewer than two authors, no author with two mentions, or no variation leave it open
 * @throws {ModelError} `variation-invalid` (names the sum that cannot be)
 * @see Fisher (1925), Statistical Methods for Research Workers, chapter VII; Donner (1986), International Statistical Review 54:67-82
 * @example intraclassCorrelation({ authors: 2, mentions: 4, squaredSizes: 8, betweenSquares: 4, withinSquares: 2 }) // => { value: 0.6 }
 */
export function intraclassCorrelation(sums: AuthorVariation): Decidable<IntraclassReason> {
  requireValid(sums)
  if (sums.authors < 2) return { value: null, reason: 'too-few-authors' }
  if (sums.mentions <= sums.authors) return { value: null, reason: 'no-author-twice' }
  const { betweenVariance, withinMeanSquare } = oneWayAnova(sums)
  if (betweenVariance <= 0 && withinMeanSquare === 0) return { value: null, reason: 'no-variation' }
  return { value: betweenVariance <= 0 ? 0 : betweenVariance / (betweenVariance + withinMeanSquare) }
}

function requireValid(sums: AuthorVariation): void {
  const { authors, mentions, squaredSizes } = sums
  for (const [name, value] of Object.entries(sums) as [string, number][]) {
    if (!(value >= 0 && value < Infinity)) throw new ModelError('variation-invalid', `Unexpected ${name} ${value}, expected a finite number of at least 0`)
  }
  if (mentions < authors) throw new ModelError('variation-invalid', `Unexpected mentions ${mentions}, expected at least one for each of ${authors} authors`)
  const [least, most] = [(mentions * mentions) / Math.max(1, authors), mentions * mentions]
  if (squaredSizes < least * (1 - 1e-9) || squaredSizes > most) {
    throw new ModelError('variation-invalid', `Unexpected squaredSizes ${squaredSizes}, expected one in [${least}, ${most}]`)
  }
}
