import type { Reading } from '../reading/context.ts'
import { extremeShare } from '../speaking/extremes.ts'
import { leastCodings } from '../coder/audit.ts'
import { normalQuantile } from '../statistics/normal.ts'
import type { Grounds } from './read-advice.ts'
import { plainAdvice, type RuledAdvice } from './ruled-advice.ts'

/** Probability with which more waves, or interviews, are to reach a verdict. */
const power = 0.8
/** More than so many waves, or interviews a wave, are advised to nobody. */
const mostWaves = 120
const mostInterviews = 5000
/** Share of scores at the ends of the scale from which asking only some people is dangerous above all. */
const extreme = 0.5
/** Share of mentions by the top 1 % of authors from which the quiet go unheard; the caveat on concentration begins at the same. */
const concentrated = 0.25

/** A survey where there is none; more waves, or more interviews, where they could decide what is open. */
export function adviseSurvey({ survey }: Grounds): RuledAdvice[] {
  if (survey === null) return [plainAdvice('survey-start', 'survey', 8, { waves: 8 })]
  const best = survey.candidates.find(({ series }) => series === 'adjusted')?.best ?? null
  if (survey.verdict === 'too-few-waves') {
    const waves = survey.pairs_needed - survey.pairs
    return [plainAdvice('survey-waves', 'survey', waves, { waves, waves_now: survey.pairs, correlation: 0 })]
  }
  const r = best?.r ?? null
  if (survey.verdict !== 'not-established' || best === null || r === null || r <= 0) return []
  const waves = wavesNeeded(best, survey.candidates.find(({ series }) => series === 'adjusted')?.adjusted_p ?? 1)
  const interviews = interviewsNeeded(survey)
  return [
    ...(waves === null || waves > mostWaves || waves <= best.pairs ? [] : [plainAdvice('survey-waves', 'survey', waves - best.pairs, { waves: waves - best.pairs, waves_now: best.pairs, correlation: r })]),
    ...(interviews === null ? [] : [plainAdvice('survey-interviews', 'survey', interviews.needed, { interviews: interviews.needed, interviews_now: interviews.now, correlation: r })]),
  ]
}

type Best = NonNullable<NonNullable<Grounds['survey']>['candidates'][number]['best']>

/**
 * Waves at which a correlation as close as this one would reach `tracks` with power 0.8, on Fisher's scale: its adjusted p now says which normal
 * deviate it counts as, and that grows with the root of the effective pairs less 3.
 *
 * @returns null where it can't be told
 */
function wavesNeeded({ r, pairs, effective_pairs: effective }: Best, adjustedP: number): number | null {
  if (r === null || effective === null || effective <= 3) return null
  const plain = Math.atanh(Math.min(0.999, Math.abs(r))) * Math.sqrt(effective - 3)
  const counts = -normalQuantile(Math.max(1e-6, Math.min(0.999, adjustedP)) / 2)
  // what looking at many lags costs stays as it is; the rest grows
  const cost = Math.max(0, plain - counts)
  const needed = -normalQuantile(0.05) + normalQuantile(power) + cost
  const growth = (needed / plain) ** 2
  return Math.ceil(pairs / effective * (growth * (effective - 3) + 3))
}

/** Interviews a wave at which the waves' sampling error would no longer keep the correlation down by more than a tenth; null where it does not now, or can't be told. */
function interviewsNeeded({ waves, sampling_error: error }: NonNullable<Grounds['survey']>): { readonly needed: number; readonly now: number } | null {
  const values = waves.flatMap(({ value }) => (value === null ? [] : [value]))
  if (error === null || values.length < 3) return null
  const centre = values.reduce((sum, value) => sum + value, 0) / values.length
  const variance = values.reduce((sum, value) => sum + (value - centre) ** 2, 0) / (values.length - 1)
  const signal = variance - error ** 2
  const now = [...waves].map(({ base }) => base).sort((a, b) => a - b)[Math.floor(waves.length / 2)]
  if (signal <= 0 || signal / variance >= 0.81) return null
  const needed = 10 * Math.ceil(now * error ** 2 / (signal * (1 / 0.81 - 1)) / 10)
  return needed > mostInterviews || needed <= now ? null : { needed, now }
}

/** An audit where there is none, or more of it where it was too small. */
export function adviseCoder({ coder }: Grounds): RuledAdvice[] {
  const short = coder.venues.filter(({ codings }) => codings < leastCodings)
  if (coder.status === 'absent' && coder.audit_size !== null) {
    const { codings, codings_per_venue: each, width } = coder.audit_size
    return [plainAdvice('audit-start', 'coder', codings, { codings, per_venue: each, width })]
  }
  return coder.status === 'refused' && coder.reason === 'too-few'
    ? short.map(({ label, codings }) => plainAdvice('audit-more', 'coder', leastCodings - codings, { venue: label, codings, needed: leastCodings }, label)) : []
}

/** Ask everyone, wherever anyone is asked; a standing way in where few speak for many or the middling leave. */
export function adviseEveryone({ tables }: Reading, { speaking }: Grounds, asking: boolean): RuledAdvice[] {
  const share = extremeShare(tables) ?? 0
  const top = speaking.concentration.period?.top_share ?? 0
  const leaving = speaking.staying?.middle_gap?.movement === 'down' || speaking.staying?.middle_gap_change?.movement === 'down'
  return [
    ...(asking || share >= extreme ? [plainAdvice('invite-everyone', 'all', 0, { extremes: share })] : []),
    ...(top >= concentrated || leaving ? [plainAdvice('standing-way-in', 'all', 0, { share: top })] : []),
  ]
}
