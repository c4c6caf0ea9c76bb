import type { Estimate } from '../findings/schema.ts'
import { average, difference } from '../reading/draw-columns.ts'
import { correlation } from '../statistics/correlation.ts'
import { twoSidedQuantile } from '../statistics/wilson.ts'
import { caveat, type CaveatRule } from './rule.ts'

/** Change of a level's share of mentions, as a share, from which the mix is said to have moved. */
const mixMoved = 0.05
/** Share of mentions by the top 1 % of authors from which a few are said to be heard over the many. */
const concentrated = 0.25
/** Posterior correlation of opinion's change and the venues' common drift beyond which the two are hard to tell apart. */
const entangled = 0.7
/** A last step further than this many predictive standard deviations from what came before is a sharp move. */
const sharp = 3

/** Caveats that rest on the fit: what the figures can bear. */
export const fitRules: readonly CaveatRule[] = [
  ({ findings }) => (findings.diagnostics.converged ? [] : [caveat('serious', 'fit-not-converged', { pareto_k: findings.diagnostics.pareto_k ?? 1, ess: findings.diagnostics.ess })]),
  ({ findings }) => {
    const labels = new Map(findings.venues.map(({ venue, label }) => [venue, label]))
    const failed = new Set(findings.diagnostics.checks.filter((check) => !check.passed).map((check) => check.venue ?? ''))
    return [...failed].map((venue) => caveat('serious', 'model-misfit', { venue: labels.get(venue) ?? venue }))
  },
  ({ findings }) => {
    const { opinion: { raw_change: raw, change }, decomposition, interval } = findings
    return raw !== null && change !== null && decomposition !== null && partsWays(raw, change, decomposition.chance_sd, interval)
      ? [caveat('serious', 'pooled-average-misleads', { raw_change: raw, change: change.mean })] : []
  },
  ({ findings }) => {
    const top = findings.speaking.concentration.period?.top_share
    return top !== undefined && top > concentrated ? [caveat('caution', 'concentration', { share: top })] : []
  },
  ({ findings }) => {
    const factors = [
      { factor: 'venue', levels: findings.venues }, { factor: 'topic', levels: findings.topics }, { factor: 'poster', levels: findings.posters }, ...findings.factors,
    ]
    // one caveat a factor, for the level that moved most: the others' shares had to give way
    return factors.flatMap(({ factor, levels }) => {
      const moves = levels.flatMap(({ label, share, share_previous: before }) => (before === null ? [] : [{ label, from: before, to: share }]))
      const most = moves.reduce<(typeof moves)[number] | null>((a, b) => (a === null || Math.abs(b.to - b.from) > Math.abs(a.to - a.from) ? b : a), null)
      return most === null || Math.abs(most.to - most.from) < mixMoved ? [] : [caveat('note', 'mix-moved', { factor, level: most.label, from: most.from, to: most.to })]
    })
  },
  ({ reading }) => {
    const { columns, previousSteps, periodSteps } = reading
    const walking = columns.drift.filter((venue) => venue.some((column) => column.some((x) => x !== 0)))
    if (previousSteps === null || walking.length === 0) return []
    const change = (of: readonly Float64Array[]) => difference(average(periodSteps.map((t) => of[t])), average(previousSteps.map((t) => of[t])))
    const r = correlation(change(columns.mu), average(walking.map(change)))
    return r !== null && Math.abs(r) > entangled ? [caveat('caution', 'opinion-drift-entangled', { correlation: r })] : []
  },
  ({ findings }) => {
    const { series } = findings.opinion
    const steps = series.filter((step, t) => step.in_period && t > 0 && isSharp(series[t - 1].adjusted.mean, step.adjusted.mean, findings.scales.mu.mean)).length
    return steps === 0 ? [] : [caveat('caution', 'sharp-move', { steps })]
  },
]

/**
 * Who reads the raw average reads something else than opinion: its change lies outside the interval of what opinion did, and its gap to that is more than
 * sampling alone makes in so few mentions, |raw - opinion| > z chance_sd, with z the normal deviate of the interval (`rawChangeChance`).
 */
function partsWays(raw: number, { mean, low, high }: Estimate, chanceSd: number, interval: number): boolean {
  return (raw < low || raw > high) && Math.abs(raw - mean) > twoSidedQuantile(interval) * chanceSd
}

/** The walk's own step is rarely further than this: a move that is may be larger still than it is shown. */
function isSharp(before: number, now: number, stepSd: number): boolean {
  return Math.abs(now - before) > sharp * stepSd
}
