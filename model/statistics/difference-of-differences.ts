import type { Interval } from './wilson.ts'

/** A difference of two figures with its interval. */
export interface DifferenceInterval extends Interval {
  readonly difference: number
}

/**
 * One difference less another, independent of it, with its interval: each bound is as far off as the two bounds on its side
 * are together, squares added. Where both intervals are symmetric this is the normal interval from their two standard errors;
 * where they are Newcombe's for shares it keeps their shape, and does not shrink to nothing at shares of 0 or 1.
 *
 * @param one - the difference that the other is taken from
 * @param other - with an interval of the same level
 * @see Zou and Donner (2008), Construction of confidence limits about effect measures: a general approach, Statistics in
 *   Medicine 27:1693-1702 (from memory), the idea of Newcombe (1998), 17:873-890, applied once more
 * @example differenceOfDifferences({ difference: 5, low: 2, high: 8 }, { difference: 1, low: -3, high: 5 }) // => { difference: 4, low: -1, high: 9 }
 */
export function differenceOfDifferences(one: DifferenceInterval, other: DifferenceInterval): DifferenceInterval {
  const difference = one.difference - other.difference
  return {
    difference,
    low: difference - Math.hypot(one.difference - one.low, other.high - other.difference),
    high: difference + Math.hypot(one.high - one.difference, other.difference - other.low),
  }
}
