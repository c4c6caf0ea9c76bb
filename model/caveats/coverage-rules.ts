import type { Reading } from '../reading/context.ts'
import { quantiles } from '../statistics/quantile.ts'
import { caveat, type CaveatGrounds, type CaveatRule } from './rule.ts'

// The thresholds are ours: 3.5 robust standard deviations is a common bound for outliers, the rest is judgement.
/** Robust standard deviations from the usual volume beyond which coverage is said to have broken. */
const broken = 3.5
/** Earlier periods looked at, at most and at least. */
const longest = 24
const shortest = 6
/** The usual scatter of log volume is taken to be no less than this, or a history without any would be broken by a single mention. */
const leastScatter = 0.1
/** Makes a median absolute deviation a standard deviation where volumes are log-normal: 1 / the normal quantile of 0.75. */
const consistent = 1.4826

/** Volume of this period far from what the periods before lead one to expect: what was collected may have changed. In all and venue by venue. */
export const coverageRules: readonly CaveatRule[] = [
  ({ findings, reading }) => {
    const [now, ...earlier] = findings.opinion.periods.map(({ period, mentions }) => ({ period, mentions })).reverse()
    const usual = now && usualUnlessBroken(now, earlier, reading)
    return now && usual ? [caveat('caution', 'coverage-break', { scope: 'all', venue: '', mentions: now.mentions, usual })] : []
  },
  (grounds) => grounds.findings.venues.flatMap(({ venue, label }) => {
    const [now, ...earlier] = volumesOf(venue, grounds)
    const usual = now && usualUnlessBroken(now, earlier, grounds.reading)
    return now && usual ? [caveat('caution', 'coverage-break', { scope: 'venue', venue: label, mentions: now.mentions, usual })] : []
  }),
]

const median = (values: readonly number[]) => quantiles(values, [0.5])[0]

interface Volume { readonly period: string, readonly mentions: number }

/** Of one venue, the latest period first; nothing before the venue was first heard, which is another caveat. */
function volumesOf(venue: string, { findings }: CaveatGrounds): readonly Volume[] {
  const volumes = findings.speaking.mix.filter(({ factor, level }) => factor === 'venue' && level === venue)
  const first = volumes.findIndex(({ mentions }) => mentions > 0)
  return first < 0 ? [] : volumes.slice(first).reverse()
}

/** What the period would usually hold, if what it holds is far from that; undefined otherwise, and where the history is too short. */
function usualUnlessBroken(now: Volume, earlier: readonly Volume[], reading: Reading): number | undefined {
  const { periods, periodOf } = reading.tables.timeline
  // per step: months of four weeks and of five are not alike, and the first may not be whole
  const stepsIn = (name: string) => periodOf.filter((p) => periods[p]?.name === name).length
  const logOf = ({ period, mentions }: Volume) => Math.log((mentions + 0.5) / Math.max(1, stepsIn(period)))
  if (earlier.length < shortest) return undefined
  const history = earlier.slice(0, longest).map(logOf)
  const middle = median(history)
  const scatter = Math.max(leastScatter, consistent * median(history.map((x) => Math.abs(x - middle))))
  return Math.abs(logOf(now) - middle) > broken * scatter ? Math.exp(middle) * Math.max(1, stepsIn(now.period)) : undefined
}
