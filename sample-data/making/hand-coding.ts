import { endWall, monthOf } from './calendar.ts'
import type { Post } from './posts.ts'
import type { Draws } from './seeded-draws.ts'

/**
 * The labels of the posts are a coder's: what people meant is another thing. Reviews carry stars, which are people's own.
 * By what was meant (negative, neutral, positive): how often the coder says negative, neutral, positive.
 */
export const coder = {
  blogs: [[0.87, 0.11, 0.02], [0.05, 0.87, 0.08], [0.01, 0.08, 0.91]],
  boards: [[0.91, 0.08, 0.01], [0.11, 0.84, 0.05], [0.03, 0.11, 0.86]],
  microblogs: [[0.85, 0.11, 0.04], [0.08, 0.84, 0.08], [0.01, 0.07, 0.92]],
  videos: [[0.88, 0.1, 0.02], [0.06, 0.86, 0.08], [0.02, 0.09, 0.89]],
} as const
export type CodedVenue = keyof typeof coder
export const codedVenues = Object.keys(coder) as CodedVenue[]

const labels = ['negative', 'neutral', 'positive']
const codingsPerVenue = 360
/** The month whose posts are coded by hand: the last. */
const month = monthOf(endWall - 1)

/** The lines of audit/coding.csv: a random sample of each venue's posts, coded by hand. @param posts - about the brand, without blemish */
export function auditLines(posts: readonly Post[], draws: Draws): readonly string[] {
  return ['venue,true_label,coded_label,count', ...codedVenues.flatMap((venue) => {
    const own = codedPosts(posts, venue)
    const meant = meantShares(sharesOf(own), venue)
    const pairs = sampleOf(own, draws).map(({ grade }) => [draws.weighted(meant.map((share, label) => share * coder[venue][label][grade])), grade])
    return labels.flatMap((trueLabel, t) => labels.map((codedLabel, c) =>
      [venue, trueLabel, codedLabel, pairs.filter(([meantLabel, coded]) => meantLabel === t && coded === c).length].join(',')))
  })]
}

/** A venue's posts of the month that is coded by hand. */
export function codedPosts(posts: readonly Post[], venue: CodedVenue): readonly Post[] {
  return posts.filter((post) => post.venue === venue && monthOf(post.wall) === month)
}

/** Shares of the labels as coded. */
export function sharesOf(posts: readonly Post[]): readonly number[] {
  return labels.map((_, label) => posts.filter(({ grade }) => grade === label).length / posts.length)
}

/**
 * Shares of what was meant, from which the coder makes the shares as coded: by expectation and maximisation
 * (Dempster, Laird and Rubin 1977), which keeps them above 0.
 */
export function meantShares(coded: readonly number[], venue: CodedVenue): readonly number[] {
  let meant: readonly number[] = labels.map(() => 1 / labels.length)
  for (let round = 0; round < 400; round++) {
    const made = coded.map((_, c) => meant.reduce((sum, share, t) => sum + share * coder[venue][t][c], 0))
    meant = meant.map((share, t) => coded.reduce((sum, of, c) => sum + (of * share * coder[venue][t][c]) / made[c], 0))
  }
  return meant
}

/** A random sample without repeats: the first of a shuffle (Fisher and Yates 1938). */
function sampleOf(posts: readonly Post[], draws: Draws): readonly Post[] {
  const shuffled = [...posts]
  return Array.from({ length: codingsPerVenue }, (_, at) => {
    const other = at + draws.integer(shuffled.length - at)
    const picked = shuffled[other]
    shuffled[other] = shuffled[at]
    return picked
  })
}
