import type { Findings } from '../findings/schema.ts'
import { createGenerator } from '../random/generator.ts'
import { estimateOf } from '../statistics/estimate.ts'
import type { Reading } from './context.ts'

type Check = Findings['diagnostics']['checks'][number]

/** Draws that are checked: enough for p-values as small as they are judged by, few enough not to be felt. */
const checkedDraws = 500
/** Streams of the seed set aside for replicates, away from those of the states. */
const firstStream = 1_000_000
/** Probability that a right model fails any of a review's checks: shared out over all of them (Bonferroni). */
const familyWise = 0.02

/**
 * Posterior predictive checks per venue: does the model reproduce what it was fitted to? Two realised discrepancies
 * (Gelman, Meng and Stern 1996, Statistica Sinica 6:733), each compared draw by draw with that of a replicate:
 *
 *   spread     mean squared standardised residual of the venue's cells
 *   memory     lag-one correlation of the venue's standardised step residuals: movement the walks have missed
 *
 * @returns p = P(replicate >= observed); `passed` where it is not extreme, judged over all checks together. A venue of fewer than ten cells is not judged.
 */
export function readChecks(reading: Reading, seed: number, interval: number): Check[] {
  const found = reading.tables.factors[0].levels.flatMap(({ name }, v) => {
    const cells = venueCells(reading, v)
    if (cells.count < 10) return []
    const observed = { spread: new Float64Array(checkedDraws), memory: new Float64Array(checkedDraws) }
    const replicated = { spread: new Float64Array(checkedDraws), memory: new Float64Array(checkedDraws) }
    const generator = createGenerator(seed, firstStream + v)
    const residual = new Float64Array(cells.count)
    const noise = new Float64Array(cells.count)
    for (let k = 0; k < checkedDraws; k++) {
      fillResiduals(reading, v, cells, Math.floor(k * reading.columns.count / checkedDraws), residual)
      generator.fillNormal(noise)
      observed.spread[k] = meanSquare(residual)
      replicated.spread[k] = meanSquare(noise)
      observed.memory[k] = stepMemory(cells, residual)
      replicated.memory[k] = stepMemory(cells, noise)
    }
    return (['spread', 'memory'] as const).map((check) => compare(check, name, observed[check], replicated[check], interval))
  })
  const tolerated = familyWise / (2 * Math.max(1, found.length))
  return found.map((check) => ({ ...check, passed: check.p > tolerated && check.p < 1 - tolerated }))
}

/** One venue's cells, gathered once: the checks run over them thousands of times. */
interface VenueCells {
  readonly count: number
  readonly step: Int32Array
  /** Per factor other than venue, the cell's level. */
  readonly levels: readonly Int32Array[]
  /** As the fit took them. */
  readonly mean: Float64Array
  readonly variance: Float64Array
  /** Means as one draw of the coder's errors has them; the same array where nothing is corrected. */
  meanOf(draw: number): Float64Array
}

function venueCells({ tables: { cells }, sampling, posterior }: Reading, venue: number): VenueCells {
  const own = Int32Array.from({ length: cells.count }, (_, c) => c).filter((c) => cells.levels[0][c] === venue)
  const mean = Float64Array.from(own, (c) => posterior.problem.cells.mean[c])
  return {
    count: own.length,
    step: own.map((c) => cells.step[c]),
    levels: cells.levels.slice(1).map((level) => own.map((c) => level[c])),
    mean,
    variance: Float64Array.from(own, (c) => sampling.variance[c]),
    meanOf: (draw) => rescoredMeans(posterior, venue, own, draw) ?? mean,
  }
}

/** null where the venue's scores stand as coded. */
function rescoredMeans({ problem: { coder, cells }, weights }: Reading['posterior'], venue: number, own: Int32Array, draw: number): Float64Array | null {
  const scores = weights?.[draw][venue] ?? null
  if (coder === null || scores === null) return null
  const k = scores.length
  return Float64Array.from(own, (c) => scores.reduce((sum, score, l) => sum + score * coder.labels.counts[c * k + l], 0) / cells.mentions[c])
}

/** (y_c - fitted) / sqrt(V_c + tau^2) with the states and tau of one draw. */
function fillResiduals({ columns, posterior }: Reading, venue: number, cells: VenueCells, draw: number, target: Float64Array): void {
  const scales = posterior.problem.scales.length
  const tau = posterior.draws.sigmas[draw * scales + posterior.problem.position.tau]
  const level = Float64Array.from(columns.mu, (mu, t) => mu[draw] + columns.drift[venue][t][draw] + columns.offset[0][venue][draw])
  const offsets = columns.offset.slice(1).map((levels) => Float64Array.from(levels, (column) => column[draw]))
  const mean = cells.meanOf(draw)
  for (let i = 0; i < cells.count; i++) {
    let fitted = level[cells.step[i]]
    for (let f = 0; f < offsets.length; f++) fitted += offsets[f][cells.levels[f][i]]
    target[i] = (mean[i] - fitted) / Math.sqrt(cells.variance[i] + tau * tau)
  }
}

function meanSquare(values: Float64Array): number {
  let total = 0
  for (const x of values) total += x * x
  return total / values.length
}

/** Lag-one correlation over neighbouring steps of the step's summed residual, scaled to unit variance. */
function stepMemory({ count, step }: VenueCells, values: Float64Array): number {
  let products = 0
  let squares = 0
  let before = { step: -2, value: 0 }
  for (let i = 0; i < count;) {
    const t = step[i]
    let total = 0
    let n = 0
    for (; i < count && step[i] === t; i++, n++) total += values[i]
    const value = total / Math.sqrt(n)
    if (before.step === t - 1) products += before.value * value
    squares += value * value
    before = { step: t, value }
  }
  return squares === 0 ? 0 : products / squares
}

function compare(check: 'spread' | 'memory', venue: string, observed: Float64Array, replicated: Float64Array, interval: number): Omit<Check, 'passed'> {
  let above = 0
  for (let k = 0; k < observed.length; k++) if (replicated[k] >= observed[k]) above += 1
  const p = above / observed.length
  return {
    name: check, venue, observed: observed.reduce((a, b) => a + b, 0) / observed.length,
    predicted: estimateOf(replicated, interval), p,
  }
}
