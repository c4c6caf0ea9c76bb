import type { Findings } from '../findings/schema.ts'
import { caveat, type CaveatRule, type RuledCaveat } from './rule.ts'

type Revisions = NonNullable<Findings['revisions']>

/** Earlier figures that have typically moved by this part of half their interval were told too surely; common practice, no source. */
const large = 0.5
/** Fewer past periods than this have no typical revision. */
const leastPeriods = 3

/** What the archive shows of earlier figures: nothing where nothing is sealed. */
export const pastRules: readonly CaveatRule[] = [
  ofPast(({ typical }) => {
    if (typical === null || typical.periods < leastPeriods) return []
    const { change, change_half_width: changeHalf, level, half_width: half } = typical
    if (change !== null && changeHalf !== null && change >= large * changeHalf) return [caveat('caution', 'revisions-large', { of: 'change', typical: change, half: changeHalf })]
    return level >= large * half ? [caveat('caution', 'revisions-large', { of: 'level', typical: level, half })] : []
  }),
  // what changed before the last sealed review was told in that
  ({ findings: { revisions, period } }) => (revisions?.breaks ?? []).filter(({ before }) => before === period.name)
    .flatMap(({ after, before, parts, bridged }) => parts.map((part) => caveat('caution', 'definition-break', { part, after, before, bridged: bridged ? 'yes' : 'no' }))),
  ofPast(({ late, gone, periods }) => (late + gone === 0 ? [] : [caveat('note', 'late-posts', { late, gone, periods: periods.filter((period) => period.late + period.gone > 0).length })])),
]

function ofPast(rule: (revisions: Revisions) => readonly RuledCaveat[]): CaveatRule {
  return ({ findings }) => (findings.revisions === null ? [] : rule(findings.revisions))
}
