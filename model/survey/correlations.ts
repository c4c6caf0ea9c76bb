import type { Findings } from '../findings/schema.ts'
import type { Generator } from '../random/generator.ts'
import { correctedCorrelation } from '../statistics/attenuation.ts'
import { correlation } from '../statistics/correlation.ts'
import { effectivePairs } from '../statistics/effective-pairs.ts'
import { fisherInterval } from '../statistics/fisher-interval.ts'
import type { Candidate } from './candidates.ts'
import type { HeadlineWave } from './headline.ts'
import type { DrawSurrogate } from './persistence.ts'
import { maxStatisticP, type LaggedPartners } from './surrogates.ts'
import { pairsNeeded } from './verdict.ts'
import { partnerOf } from './windows.ts'

type CandidateFinding = NonNullable<Findings['survey']>['candidates'][number]
type LagFinding = CandidateFinding['lags'][number]

/** Every whole lag from the first to the last. */
export function lagsBetween([from, to]: readonly [number, number]): readonly number[] {
  return Array.from({ length: to - from + 1 }, (_, i) => from + i)
}

/**
 * One series against the waves at every lag: r, its interval on the effective number of pairs, r without the waves' sampling error; the best
 * lag by |r|, and how often chance alone would do as well at one of as many lags.
 */
export function correlateCandidate(candidate: Candidate, waves: readonly HeadlineWave[], lags: readonly number[], draw: DrawSurrogate | null, interval: number, generator: Generator): CandidateFinding {
  const paired = lags.map((lag) => ({ lag, ...pairAt(candidate, waves, lag) }))
  const found = paired.map(({ lag, waves: which, partners }) => correlateLag(lag, partners, Array.from(which, (w) => waves[w]), interval))
  const eligible = found.filter(({ r, pairs }) => r !== null && pairs >= pairsNeeded)
  const best = eligible.reduce<LagFinding | null>((most, lag) => (most === null || Math.abs(lag.r ?? 0) > Math.abs(most.r ?? 0) ? lag : most), null)
  const lookedAt = paired.filter((_, i) => eligible.includes(found[i]))
  return {
    series: candidate.series, venue: candidate.venue, label: candidate.label, lags: found,
    best_lag: best?.lag ?? null, best,
    adjusted_p: best === null || draw === null ? null : maxStatisticP(Math.abs(best.r ?? 0), lookedAt, draw, waves.length, generator),
  }
}

function pairAt(candidate: Candidate, waves: readonly HeadlineWave[], lag: number): LaggedPartners {
  const found = waves.flatMap((wave, w) => {
    const partner = partnerOf(candidate, wave, lag)
    return partner === null ? [] : [{ w, partner }]
  })
  return { waves: Int32Array.from(found, ({ w }) => w), partners: Float64Array.from(found, ({ partner }) => partner) }
}

function correlateLag(lag: number, partners: Float64Array, waves: readonly HeadlineWave[], interval: number): LagFinding {
  const values = Float64Array.from(waves, ({ value }) => value)
  const pairs = waves.length
  const r = pairs < 3 ? null : correlation(partners, values)
  if (r === null) return { lag, r, low: null, high: null, pairs, effective_pairs: null, corrected: null }
  const effective = effectivePairs(partners, values).value
  const bounds = effective === null ? null : fisherInterval(r, effective, interval)
  return {
    lag, r, low: bounds?.low ?? null, high: bounds?.high ?? null, pairs, effective_pairs: effective,
    corrected: correctedCorrelation(r, values, Float64Array.from(waves, ({ standardError }) => standardError)).value,
  }
}
