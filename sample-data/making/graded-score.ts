/**
 * Scores come as grades (three labels, five stars), yet their mean must be the wanted one. A latent standard normal
 * is cut into grades; its location is chosen so that the graded score has exactly the wanted mean.
 */
export interface Grading {
  /** Ascending cut points of the latent value; one grade more than cuts, evenly spaced on [-1, 1]. */
  readonly cuts: readonly number[]
}

/** Negative, neutral, positive; about 70 in 100 neutral, as is usual of automatic labels. */
export const labels: Grading = { cuts: [-1.036, 1.036] }

/** One to five stars. */
export const stars: Grading = { cuts: [-1.3, -0.6, 0.6, 1.3] }

/** Grade of a latent value: 0 .. cuts. */
export function grade(latent: number, grading: Grading): number {
  return grading.cuts.filter((cut) => latent > cut).length
}

/** Score in [-1, 1] of a grade. */
export function scoreOf(graded: number, grading: Grading): number {
  return -1 + (2 * graded) / grading.cuts.length
}

/** Mean score when the latent value is Normal(location, 1). */
export function meanScore(location: number, grading: Grading): number {
  const above = grading.cuts.reduce((sum, cut) => sum + normalBelow(location - cut), 0)
  return -1 + (2 * above) / grading.cuts.length
}

/** Location of the latent value that gives a mean score in (-1, 1), by bisection. */
export function locationFor(mean: number, grading: Grading): number {
  return bisect((location) => meanScore(location, grading) - mean)
}

/** Standard normal quantile of a probability in (0, 1). */
export function normalQuantile(probability: number): number {
  return bisect((x) => normalBelow(x) - probability)
}

function bisect(rising: (x: number) => number): number {
  let low = -6
  let high = 6
  for (let i = 0; i < 45; i++) {
    const middle = (low + high) / 2
    if (rising(middle) < 0) low = middle
    else high = middle
  }
  return (low + high) / 2
}

/** Standard normal distribution function to 7 digits: Abramowitz and Stegun (1964), Handbook, 26.2.17. */
export function normalBelow(x: number): number {
  const t = 1 / (1 + 0.2316419 * Math.abs(x))
  const series = t * (0.31938153 + t * (-0.356563782 + t * (1.781477937 + t * (-1.821255978 + t * 1.330274429))))
  const tail = (Math.exp((-x * x) / 2) / Math.sqrt(2 * Math.PI)) * series
  return x >= 0 ? 1 - tail : tail
}
