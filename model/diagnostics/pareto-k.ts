import { ModelError } from '../model-error.ts'
import type { Decidable } from '../statistics/decidable.ts'
import { fitGeneralisedPareto, generalisedParetoQuantile } from './generalised-pareto.ts'

/**
 * Why there is no Pareto k. `too-few-draws`: fewer than 5 in the tail. `flat-tail`: the largest ratios agree, which is
 * harmless. `degenerate-tail`: a few draws outweigh the rest so far that the tail begins with zeros; not to be relied on.
 */
export type ParetoReason = 'too-few-draws' | 'flat-tail' | 'degenerate-tail'

export interface SmoothedWeights {
  /** Shape (draws), sum 1, in the order given. */
  readonly weights: Float64Array
  readonly paretoK: Decidable<ParetoReason>
  /** Independent draws of the target that the weighted draws are worth: relative efficiency / sum of squared weights. */
  readonly effectiveSize: number
  /** How many of the largest ratios were replaced by quantiles of the fitted tail. */
  readonly tail: number
}

/**
 * Importance weights from log ratios, their largest part smoothed by a generalised Pareto tail, cut at the largest ratio.
 *
 * @param logRatios - shape (draws), n >= 1; log target less log proposal up to a constant; -Infinity is a weight of 0
 * @param relativeEfficiency - of the draws, in (0, ...): 1 for independent ones
 * @throws {ModelError} `ratio-invalid` (names the index), `ratios-empty`, `efficiency-range`
 * @see Vehtari, Simpson, Gelman, Yao and Gabry (2024), Pareto smoothed importance sampling, JMLR 25(72)
 * @example [...paretoSmooth(Float64Array.of(-7, -7, -Infinity)).weights] // => [0.5, 0.5, 0]
 */
export function paretoSmooth(logRatios: Float64Array, relativeEfficiency = 1): SmoothedWeights {
  const largest = requireRatios(logRatios)
  if (!(relativeEfficiency > 0 && relativeEfficiency < Infinity)) {
    throw new ModelError('efficiency-range', `Unexpected relative efficiency ${relativeEfficiency}, expected a finite number above 0`)
  }
  const draws = logRatios.length
  const ratios = logRatios.map((value) => Math.exp(value - largest))
  const tail = Math.ceil(Math.min(0.2 * draws, 3 * Math.sqrt(draws / relativeEfficiency)))
  if (tail < 5) return finished(ratios, relativeEfficiency, { value: null, reason: 'too-few-draws' }, 0)
  const order = Uint32Array.from(ratios.keys()).sort((one, other) => ratios[one] - ratios[other] || one - other)
  const threshold = ratios[order[draws - tail - 1]]
  const top = order.subarray(draws - tail)
  const fit = fitGeneralisedPareto(Float64Array.from(top, (draw) => ratios[draw] - threshold))
  if (fit === null) {
    const flat = ratios[top[0]] === ratios[top[tail - 1]]
    return finished(ratios, relativeEfficiency, { value: null, reason: flat ? 'flat-tail' : 'degenerate-tail' }, 0)
  }
  top.forEach((draw, j) => { ratios[draw] = Math.min(1, threshold + generalisedParetoQuantile(fit, (j + 0.5) / tail)) })
  return finished(ratios, relativeEfficiency, { value: fit.k }, tail)
}

/**
 * The largest Pareto k at which this many draws can be relied on: min(1 - 1 / log10(S), 0.7).
 *
 * @param draws - S, at least 10
 * @see Vehtari et al. (2024), Pareto smoothed importance sampling, JMLR 25(72)
 * @example paretoKLimit(4000) // => 0.7
 */
export function paretoKLimit(draws: number): number {
  if (!(draws >= 10)) throw new ModelError('ratios-empty', `Unexpected number of draws ${draws}, expected at least 10`)
  return Math.min(1 - 1 / Math.log10(draws), 0.7)
}

function finished(ratios: Float64Array, efficiency: number, paretoK: SmoothedWeights['paretoK'], tail: number): SmoothedWeights {
  const sum = ratios.reduce((total, ratio) => total + ratio, 0)
  const weights = ratios.map((ratio) => ratio / sum)
  return { weights, paretoK, effectiveSize: efficiency / weights.reduce((total, weight) => total + weight * weight, 0), tail }
}

function requireRatios(logRatios: Float64Array): number {
  let largest = -Infinity
  for (const [i, value] of logRatios.entries()) {
    if (!(value < Infinity)) throw new ModelError('ratio-invalid', `Unexpected logRatios[${i}] ${value}, expected a number below infinity`)
    if (value > largest) largest = value
  }
  if (largest === -Infinity) throw new ModelError('ratios-empty', `Unexpected log ratios, none of ${logRatios.length} above -infinity, expected at least one`)
  return largest
}
