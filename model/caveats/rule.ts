import type { Caveat, Findings } from '../findings/schema.ts'
import type { RuledAdvice } from '../advice/ruled-advice.ts'
import type { Reading } from '../reading/context.ts'

/** A caveat before it is worded: which one, how serious, and the figures its wording needs. */
export type RuledCaveat = Pick<Caveat, 'code' | 'severity' | 'figures'>

/** The findings as far as they stand when caveats are ruled: everything but the caveats themselves, advice not yet worded. */
export type Unruled = Omit<Findings, 'caveats' | 'advice' | 'inputs' | 'program' | 'account' | 'brand' | 'locale'> & { readonly advice: readonly RuledAdvice[] }

export interface CaveatGrounds {
  readonly findings: Unruled
  readonly reading: Reading
}

/** One rule: the caveats it finds grounds for. Each code has one rule and each rule its test. */
export type CaveatRule = (grounds: CaveatGrounds) => readonly RuledCaveat[]

export function caveat(severity: Caveat['severity'], code: string, figures: Caveat['figures'] = {}): RuledCaveat {
  return { code, severity, figures }
}
