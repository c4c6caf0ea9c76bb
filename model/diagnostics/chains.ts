import { ModelError } from '../model-error.ts'
import { normalQuantile } from '../statistics/normal.ts'

/** Draws of one quantity: shape (chains), each of the same number of draws, in the order drawn. */
export type Chains = readonly Float64Array[]

/** Why a convergence diagnostic can't be decided: `constant` also where no chain moves, whether they agree or not. */
export type UndecidedReason = 'too-few-draws' | 'not-finite' | 'constant'

/**
 * What speaks against computing anything from the chains.
 *
 * @param least - draws per chain that are needed
 * @throws {ModelError} `chains-empty`, `chains-differ` (names the chain)
 */
export function whyUndecided(chains: Chains, least: number): UndecidedReason | null {
  if (chains.length === 0) throw new ModelError('chains-empty', 'Unexpected number of chains 0, expected at least 1')
  const draws = chains[0].length
  for (const [i, chain] of chains.entries()) {
    if (chain.length !== draws) throw new ModelError('chains-differ', `Unexpected length of chains[${i}] ${chain.length}, expected that of chains[0], ${draws}`)
  }
  if (draws < least) return 'too-few-draws'
  if (chains.some((chain) => !chain.every(Number.isFinite))) return 'not-finite'
  return chains.every((chain) => chain.every((value) => value === chain[0])) ? 'constant' : null
}

/** Halves of every chain, so that a trend within a chain shows as a difference between halves; a middle draw is left out. */
export function splitChains(chains: Chains): Chains {
  return chains.flatMap((chain) => {
    const half = Math.floor(chain.length / 2)
    return [chain.subarray(0, half), chain.subarray(chain.length - half)]
  })
}

/**
 * Absolute deviations from the median of all draws: turns a difference in spread into one of location. Of an even number
 * the two middle draws are equally far from the median between them; counting from them, and not from it, keeps rounding
 * from deciding their ranks.
 */
export function foldChains(chains: Chains): Chains {
  const sorted = pooled(chains).sort()
  const lower = sorted[(sorted.length - 1) >> 1]
  const upper = sorted[sorted.length >> 1]
  const half = (upper - lower) / 2
  return chains.map((chain) => chain.map((value) => half + (value <= lower ? lower - value : value - upper)))
}

/** 1 where a draw is at most `bound`, else 0. */
export function indicateChains(chains: Chains, bound: number): Chains {
  return chains.map((chain) => chain.map((value) => (value <= bound ? 1 : 0)))
}

/**
 * Every draw replaced by the normal score of its rank among all draws; ties share their mean rank.
 *
 * @see Blom (1958), Statistical Estimates and Transformed Beta-Variables: (r - 3/8) / (S + 1/4); Vehtari et al. (2021)
 */
export function rankNormalise(chains: Chains): Chains {
  const sorted = pooled(chains).sort()
  const scores = new Map<number, number>()
  for (let first = 0; first < sorted.length;) {
    let next = first + 1
    while (next < sorted.length && sorted[next] === sorted[first]) next += 1
    scores.set(sorted[first], normalQuantile(((first + 1 + next) / 2 - 0.375) / (sorted.length + 0.25)))
    first = next
  }
  return chains.map((chain) => chain.map((value) => scores.get(value) ?? Number.NaN))
}

/** All draws in one new array. */
export function pooled(chains: Chains): Float64Array {
  const all = new Float64Array(chains.reduce((sum, chain) => sum + chain.length, 0))
  let at = 0
  for (const chain of chains) {
    all.set(chain, at)
    at += chain.length
  }
  return all
}
