/**
 * Half-normal priors of the standard deviations, on the score's own scale [-1, 1]; `walk` ones are for a weekly grid.
 * "Scale" is the standard deviation of the underlying normal. The priors are part of the method: a review names them.
 */
export const priors = {
  /** Standard deviation of the normal prior of mu[1]. */
  initial: 0.5,
  mu: 0.03,
  venueDrift: 0.02,
  /** Venues, topics, poster classes and every further factor. */
  fixedFactor: 0.3,
  tau: 0.2,
} as const

/**
 * A random walk's variance grows with time, so its standard deviation per step grows with the root of a step's length.
 *
 * @param stepDays - length of a step in days: 1, 7 or 30.4375
 * @returns the factor on the weekly scales of `mu` and `venueDrift`
 */
export function walkFactor(stepDays: number): number {
  return Math.sqrt(stepDays / 7)
}
