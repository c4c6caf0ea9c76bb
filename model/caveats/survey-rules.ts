import type { Findings } from '../findings/schema.ts'
import { caveat, type CaveatRule, type RuledCaveat } from './rule.ts'

type Survey = NonNullable<Findings['survey']>

/** Waves named one by one. */
const namedWaves = 5

/** Caveats that rest on the survey: what of it is missing, and how far it bears out the posts. Without a survey a standing rule speaks. */
export const surveyRules: readonly CaveatRule[] = [
  ofSurvey(({ verdict, label, pairs, candidates }) => {
    const best = candidates.find(({ series }) => series === 'adjusted')?.best
    return verdict === 'contradicts' ? [caveat('serious', 'survey-contradicts', { label, correlation: best?.r ?? 0, pairs: best?.pairs ?? pairs })] : []
  }),
  ofSurvey(({ verdict, pairs, pairs_needed: needed }) => (verdict === 'too-few-waves' ? [caveat('caution', 'survey-too-few', { pairs, needed })] : [])),
  ofSurvey(({ verdict, label, pairs }) => (verdict === 'not-established' ? [caveat('caution', 'survey-not-established', { label, pairs })] : [])),
  ofSurvey(({ departures, waves, label, kind }) => {
    const [last, latest] = [departures.at(-1), waves.at(-1)]
    return last === undefined || last.wave !== latest?.wave ? [] : [caveat('caution', 'survey-departs', { label, kind, observed: last.observed, expected: last.forecast.mean })]
  }),
  ofSurvey(({ overlapping_waves: waves }) => named('survey-waves-overlap', waves)),
  ofSurvey(({ later_waves: waves }) => named('survey-waves-later', waves)),
  ofSurvey(({ metric, metrics, label }) => {
    const headline = metrics.find((of) => of.metric === metric && of.segment === null)
    return named('survey-metric-missing', headline?.missing ?? [], { label })
  }),
  ofSurvey(({ metrics }) => {
    // a base belongs to a wave and a segment, however many metrics rest on it
    const small = (shown: Survey['waves'][number]['shown']) => new Set(metrics.flatMap(({ segment, waves }) => (
      waves.filter((wave) => wave.shown === shown).map(({ wave }) => JSON.stringify([segment, wave]))))).size
    const [hidden, flagged] = [small('hidden'), small('flagged')]
    return hidden + flagged === 0 ? [] : [caveat('note', 'survey-bases-small', { hidden, flagged })]
  }),
]

function ofSurvey(rule: (survey: Survey) => readonly RuledCaveat[]): CaveatRule {
  return ({ findings }) => (findings.survey === null ? [] : rule(findings.survey))
}

function named(code: string, waves: readonly string[], figures: RuledCaveat['figures'] = {}): readonly RuledCaveat[] {
  if (waves.length === 0) return []
  const most = waves.length > namedWaves ? [...waves.slice(0, namedWaves), '…'] : waves
  return [caveat('note', code, { ...figures, waves: waves.length, names: most.join(', ') })]
}
