import { severities } from '../findings/schema.ts'
import { competitorRules } from './competitor-rules.ts'
import { coverageRules } from './coverage-rules.ts'
import { fitRules } from './fit-rules.ts'
import { intakeRules } from './intake-rules.ts'
import { pastRules } from './past-rules.ts'
import { listeningRules } from './listening-rules.ts'
import type { CaveatGrounds, RuledCaveat } from './rule.ts'
import { standingRules } from './standing-rules.ts'
import { surveyRules } from './survey-rules.ts'

/** Every caveat there are grounds for, the serious ones first, otherwise in the order of the rules. */
export function ruleCaveats(grounds: CaveatGrounds): RuledCaveat[] {
  const found = [...fitRules, ...surveyRules, ...listeningRules, ...competitorRules, ...coverageRules, ...intakeRules, ...pastRules, ...standingRules].flatMap((rule) => rule(grounds))
  return found.sort((a, b) => severities.indexOf(b.severity) - severities.indexOf(a.severity))
}
