/** What a simulation needs of a generator. */
export interface Randomness {
  uniform(): number
  normal(): number
}

/** Standard deviations of the model, on the score's scale; `venueDrift` one per venue. */
export interface Sigmas {
  readonly mu: number
  readonly venueDrift: readonly number[]
  readonly venue: number
  readonly topic: number
  readonly poster: number
  readonly tau: number
}

export interface Paths {
  /** Shape (steps). */
  readonly mu?: ArrayLike<number>
  /** One entry per venue, shape (steps); null where the drift is to be drawn. */
  readonly drift?: readonly (ArrayLike<number> | null)[]
}

export interface States {
  /** Shape (steps). */
  readonly mu: Float64Array
  /** One entry per venue, shape (steps), 0 at the first step unless a path says otherwise. */
  readonly drift: readonly Float64Array[]
  /** Standing offsets of venues, topics and poster classes; 0 for a factor with one level, which has no effect. */
  readonly offsets: readonly [venue: Float64Array, topic: Float64Array, poster: Float64Array]
}

export interface Sizes {
  readonly steps: number
  readonly venues: number
  readonly topics: number
  readonly posters: number
}

/** Scales of the half-normal priors on a weekly grid: written out from model.md, not taken from the code under test. */
const scales = { mu: 0.03, venueDrift: 0.02, offsets: 0.3, tau: 0.2 }
const initialSd = 0.5

export function drawSigmas(sizes: Sizes, random: Randomness): Sigmas {
  const halfNormal = (scale: number): number => scale * Math.abs(random.normal())
  return {
    mu: halfNormal(scales.mu), venueDrift: Array.from({ length: sizes.venues }, () => halfNormal(scales.venueDrift)),
    venue: halfNormal(scales.offsets), topic: halfNormal(scales.offsets), poster: halfNormal(scales.offsets), tau: halfNormal(scales.tau),
  }
}

/** Opinion, drifts and offsets given the standard deviations, but for paths that are given. */
export function drawStates(sizes: Sizes & { readonly paths?: Paths }, sigmas: Sigmas, random: Randomness): States {
  const { steps, venues, topics, posters, paths } = sizes
  const offsets = (levels: number, sd: number): Float64Array => Float64Array.from({ length: levels }, () => (levels === 1 ? 0 : sd * random.normal()))
  const driftOf = (venue: number): Float64Array => {
    const given = paths?.drift?.[venue]
    if (given) return asPath(given, steps)
    return venues === 1 ? new Float64Array(steps) : walk(steps, 0, sigmas.venueDrift[venue], random)
  }
  return {
    mu: paths?.mu ? asPath(paths.mu, steps) : walk(steps, initialSd * random.normal(), sigmas.mu, random),
    drift: Array.from({ length: venues }, (_, venue) => driftOf(venue)),
    offsets: [offsets(venues, sigmas.venue), offsets(topics, sigmas.topic), offsets(posters, sigmas.poster)],
  }
}

function walk(steps: number, first: number, sd: number, random: Randomness): Float64Array {
  const path = new Float64Array(steps)
  path[0] = first
  for (let t = 1; t < steps; t++) path[t] = path[t - 1] + sd * random.normal()
  return path
}

function asPath(given: ArrayLike<number>, steps: number): Float64Array {
  if (given.length !== steps) throw new RangeError(`Unexpected path of ${given.length} steps, expected ${steps}`)
  return Float64Array.from(given)
}
