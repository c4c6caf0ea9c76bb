import type { Decidable } from '../statistics/decidable.ts'
import { sortedQuantile } from '../statistics/quantile.ts'
import { indicateChains, pooled, rankNormalise, splitChains, whyUndecided, type Chains, type UndecidedReason } from './chains.ts'
import { independentDraws } from './independent-draws.ts'

/** Halves of six are the shortest in which a pair of autocorrelations beyond the first can be estimated. */
const leastDraws = 12

/**
 * How many independent draws the chains are worth for the bulk of the distribution: on rank-normalised draws.
 *
 * @param chains - shape (chains x draws)
 * @returns draws; may exceed their number where they alternate
 * @throws {ModelError} `chains-empty`, `chains-differ` (names the chain)
 * @see Vehtari, Gelman, Simpson, Carpenter and Bürkner (2021), Bayesian Analysis 16:667-718, section 4
 * @example bulkEffectiveSize([Float64Array.of(1, 2)]) // => { value: null, reason: 'too-few-draws' }
 */
export function bulkEffectiveSize(chains: Chains): Decidable<UndecidedReason> {
  return decide(chains, () => independentDraws(rankNormalise(splitChains(chains))))
}

/**
 * How many independent draws the chains are worth for the ends of a central interval: the smaller one of its two quantiles.
 *
 * @param chains - shape (chains x draws)
 * @param interval - probability inside the interval, in (0, 1); 0.9 in the source
 * @throws {ModelError} `chains-empty`, `chains-differ` (names the chain), `probability-range`
 * @see Vehtari et al. (2021), section 4.3
 */
export function tailEffectiveSize(chains: Chains, interval = 0.9): Decidable<UndecidedReason> {
  return decide(chains, () => {
    const sorted = pooled(chains).sort()
    const ends = [(1 - interval) / 2, (1 + interval) / 2].map((p) => ofQuantile(chains, sortedQuantile(sorted, p)))
    return ends[0] === null || ends[1] === null ? null : Math.min(ends[0], ends[1])
  })
}

/**
 * How many independent draws the chains are worth for the mean of the draws themselves.
 *
 * @param chains - shape (chains x draws)
 * @throws {ModelError} `chains-empty`, `chains-differ` (names the chain)
 * @see Geyer (1992), Statistical Science 7:473-483; Vehtari et al. (2021)
 */
export function meanEffectiveSize(chains: Chains): Decidable<UndecidedReason> {
  return decide(chains, () => independentDraws(splitChains(chains)))
}

const ofQuantile = (chains: Chains, bound: number) => independentDraws(splitChains(indicateChains(chains, bound)))

function decide(chains: Chains, size: () => number | null): Decidable<UndecidedReason> {
  const reason = whyUndecided(chains, leastDraws)
  if (reason !== null) return { value: null, reason }
  const value = size()
  return value === null ? { value, reason: 'constant' } : { value }
}
