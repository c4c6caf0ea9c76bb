import { ModelError } from '../model-error.ts'
import type { Decidable } from './decidable.ts'
import { normalCdf } from './normal.ts'
import { twoSidedQuantile, wilsonInterval, type Interval } from './wilson.ts'

/** A share of a sample, whose base may be an effective one and need not be whole. */
export interface SampleShare {
  /** In [0, 1]. */
  readonly share: number
  /** > 0 */
  readonly base: number
}

/** A mean of a sample, whose base may be an effective one and need not be whole. */
export interface SampleMean {
  readonly mean: number
  /** Standard deviation of the answers, >= 0. */
  readonly sd: number
  /** > 0 */
  readonly base: number
}

/** One sample less the other. */
export interface SampleDifference extends Interval {
  readonly difference: number
  /** Two-sided; undecided where neither sample varies. */
  readonly p: Decidable<'no-variation'>
}

/**
 * Difference of two shares of independent samples: p of the z test with the shares pooled, as the hypothesis has it;
 * Newcombe's hybrid score interval, which stays inside [-1, 1]. The two may disagree right at the border.
 *
 * @param one - the share that the other is taken from
 * @param level - of the interval, in (0, 1)
 * @returns difference in [-1, 1]; p undecided where both shares are 0 or both are 1
 * @throws {ModelError} `proportion-invalid`, `level-range`
 * @see Newcombe (1998), Statistics in Medicine 17:873-890, method 10; Agresti (2002), Categorical Data Analysis, section 3.1
 * @example twoShares({ share: 0.5, base: 40 }, { share: 0.5, base: 60 }, 0.9).p // => { value: 1 }
 */
export function twoShares(one: SampleShare, other: SampleShare, level: number): SampleDifference {
  for (const { share, base } of [one, other]) {
    if (!(share >= 0 && share <= 1 && base > 0 && base < Infinity)) {
      throw new ModelError('proportion-invalid', `Unexpected share ${share} of ${base}, expected one in [0, 1] of a finite number above 0`)
    }
  }
  const difference = one.share - other.share
  const [ofOne, ofOther] = [scoreInterval(one, level), scoreInterval(other, level)]
  const pooled = (one.share * one.base + other.share * other.base) / (one.base + other.base)
  const variance = pooled * (1 - pooled) * (1 / one.base + 1 / other.base)
  return {
    difference,
    low: difference - Math.hypot(one.share - ofOne.low, ofOther.high - other.share),
    high: difference + Math.hypot(ofOne.high - one.share, other.share - ofOther.low),
    p: twoSided(difference, variance),
  }
}

/**
 * Difference of two means of independent samples, each with a variance of its own: z test and the interval that goes with it.
 *
 * @param one - the mean that the other is taken from
 * @param level - of the interval, in (0, 1)
 * @returns an interval without width, and p undecided, where neither sample varies
 * @throws {ModelError} `sample-invalid`, `level-range`
 * @see Cochran (1977), Sampling Techniques, section 2.14
 * @example twoMeans({ mean: 7, sd: 2, base: 25 }, { mean: 7, sd: 1, base: 50 }, 0.9).p // => { value: 1 }
 */
export function twoMeans(one: SampleMean, other: SampleMean, level: number): SampleDifference {
  for (const { mean, sd, base } of [one, other]) {
    if (!(Number.isFinite(mean) && sd >= 0 && sd < Infinity && base > 0 && base < Infinity)) {
      throw new ModelError('sample-invalid', `Unexpected sample (mean ${mean}, sd ${sd}, base ${base}), expected finite numbers, sd >= 0, base > 0`)
    }
  }
  const difference = one.mean - other.mean
  const variance = (one.sd * one.sd) / one.base + (other.sd * other.sd) / other.base
  const half = twoSidedQuantile(level) * Math.sqrt(variance)
  return { difference, low: difference - half, high: difference + half, p: twoSided(difference, variance) }
}

const scoreInterval = ({ share, base }: SampleShare, level: number) => wilsonInterval(share * base, base, level)

const twoSided = (difference: number, variance: number): Decidable<'no-variation'> =>
  variance > 0 ? { value: 2 * normalCdf(-Math.abs(difference) / Math.sqrt(variance)) } : { value: null, reason: 'no-variation' }
