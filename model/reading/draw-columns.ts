import type { Posterior } from '../fit/posterior.ts'
import { stateWidth } from '../fit/states.ts'
import type { IntakeTables } from '../intake/intake-tables.ts'

/**
 * The joint draws by quantity: one array over draws per state, so that every linear reading is a sum of arrays.
 * On the score's own scale [-1, 1].
 */
export interface DrawColumns {
  readonly count: number
  /** mu[t], shape (steps) of (draws). */
  readonly mu: readonly Float64Array[]
  /** d[v,t], shape (venues, steps) of (draws): 0 for an anchor and for a venue alone. */
  readonly drift: readonly (readonly Float64Array[])[]
  /** Offsets of every level of every factor, venue first, shape (factors, levels) of (draws): 0 for a factor with one level. */
  readonly offset: readonly (readonly Float64Array[])[]
}

/** Undo the layout of `FitProblem`: alpha[v] is the walk's first step, d[v,t] what it has moved since. */
export function drawColumns(tables: IntakeTables, posterior: Posterior): DrawColumns {
  const { problem, draws: { count, states } } = posterior
  const width = stateWidth(problem)
  const block = 1 + problem.walks
  const zero = new Float64Array(count)
  const column = (component: number): Float64Array => {
    const out = new Float64Array(count)
    for (let i = 0; i < count; i++) out[i] = states[i * width + component]
    return out
  }
  const fixedFrom = problem.steps * block
  const steps = Array.from({ length: problem.steps }, (_, t) => t)
  const walks = Array.from(problem.venueWalk, (w) => (w === 0 ? null : steps.map((t) => column(t * block + w))))
  const venueOffsets = walks.map((walk, v) => walk?.[0] ?? (problem.venueFixed[v] < 0 ? zero : column(fixedFrom + problem.venueFixed[v])))
  const others = tables.factors.slice(1).map(({ name, levels }) => {
    const group = problem.groups.find((candidate) => candidate.name === name)
    return levels.map((_, l) => (group === undefined ? zero : column(fixedFrom + group.from + l)))
  })
  return {
    count,
    mu: steps.map((t) => column(t * block)),
    drift: walks.map((walk) => steps.map((t) => (walk === null || t === 0 ? zero : difference(walk[t], walk[0])))),
    offset: [venueOffsets, ...others],
  }
}

/** a - b, draw by draw. */
export function difference(a: Float64Array, b: Float64Array): Float64Array {
  const out = new Float64Array(a.length)
  for (let i = 0; i < out.length; i++) out[i] = a[i] - b[i]
  return out
}

/** a + b, draw by draw. */
export function sum(a: Float64Array, b: Float64Array): Float64Array {
  const out = new Float64Array(a.length)
  for (let i = 0; i < out.length; i++) out[i] = a[i] + b[i]
  return out
}

/** Weighted sum of columns, draw by draw: all zero where there are none. */
export function combine(columns: readonly Float64Array[], weights: ArrayLike<number>, count: number): Float64Array {
  const out = new Float64Array(count)
  columns.forEach((column, c) => {
    const weight = weights[c]
    if (weight === 0) return
    for (let i = 0; i < count; i++) out[i] += weight * column[i]
  })
  return out
}

/** Plain mean of columns, draw by draw; at least one column. */
export function average(columns: readonly Float64Array[]): Float64Array {
  return combine(columns, new Float64Array(columns.length).fill(1 / columns.length), columns[0].length)
}
