import { ModelError } from '../model-error.ts'
import type { Decidable } from './decidable.ts'

/*
 * Opinion A on [-1, 1] read as a share q = (1 + A) / 2 of content voices among content and unhappy ones. If the unhappy
 * become r times likelier to post, the odds q / (1 - q) among those heard fall to one r-th, though nobody changed his mind.
 */

/**
 * How many times likelier to post, against before, the unhappy must have become for the change of opinion to be theirs
 * alone: odds before over odds after. Below 1 it is the content who must have become likelier, by its inverse.
 *
 * @param before - opinion, in (-1, 1)
 * @param after - opinion, in (-1, 1)
 * @returns > 0; undecided where either lies at an end of the scale or beyond, as a draw may
 * @see Cornfield and others (1959), J. National Cancer Institute 22:173-203 (from memory), who first asked how
 *   strong a hidden cause would have to be to account for all of a finding
 * @example tippingRatio(0.5, 0) // => { value: 3 }
 */
export function tippingRatio(before: number, after: number): Decidable<'off-scale'> {
  if (!(Math.abs(before) < 1 && Math.abs(after) < 1)) return { value: null, reason: 'off-scale' }
  return { value: ((1 + before) * (1 - after)) / ((1 - before) * (1 + after)) }
}

/**
 * The change of opinion that is left if the unhappy have become `ratio` times likelier to post: 0 at the tipping ratio.
 *
 * @param before - opinion, in [-1, 1]
 * @param after - opinion as heard, in [-1, 1]
 * @param ratio - finite, > 0; 1 leaves the change as it is
 * @returns in [-2, 2]; undecided where either opinion lies beyond the scale, as a draw may
 * @throws {ModelError} `ratio-invalid`
 * @example changeUnderRatio(0.5, 0, 3) // => { value: 0 }
 */
export function changeUnderRatio(before: number, after: number, ratio: number): Decidable<'off-scale'> {
  if (!(ratio > 0 && ratio < Infinity)) throw new ModelError('ratio-invalid', `Unexpected ratio ${ratio}, expected a finite number above 0`)
  if (!(Math.abs(before) <= 1 && Math.abs(after) <= 1)) return { value: null, reason: 'off-scale' }
  const [content, unhappy] = [(1 + after) * ratio, 1 - after]
  return { value: (content - unhappy) / (content + unhappy) - before }
}
