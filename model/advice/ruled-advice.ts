import type { Findings } from '../findings/schema.ts'

/** A piece of advice before it is worded. */
export type RuledAdvice = Omit<Findings['advice'][number], 'action' | 'evidence' | 'success'>

/** Advice that no gain can be computed for. */
export function plainAdvice(code: string, kind: RuledAdvice['where_kind'], howMany: number, figures: RuledAdvice['figures'], where = ''): RuledAdvice {
  return { code, where, where_kind: kind, how_many: howMany, gain: null, gain_of: 'none', cost: null, cost_given: false, gain_per_cost: null, figures }
}
