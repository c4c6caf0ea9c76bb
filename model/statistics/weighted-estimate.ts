import type { Estimate } from '../findings/schema.ts'

/** What a sum of weights may lack for its rounding: a quantile that falls on a draw must not jump to the next. */
const rounding = 1e-12

/**
 * Summary of weighted draws: mean, bounds of the central interval, standard deviation.
 *
 * The quantile at p is the smallest draw at which the weights up to it reach p (the inverse of the weighted
 * distribution function; definition 1 of Hyndman and Fan 1996, American Statistician 50:361, with weights).
 *
 * @param values - shape (n), n >= 1
 * @param weights - shape (n), >= 0, summing to 1
 * @param interval - probability inside the interval, in (0, 1)
 * @example weightedEstimate(Float64Array.of(1, 3), Float64Array.of(0.5, 0.5), 0.9).mean // => 2
 */
export function weightedEstimate(values: Float64Array, weights: Float64Array, interval: number): Estimate {
  const order = Uint32Array.from(values.keys()).sort((a, b) => values[a] - values[b] || a - b)
  let mean = 0
  for (let i = 0; i < values.length; i++) mean += weights[i] * values[i]
  let variance = 0
  for (let i = 0; i < values.length; i++) variance += weights[i] * (values[i] - mean) ** 2
  const at = (p: number): number => {
    let cumulative = 0
    for (const i of order) {
      cumulative += weights[i]
      if (cumulative >= p - rounding) return values[i]
    }
    return values[order[order.length - 1]]
  }
  return { mean, low: at((1 - interval) / 2), high: at((1 + interval) / 2), sd: Math.sqrt(variance) }
}
