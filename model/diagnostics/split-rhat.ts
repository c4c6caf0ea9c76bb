import type { Decidable } from '../statistics/decidable.ts'
import { mean, sampleVariance } from '../statistics/moments.ts'
import { foldChains, rankNormalise, splitChains, whyUndecided, type Chains, type UndecidedReason } from './chains.ts'

/** Each half needs two draws for a variance. */
const leastDraws = 4

/**
 * Rank-normalised split R-hat: the larger of the one for location and the one for spread (folded draws).
 *
 * @param chains - shape (chains x draws)
 * @returns close to 1 where chains agree; 1.01 is the usual limit
 * @throws {ModelError} `chains-empty`, `chains-differ` (names the chain)
 * @see Vehtari, Gelman, Simpson, Carpenter and Bürkner (2021), Bayesian Analysis 16:667-718, section 4
 * @example splitRhat([Float64Array.of(1, 1, 1, 1)]) // => { value: null, reason: 'constant' }
 */
export function splitRhat(chains: Chains): Decidable<UndecidedReason> {
  const reason = whyUndecided(chains, leastDraws)
  if (reason !== null) return { value: null, reason }
  const location = potentialScaleReduction(rankNormalise(splitChains(chains)))
  const spread = potentialScaleReduction(rankNormalise(splitChains(foldChains(chains))))
  if (location === null) return { value: null, reason: 'constant' }
  // Two-valued draws at equal distance from their median fold to a constant: then location alone decides.
  return { value: spread === null ? location : Math.max(location, spread) }
}

/**
 * Split R-hat of the draws themselves, without ranks: comparable with older figures.
 *
 * @param chains - shape (chains x draws)
 * @throws {ModelError} `chains-empty`, `chains-differ` (names the chain)
 * @see Gelman et al. (2013), Bayesian Data Analysis, 3rd ed., section 11.4
 */
export function plainSplitRhat(chains: Chains): Decidable<UndecidedReason> {
  const reason = whyUndecided(chains, leastDraws)
  if (reason !== null) return { value: null, reason }
  const value = potentialScaleReduction(splitChains(chains))
  return value === null ? { value, reason: 'constant' } : { value }
}

/** Root of the pooled variance over the variance within chains; null where no chain varies. */
function potentialScaleReduction(chains: Chains): number | null {
  const draws = chains[0].length
  const centres = chains.map((chain) => mean(chain))
  const within = mean(chains.map((chain, i) => sampleVariance(chain, centres[i])))
  return within === 0 ? null : Math.sqrt((sampleVariance(centres) * draws / within + draws - 1) / draws)
}
