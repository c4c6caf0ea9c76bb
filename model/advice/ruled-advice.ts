import type { Findings } from '../findings/schema.ts'

/**
 * Advice that takes away less than this part of its interval's width is told as hardly helping and is not among the first things to do: 5 % of ±2.0 points is
 * ±0.1, the last digit that the review prints, so that nobody would see in the next review whether it worked. (A group among the least heard is
 * asked for all the same: see segments.ts.)
 */
const materialShare = 0.05

/** @param gainShare - the part of the interval's width that it takes away */
export function helpsBy(gainShare: number): RuledAdvice['helps'] {
  return gainShare >= materialShare ? 'clearly' : 'hardly'
}

/** A piece of advice before it is worded. */
export type RuledAdvice = Omit<Findings['advice'][number], 'action' | 'evidence' | 'success'>

/** Advice that no gain can be computed for. */
export function plainAdvice(code: string, kind: RuledAdvice['where_kind'], howMany: number, figures: RuledAdvice['figures'], where = ''): RuledAdvice {
  return { code, where, where_kind: kind, how_many: howMany, helps: 'not-computed', gain_share: null, gain: null, gain_of: 'none', cost: null, cost_given: false, gain_per_cost: null, figures }
}
