import type { CoderCorrection } from '../coder/audit.ts'
import type { FitTables } from '../intake/intake-tables.ts'
import { priors, walkFactor } from './priors.ts'
import type { EffectRuns, FitCells, FitProblem, FixedGroup, Scale, ScalePositions } from './problem.ts'

/**
 * Lay out the model of section 2 for these tables: which venue walks, which effects stand still, where each
 * standard deviation sits. A factor with one level has no effect term; one venue alone has no drift.
 *
 * @param variance - shape (cells), V_c of every cell
 * @param coder - what the cells' means were corrected by
 */
export function buildProblem(tables: FitTables, variance: Float64Array, coder: CoderCorrection | null = null): FitProblem {
  const steps = tables.timeline.steps.length
  const venueLevels = tables.factors[0].levels
  const several = venueLevels.length > 1
  const walking = several ? venueLevels.flatMap((level, v) => (level.anchor ? [] : [v])) : []
  const factor = walkFactor(tables.timeline.stepDays)

  const scales: Scale[] = [{ name: 'mu', prior: priors.mu * factor }]
  const drift = Int32Array.from(walking, (v) => scales.push({ name: `venue_drift.${venueLevels[v].name}`, prior: priors.venueDrift * factor }) - 1)
  const venueScale = several ? scales.push({ name: 'venue', prior: priors.fixedFactor }) - 1 : -1

  const groups: FixedGroup[] = []
  let border = 0
  const addGroup = (name: string, count: number, scale: number): number => {
    const from = border
    groups.push({ name, from, count, scale })
    border += count
    return from
  }
  const venueWalk = new Int32Array(venueLevels.length)
  walking.forEach((v, w) => { venueWalk[v] = w + 1 })
  const venueFixed = new Int32Array(venueLevels.length).fill(-1)
  const anchored = several ? venueLevels.flatMap((level, v) => (level.anchor ? [v] : [])) : []
  if (anchored.length > 0) {
    const from = addGroup('venue', anchored.length, venueScale)
    anchored.forEach((v, i) => { venueFixed[v] = from + i })
  }
  const columns: FactorColumns[] = []
  tables.factors.forEach(({ name, levels }, f) => {
    if (f === 0 || levels.length < 2) return
    columns.push({ factor: f, from: addGroup(name, levels.length, scales.push({ name, prior: priors.fixedFactor }) - 1) })
  })
  const tau = scales.push({ name: 'tau', prior: priors.tau }) - 1
  const position: ScalePositions = { mu: 0, drift, venue: venueScale, tau }
  return {
    steps, walks: walking.length, venueWalk, venueFixed, groups, border,
    cells: layCells(tables, columns, border, variance), coder,
    movementMultiplier: new Float64Array(steps).fill(1),
    scales, position, initialSd: priors.initial,
  }
}

interface FactorColumns {
  readonly factor: number
  /** Border column of the factor's first level. */
  readonly from: number
}

function layCells(tables: FitTables, factors: readonly FactorColumns[], border: number, variance: Float64Array): FitCells {
  const { cells } = tables
  const columns = factors.map(({ factor, from }) => cells.levels[factor].map((level) => from + level))
  const still = new Int32Array(cells.count)
  const venues = tables.factors[0].levels.length
  return {
    count: cells.count, mean: cells.mean, mentions: cells.mentions, levels: cells.levels, variance,
    venues: groupCells(cells.step, cells.levels[0], still, venues, 1),
    effects: columns.map((column) => groupCells(cells.step, cells.levels[0], column, venues, border)),
    // a later factor's columns lie further right: its row holds the pair in the lower triangle
    pairs: columns.flatMap((column, i) => columns.slice(0, i).map((earlier) => column.map((place, c) => place * border + earlier[c]))),
  }
}

/** Group cells by step, venue and column. */
export function groupCells(step: Int32Array, venue: Int32Array, column: Int32Array, venues: number, columns: number): EffectRuns {
  const key = Float64Array.from(step, (t, c) => (t * venues + venue[c]) * columns + column[c])
  const order = Int32Array.from(key.keys()).sort((a, b) => key[a] - key[b] || a - b)
  const firsts = Array.from(order.keys()).filter((i) => i === 0 || key[order[i]] !== key[order[i - 1]])
  const of = (values: Int32Array) => Int32Array.from(firsts, (i) => values[order[i]])
  return { order, start: Int32Array.from([...firsts, order.length]), step: of(step), venue: of(venue), column: of(column) }
}
