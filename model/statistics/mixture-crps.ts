import { ModelError } from '../model-error.ts'
import { adaptiveIntegral } from './adaptive-integral.ts'
import { lowerTail, upperTail, weighed, type MixtureComponent } from './mixture-forecast.ts'

/** Of the scale of each component, to both sides of its centre: where the integral is divided, so that a narrow one beside a wide one is not stepped over. */
const reaches = [-64, -8, 0, 8, 64]
/** Of the mean scale: difference of the two rules allowed in each part of the integral. */
const tolerance = 1e-8

/**
 * Continuous ranked probability score of a mixture of Student's t: the integral of (F(x) - 1{x >= observed})^2, with an error
 * below 1e-8 of the mean scale.
 *
 * @param observed - finite
 * @param components - at least one with weight
 * @returns >= 0, in the unit of the observation; smaller is better
 * @throws {ModelError} `forecast-invalid` (the observation), `mixture-invalid` (names the component)
 * @see Gneiting and Raftery (2007), JASA 102:359-378, eq. 20 with the sign turned
 * @example mixtureCrps(0, [{ weight: 1, centre: 0, scale: 1, freedom: 1 }]).toFixed(9) // => '0.441271200'
 */
export function mixtureCrps(observed: number, components: readonly MixtureComponent[]): number {
  if (!Number.isFinite(observed)) throw new ModelError('forecast-invalid', `Unexpected forecast (observed ${observed}), expected a finite number`)
  const mixture = weighed(components)
  const below = (x: number) => lowerTail(x, mixture) ** 2
  const above = (x: number) => upperTail(x, mixture) ** 2
  const scale = mixture.reduce((sum, one) => sum + one.weight * one.scale, 0)
  const breaks = breakPoints(observed, mixture)
  let sum = halfLine((distance) => below(breaks[0] - distance), scale) + halfLine((distance) => above(breaks[breaks.length - 1] + distance), scale)
  for (let i = 1; i < breaks.length; i += 1) {
    sum += adaptiveIntegral(breaks[i] <= observed ? below : above, breaks[i - 1], breaks[i], tolerance * scale)
  }
  return sum
}

/** The observation, where the integrand jumps, and centres and reaches of the components, those left out that lie close to the one before. */
function breakPoints(observed: number, mixture: readonly MixtureComponent[]): readonly number[] {
  const finest = Math.min(...mixture.map(({ scale }) => scale)) / 2
  const candidates = mixture.flatMap(({ centre, scale }) => reaches.map((reach) => centre + reach * scale)).sort((one, other) => one - other)
  const kept: number[] = []
  for (const candidate of candidates) if (kept.length === 0 || candidate - kept[kept.length - 1] > finest) kept.push(candidate)
  return [...kept, observed].sort((one, other) => one - other)
}

/** Integral over distances from 0 to infinity, brought to [0, 1] by distance = scale w / (1 - w). */
function halfLine(f: (distance: number) => number, scale: number): number {
  return adaptiveIntegral((w) => (scale * f((scale * w) / (1 - w))) / (1 - w) ** 2, 0, 1, tolerance * scale)
}
