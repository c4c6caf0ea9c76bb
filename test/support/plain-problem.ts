import { groupCells } from '../../model/fit/build-problem.ts'
import type { FitProblem, FixedGroup } from '../../model/fit/problem.ts'

export interface PlainObservation {
  readonly step: number
  readonly value: number
  /** Known sampling variance; 0 by default. */
  readonly variance?: number
  /** Column of its group effect; none by default. */
  readonly group?: number
}

/**
 * One level walking in time, one observation a cell, and perhaps one group of standing effects: the textbook models that the
 * linking model holds as special cases. Scales are mu, then the group's (where there is one), then tau.
 */
export function plainProblem(observations: readonly PlainObservation[], options: {
  readonly steps: number; readonly groups?: number; readonly initialSd: number; readonly priors?: readonly number[]
}): FitProblem {
  const groups = options.groups ?? 0
  const names = ['mu', ...(groups > 0 ? ['group'] : []), 'tau']
  const sorted = [...observations].sort((a, b) => a.step - b.step)
  // an observation without an effect stands in a venue of its own that loads on none
  const fixedGroups: FixedGroup[] = groups > 0 ? [{ name: 'group', from: 0, count: groups, scale: 1 }] : []
  return {
    steps: options.steps, walks: 0,
    venueWalk: new Int32Array(groups + 1),
    venueFixed: Int32Array.from({ length: groups + 1 }, (_, v) => (v < groups ? v : -1)),
    groups: fixedGroups, border: groups,
    cells: {
      count: sorted.length, effects: [], pairs: [], mentions: new Float64Array(sorted.length).fill(1), levels: [],
      venues: groupCells(Int32Array.from(sorted, ({ step }) => step), Int32Array.from(sorted, ({ group }) => group ?? groups), new Int32Array(sorted.length), groups + 1, 1),
      mean: Float64Array.from(sorted, ({ value }) => value),
      variance: Float64Array.from(sorted, ({ variance }) => variance ?? 0),
    },
    coder: null,
    movementMultiplier: new Float64Array(options.steps).fill(1),
    scales: names.map((name, i) => ({ name, prior: options.priors?.[i] ?? 1 })),
    position: { mu: 0, drift: new Int32Array(0), venue: groups > 0 ? 1 : -1, tau: names.length - 1 },
    initialSd: options.initialSd,
  }
}
