import type { FitProblem } from '../../model/fit/problem.ts'
import { stateWidth } from '../../model/fit/states.ts'
import type { IntakeTables } from '../../model/intake/intake-tables.ts'
import type { TargetMix } from '../../model/cells/target-mix.ts'

/**
 * The quantities of the reference posterior as linear functions of the states (mu, e_1 .. e_W per step, then the border),
 * named as there. `drift.VENUE.FIRST_STEP` is 0 exactly and left out.
 */
export function referenceFunctions(problem: FitProblem, tables: IntakeTables, mix: TargetMix): ReadonlyMap<string, Float64Array> {
  const { steps, periods, periodOf, inBase } = tables.timeline
  const [venues, topics, posters] = tables.factors.map(({ levels }) => levels.map(({ name }) => name))
  const block = 1 + problem.walks
  const width = stateWidth(problem)
  const out = new Map<string, Float64Array>()
  const vector = (entries: readonly (readonly [number, number])[]) => {
    const c = new Float64Array(width)
    for (const [index, weight] of entries) c[index] += weight
    return c
  }
  const plus = (...parts: readonly (readonly [Float64Array, number])[]) => {
    const c = new Float64Array(width)
    for (const [part, weight] of parts) part.forEach((x, i) => { c[i] += weight * x })
    return c
  }
  const mu = (t: number) => vector([[t * block, 1]])
  const alpha = venues.map((_, v) => vector([[problem.venueWalk[v], 1]]))
  const drift = (v: number, t: number) => vector([[t * block + problem.venueWalk[v], 1], [problem.venueWalk[v], -1]])
  const fixed = (name: string, levels: readonly string[]) => {
    const from = steps.length * block + problem.groups.find((group) => group.name === name)!.from
    return levels.map((_, i) => vector([[from + i, 1]]))
  }
  const offsets = [alpha, fixed('topic', topics), fixed('poster', posters)]
  const centre = plus(...offsets.flatMap((columns, f) => columns.map((column, i): [Float64Array, number] => [column, mix.shares[f][i]])))
  const adjusted = steps.map((_, t) => plus([mu(t), 1], [centre, 1]))
  const meanOf = (which: readonly number[]) => plus(...which.map((t): [Float64Array, number] => [adjusted[t], 1 / which.length]))
  const all = steps.map((_, t) => t)
  const last = steps.length - 1
  const base = meanOf(all.filter((t) => inBase[t] === 1))

  steps.forEach((step, t) => {
    out.set(`adjusted.${step}`, adjusted[t])
    out.set(`mu.${step}`, mu(t))
    venues.forEach((venue, v) => { if (t > 0) out.set(`drift.${venue}.${step}`, drift(v, t)) })
  })
  const last4 = meanOf(all.slice(-4))
  const prior4 = meanOf(all.slice(-8, -4))
  out.set('change.last4_minus_prior4', plus([last4, 1], [prior4, -1]))
  out.set('mean.last4', last4)
  out.set('mean.prior4', prior4)
  out.set('change.last_step_minus_first', plus([adjusted[last], 1], [adjusted[0], -1]))
  out.set('change.last_step_minus_previous', plus([adjusted[last], 1], [adjusted[last - 1], -1]))
  out.set('mean.base', base)
  const periodMean = periods.map((_, p) => meanOf(all.filter((t) => periodOf[t] === p)))
  periods.forEach(({ name }, p) => {
    out.set(`period.${name}`, periodMean[p])
    if (p > 0) out.set(`period_change.${name}`, plus([periodMean[p], 1], [periodMean[p - 1], -1]))
  })
  out.set('since_base.last_period', plus([periodMean[periods.length - 1], 1], [base, -1]))
  const kinds = [['venue', venues], ['topic', topics], ['poster', posters]] as const
  kinds.forEach(([kind, levels], f) => {
    levels.forEach((level, i) => {
      out.set(`${kind}_offset.${level}`, offsets[f][i])
      if (i > 0) out.set(`${kind}_contrast.${level}-${levels[0]}`, plus([offsets[f][i], 1], [offsets[f][0], -1]))
    })
  })
  venues.forEach((venue, v) => {
    const venueCentre = venues.map((_, u): [Float64Array, number] => [alpha[u], -mix.shares[0][u]])
    out.set(`venue_end_contrast_base.${venue}`, plus([alpha[v], 1], [drift(v, last), 1], ...venueCentre))
    out.set(`drift_last.${venue}`, drift(v, last))
    const baseSteps = all.filter((t) => inBase[t] === 1)
    out.set(`drift_since_base.${venue}`, plus([drift(v, last), 1], ...baseSteps.map((t): [Float64Array, number] => [drift(v, t), -1 / baseSteps.length])))
  })
  return out
}
