import { ModelError } from '../model-error.ts'

/** A weighted mean, taken apart: sum of shares[i] * rates[i]. Shape (groups) each, any finite numbers. */
export interface WeightedMean {
  readonly shares: ArrayLike<number>
  readonly rates: ArrayLike<number>
}

export interface MidpointSplit {
  /** What the change of the shares makes, at the mean of the rates before and after. */
  readonly composition: number
  /** What the change of the rates makes, at the mean of the shares before and after. */
  readonly rate: number
  /** Shape (groups): the parts of the two sums. A single group's composition part depends on the zero of the rates. */
  readonly compositionByGroup: Float64Array
  readonly rateByGroup: Float64Array
}

/**
 * Split the change of a weighted mean into a part for its composition and a part for its rates, which add up to it: what
 * both bring about together is halved between them.
 *
 * @param before - shape (groups)
 * @param after - shape (groups), the same groups in the same order
 * @throws {ModelError} `groups-differ`, `group-invalid` (names array, index and value)
 * @see Kitagawa (1955), Components of a difference between two rates, JASA 50:1168-1194
 * @example midpointSplit({ shares: [0.5, 0.5], rates: [0, 10] }, { shares: [0.25, 0.75], rates: [0, 12] }).composition // => 2.75
 */
export function midpointSplit(before: WeightedMean, after: WeightedMean): MidpointSplit {
  const groups = before.shares.length
  for (const [name, array] of [['before.shares', before.shares], ['before.rates', before.rates], ['after.shares', after.shares], ['after.rates', after.rates]] as const) {
    requireGroups(name, array, groups)
  }
  const compositionByGroup = new Float64Array(groups)
  const rateByGroup = new Float64Array(groups)
  let composition = 0
  let rate = 0
  for (let i = 0; i < groups; i += 1) {
    compositionByGroup[i] = ((after.shares[i] - before.shares[i]) * (before.rates[i] + after.rates[i])) / 2
    rateByGroup[i] = ((after.rates[i] - before.rates[i]) * (before.shares[i] + after.shares[i])) / 2
    composition += compositionByGroup[i]
    rate += rateByGroup[i]
  }
  return { composition, rate, compositionByGroup, rateByGroup }
}

/**
 * The same where several factors add to the mean, each with shares and rates of its own (venue, topic, poster): one split
 * per factor, and all parts together sum to the change.
 *
 * @param before - shape (factors)
 * @param after - shape (factors), the same factors in the same order
 * @throws {ModelError} `factors-differ`, `groups-differ`, `group-invalid`
 * @see Kitagawa (1955), applied factor by factor: additive factors have no joint part to share out
 */
export function midpointSplits(before: readonly WeightedMean[], after: readonly WeightedMean[]): readonly MidpointSplit[] {
  if (before.length !== after.length) {
    throw new ModelError('factors-differ', `Unexpected number of factors ${after.length} after, expected ${before.length} as before`)
  }
  return before.map((factor, i) => midpointSplit(factor, after[i]))
}

function requireGroups(name: string, array: ArrayLike<number>, groups: number): void {
  if (array.length !== groups) throw new ModelError('groups-differ', `Unexpected length of ${name} ${array.length}, expected ${groups} groups`)
  for (let i = 0; i < groups; i += 1) {
    if (!Number.isFinite(array[i])) throw new ModelError('group-invalid', `Unexpected ${name}[${i}] ${array[i]}, expected a finite number`)
  }
}
