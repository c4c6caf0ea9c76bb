import { ModelError } from '../model-error.ts'
import type { Decidable } from './decidable.ts'
import { studentCdf } from './student-t.ts'

/** One of the forecasts that are mixed: centre + scale times Student's t. */
export interface MixtureComponent {
  /** >= 0, any scale: what counts is the part of the sum. */
  readonly weight: number
  readonly centre: number
  /** > 0; not the standard deviation, which is scale sqrt(freedom / (freedom - 2)). */
  readonly scale: number
  /** Degrees of freedom, finite, >= 1. */
  readonly freedom: number
}

/**
 * Probability that the forecast gives to values up to x, accurate in the lower tail too.
 *
 * @param x - any number, infinities included
 * @param components - at least one with weight
 * @throws {ModelError} `mixture-invalid` (names the component), `number-missing` for NaN
 * @example mixtureCdf(3, [{ weight: 1, centre: 3, scale: 2, freedom: 5 }]) // => 0.5
 */
export function mixtureCdf(x: number, components: readonly MixtureComponent[]): number {
  return lowerTail(x, weighed(components))
}

/**
 * Value that the forecast stays below with probability p: by halving an interval that holds it, to the last digits.
 *
 * @param p - in [0, 1]; 0 and 1 give the infinities
 * @param components - at least one with weight
 * @throws {ModelError} `probability-range`, `mixture-invalid` (names the component)
 * @example mixtureQuantile(0.5, [{ weight: 1, centre: 3, scale: 2, freedom: 5 }]) // => 3
 */
export function mixtureQuantile(p: number, components: readonly MixtureComponent[]): number {
  if (!(p >= 0 && p <= 1)) throw new ModelError('probability-range', `Unexpected probability ${p}, expected one in [0, 1]`)
  const mixture = weighed(components)
  if (p === 0 || p === 1) return p === 0 ? -Infinity : Infinity
  // On the side of the smaller tail, whose digits are not lost beside 1.
  const isBelow = p <= 0.5 ? (x: number) => lowerTail(x, mixture) < p : (x: number) => upperTail(x, mixture) > 1 - p
  const reach = Math.max(...mixture.map(({ scale }) => scale))
  let [low, high] = [Math.min(...mixture.map(({ centre }) => centre)), Math.max(...mixture.map(({ centre }) => centre))]
  for (let step = reach; !isBelow(low) && low > -Infinity; step *= 2) low -= step
  for (let step = reach; isBelow(high) && high < Infinity; step *= 2) high += step
  return halve(isBelow, low, high)
}

/**
 * Mean of the forecast.
 *
 * @param components - at least one with weight
 * @returns undecided where a component has 1 degree of freedom and so no mean
 * @throws {ModelError} `mixture-invalid` (names the component)
 * @example mixtureMean([{ weight: 1, centre: 0, scale: 1, freedom: 5 }, { weight: 3, centre: 4, scale: 1, freedom: 5 }]) // => { value: 3 }
 */
export function mixtureMean(components: readonly MixtureComponent[]): Decidable<'too-little-freedom'> {
  const mixture = weighed(components)
  return mixture.every(({ freedom }) => freedom > 1) ? { value: averageCentre(mixture) } : { value: null, reason: 'too-little-freedom' }
}

/**
 * Standard deviation of the forecast: of the components and of their centres.
 *
 * @param components - at least one with weight
 * @returns undecided where a component has 2 degrees of freedom or fewer and so no variance
 * @throws {ModelError} `mixture-invalid` (names the component)
 * @example mixtureSd([{ weight: 1, centre: -4, scale: 3, freedom: 4 }, { weight: 1, centre: 4, scale: 3, freedom: 4 }]) // => { value: 5.830951894845301 }
 */
export function mixtureSd(components: readonly MixtureComponent[]): Decidable<'too-little-freedom'> {
  const mixture = weighed(components)
  if (!mixture.every(({ freedom }) => freedom > 2)) return { value: null, reason: 'too-little-freedom' }
  const centre = averageCentre(mixture)
  const variance = mixture.reduce((sum, one) => sum + one.weight * (one.scale ** 2 * (one.freedom / (one.freedom - 2)) + (one.centre - centre) ** 2), 0)
  return { value: Math.sqrt(variance) }
}

/** The components that have weight, their weights summing to 1; `mixture-invalid` where one can't be. */
export function weighed(components: readonly MixtureComponent[]): readonly MixtureComponent[] {
  for (const [i, { weight, centre, scale, freedom }] of components.entries()) {
    if (!(weight >= 0 && weight < Infinity && Number.isFinite(centre) && scale > 0 && scale < Infinity && freedom >= 1 && freedom < Infinity)) {
      throw new ModelError('mixture-invalid', `Unexpected components[${i}] (weight ${weight}, centre ${centre}, scale ${scale}, freedom ${freedom}), expected finite numbers, weight >= 0, scale > 0, freedom >= 1`)
    }
  }
  const sum = components.reduce((total, { weight }) => total + weight, 0)
  if (sum === 0) throw new ModelError('mixture-invalid', `Unexpected weights, none of ${components.length} positive, expected at least one`)
  return components.filter(({ weight }) => weight > 0).map((component) => ({ ...component, weight: component.weight / sum }))
}

/** Probability up to x, of components as `weighed` gives them. */
export function lowerTail(x: number, mixture: readonly MixtureComponent[]): number {
  let sum = 0
  for (const { weight, centre, scale, freedom } of mixture) sum += weight * studentCdf((x - centre) / scale, freedom)
  return sum
}

/** Probability from x on, of components as `weighed` gives them. */
export function upperTail(x: number, mixture: readonly MixtureComponent[]): number {
  let sum = 0
  for (const { weight, centre, scale, freedom } of mixture) sum += weight * studentCdf((centre - x) / scale, freedom)
  return sum
}

const averageCentre = (mixture: readonly MixtureComponent[]) => mixture.reduce((sum, { weight, centre }) => sum + weight * centre, 0)

function halve(isBelow: (x: number) => boolean, from: number, to: number): number {
  let [low, high] = [from, to]
  for (let round = 0; round < 2000; round += 1) {
    const middle = low + (high - low) / 2
    if (!(middle > low && middle < high)) break
    if (isBelow(middle)) low = middle
    else high = middle
  }
  return high
}
