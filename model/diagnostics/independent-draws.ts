import { mean, sampleVariance } from '../statistics/moments.ts'
import type { Chains } from './chains.ts'

/**
 * Number of independent draws whose mean would be as precise: draws / (1 + 2 sum of autocorrelations), the sum cut off
 * where a pair of neighbouring lags turns negative, pairs made to fall (Geyer's initial monotone sequence). Lags are
 * computed one by one until the cut, which for chains that mix is soon: no Fourier transform is needed.
 *
 * @param chains - halves of chains, shape (m x n), n >= 6
 * @returns at most S log10(S), with S = m n; null where nothing varies
 * @see Geyer (1992), Statistical Science 7:473-483; Vehtari et al. (2021), section 3
 */
export function independentDraws(chains: Chains): number | null {
  const draws = chains[0].length
  const centres = chains.map((chain) => mean(chain))
  const centred = chains.map((chain, i) => chain.map((value) => value - centres[i]))
  const atLagZero = autocovariance(centred, 0)
  const variance = atLagZero + (chains.length > 1 ? sampleVariance(centres) : 0)
  if (atLagZero === 0) return null
  const within = (atLagZero * draws) / (draws - 1)
  const correlation = (lag: number) => (lag === 0 ? 1 : 1 - (within - autocovariance(centred, lag)) / variance)
  const total = draws * chains.length
  return total / Math.max(correlationTime(correlation, draws), 1 / Math.log10(total))
}

function correlationTime(correlation: (lag: number) => number, draws: number): number {
  let even = correlation(0)
  let pair = even + correlation(1)
  let smallest = pair
  let sum = 0
  for (let lag = 0; lag < draws - 5 && pair > 0;) {
    sum += smallest
    lag += 2
    even = correlation(lag)
    pair = even + correlation(lag + 1)
    smallest = Math.min(smallest, pair)
  }
  // The even lag at the cut counts once: it lowers the variance of the estimate for alternating chains.
  return -1 + 2 * sum + Math.max(0, even)
}

/** Mean over the chains of the autocovariance at one lag, divisor n. */
function autocovariance(centred: Chains, lag: number): number {
  let sum = 0
  for (const chain of centred) {
    for (let i = lag; i < chain.length; i += 1) sum += chain[i] * chain[i - lag]
  }
  return sum / (centred.length * centred[0].length)
}
