import type { TargetMix } from '../cells/target-mix.ts'
import type { Factor } from '../intake/intake-tables.ts'

/** One mix for two brands, by the levels of each. */
export interface SharedMix {
  /** Shape (factors) of (levels of the brand), and of (levels of the competitor): each sums to 1. */
  readonly own: readonly Float64Array[]
  readonly other: readonly Float64Array[]
  /** Share of the brand's mix that the shared levels hold, the least over the factors, in (0, 1]. */
  readonly covered: number
  /** Levels of the brand's mix that the competitor lacks. */
  readonly leftOut: readonly { readonly factor: string; readonly label: string }[]
}

/**
 * The brand's target mix restricted to the levels that both brands have cells of, each factor scaled up to 1 again. Levels are matched by name.
 *
 * @param own, other - factors in the same order
 * @returns null where a factor's shared levels hold nothing of the mix: then the two can't be compared
 */
export function sharedMix(own: readonly Factor[], mix: TargetMix, other: readonly Factor[]): SharedMix | null {
  const names = other.map(({ levels }) => levels.map(({ name }) => name))
  const restricted = mix.shares.map((shares, f) => shares.map((share, l) => (names[f].includes(own[f].levels[l].name) ? share : 0)))
  const kept = restricted.map((shares, f) => (shares.every((share, l) => share === mix.shares[f][l]) ? 1 : shares.reduce((sum, share) => sum + share, 0)))
  if (kept.some((share) => share <= 0)) return null
  const scaled = restricted.map((shares, f) => shares.map((share) => share / kept[f]))
  return {
    own: scaled,
    other: names.map((levels, f) => Float64Array.from(levels, (name) => scaled[f][own[f].levels.findIndex((level) => level.name === name)] ?? 0)),
    covered: Math.min(...kept),
    leftOut: own.flatMap(({ name: factor, levels }, f) => levels.filter(({ name }, l) => mix.shares[f][l] > 0 && !names[f].includes(name)).map(({ label }) => ({ factor, label }))),
  }
}
