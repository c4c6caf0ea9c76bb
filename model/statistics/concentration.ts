import { ModelError } from '../model-error.ts'

/** Counts of counts: so many authors wrote so many mentions each. Rows may repeat a size and stand in any order. */
export interface SizeCount {
  readonly mentionsPerAuthor: number
  readonly authors: number
}

export interface Concentration {
  readonly authors: number
  readonly mentions: number
  /** Share of mentions by the most prolific 1 % of authors, in (0, 1]. */
  readonly topShare: number
  /** In [0, 1 - 1 / authors]. */
  readonly gini: number
  /** Inverse Simpson, in [1, authors]. */
  readonly effectiveAuthors: number
}

/**
 * How unevenly mentions are spread over authors.
 *
 * @param counts - shape (sizes); whole numbers of authors and finite sizes, >= 0
 * @returns null where there is no author or no mention
 * @throws {ModelError} `counts-invalid` (names the row)
 * @see Gini (1912) in the form of Brown (1994), the trapezia under the Lorenz curve; Simpson (1949), Nature 163:688; Hill (1973), Ecology 54:427-432
 * @example concentrationOf([{ mentionsPerAuthor: 1, authors: 3 }, { mentionsPerAuthor: 3, authors: 1 }])
 *   // => { authors: 4, mentions: 6, topShare: 0.5, gini: 0.25, effectiveAuthors: 3 }
 */
export function concentrationOf(counts: readonly SizeCount[]): Concentration | null {
  const ascending = inOrder(counts)
  const authors = sumOf(ascending, (row) => row.authors)
  const mentions = sumOf(ascending, (row) => row.authors * row.mentionsPerAuthor)
  if (mentions === 0) return null
  const squares = sumOf(ascending, (row) => row.authors * row.mentionsPerAuthor ** 2)
  return {
    authors, mentions,
    topShare: mentionsOfTop(ascending, Math.max(1, Math.ceil(authors / 100))) / mentions,
    gini: gini(ascending, authors, mentions),
    effectiveAuthors: mentions ** 2 / squares,
  }
}

/**
 * Share of mentions by the most prolific part of the authors.
 *
 * @param counts - shape (sizes); whole numbers of authors and finite sizes, >= 0
 * @param percent - of the authors, in (0, 100]; rounded up to whole authors, at least one. In percent, because 0.07 x 100 is more than 7 in floating point
 * @returns in (0, 1]; null where there is no author or no mention
 * @throws {ModelError} `counts-invalid` (names the row), `percent-range`
 * @example topShare([{ mentionsPerAuthor: 1, authors: 9 }, { mentionsPerAuthor: 11, authors: 1 }], 10) // => 0.55
 */
export function topShare(counts: readonly SizeCount[], percent: number): number | null {
  if (!(percent > 0 && percent <= 100)) throw new ModelError('percent-range', `Unexpected percent ${percent}, expected one in (0, 100]`)
  const ascending = inOrder(counts)
  const mentions = sumOf(ascending, (row) => row.authors * row.mentionsPerAuthor)
  if (mentions === 0) return null
  const top = Math.max(1, Math.ceil((sumOf(ascending, (row) => row.authors) * percent) / 100))
  return mentionsOfTop(ascending, top) / mentions
}

function inOrder(counts: readonly SizeCount[]): readonly SizeCount[] {
  for (const [i, { mentionsPerAuthor, authors }] of counts.entries()) {
    if (!(mentionsPerAuthor >= 0 && mentionsPerAuthor < Infinity && Number.isInteger(authors) && authors >= 0)) {
      throw new ModelError('counts-invalid', `Unexpected counts[${i}], ${authors} authors of ${mentionsPerAuthor} mentions, expected a whole number of authors and a size, neither below 0`)
    }
  }
  return counts.toSorted((one, other) => one.mentionsPerAuthor - other.mentionsPerAuthor)
}

const sumOf = (rows: readonly SizeCount[], of: (row: SizeCount) => number) => rows.reduce((sum, row) => sum + of(row), 0)

function mentionsOfTop(ascending: readonly SizeCount[], top: number): number {
  let wanted = top
  let mentions = 0
  for (const { mentionsPerAuthor, authors } of ascending.toReversed()) {
    const taken = Math.min(wanted, authors)
    mentions += taken * mentionsPerAuthor
    wanted -= taken
  }
  return mentions
}

/** 1 less twice the area under the Lorenz curve, which is straight between sizes. */
function gini(ascending: readonly SizeCount[], authors: number, mentions: number): number {
  let before = 0
  let area = 0
  for (const row of ascending) {
    const after = before + row.authors * row.mentionsPerAuthor
    area += row.authors * (before + after)
    before = after
  }
  return Math.max(0, 1 - area / (authors * mentions))
}
