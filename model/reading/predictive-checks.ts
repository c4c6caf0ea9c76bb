import type { Findings } from '../findings/schema.ts'
import { createGenerator, type Generator } from '../random/generator.ts'
import { estimateOf } from '../statistics/estimate.ts'
import type { Reading } from './context.ts'

type Check = Findings['diagnostics']['checks'][number]

/** Draws that are checked: enough for p-values as small as they are judged by, few enough not to be felt. */
const checkedDraws = 1000
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
    const cells = cellsOf(reading, v)
    if (cells.length < 10) return []
    const observed = { spread: new Float64Array(checkedDraws), memory: new Float64Array(checkedDraws) }
    const replicated = { spread: new Float64Array(checkedDraws), memory: new Float64Array(checkedDraws) }
    const generator = createGenerator(seed, firstStream + v)
    const residual = new Float64Array(cells.length)
    const noise = new Float64Array(cells.length)
    for (let k = 0; k < checkedDraws; k++) {
      const draw = Math.floor(k * reading.columns.count / checkedDraws)
      fillResiduals(reading, cells, draw, residual)
      fillNoise(generator, noise)
      observed.spread[k] = meanSquare(residual)
      replicated.spread[k] = meanSquare(noise)
      observed.memory[k] = stepMemory(reading, cells, residual)
      replicated.memory[k] = stepMemory(reading, cells, noise)
    }
    return (['spread', 'memory'] as const).map((check) => compare(check, name, observed[check], replicated[check], interval))
  })
  const tolerated = familyWise / (2 * Math.max(1, found.length))
  return found.map((check) => ({ ...check, passed: check.p > tolerated && check.p < 1 - tolerated }))
}

function cellsOf(reading: Reading, venue: number): Int32Array {
  const { cells } = reading.tables
  return Int32Array.from({ length: cells.count }, (_, c) => c).filter((c) => cells.levels[0][c] === venue)
}

/** (y_c - fitted) / sqrt(V_c + tau^2) with the states and tau of one draw. */
function fillResiduals(reading: Reading, cells: Int32Array, draw: number, target: Float64Array): void {
  const { tables, columns, sampling, posterior } = reading
  const scales = posterior.problem.scales.length
  const tau = posterior.draws.sigmas[draw * scales + posterior.problem.position.tau]
  for (let i = 0; i < cells.length; i++) {
    const c = cells[i]
    const t = tables.cells.step[c]
    let fitted = columns.mu[t][draw] + columns.drift[tables.cells.levels[0][c]][t][draw]
    for (let f = 0; f < columns.offset.length; f++) fitted += columns.offset[f][tables.cells.levels[f][c]][draw]
    target[i] = (tables.cells.mean[c] - fitted) / Math.sqrt(sampling.variance[c] + tau * tau)
  }
}

function fillNoise(generator: Generator, target: Float64Array): void {
  generator.fillNormal(target)
}

function meanSquare(values: Float64Array): number {
  let total = 0
  for (const x of values) total += x * x
  return total / values.length
}

/** Lag-one correlation over neighbouring steps of the step's summed residual, scaled to unit variance. */
function stepMemory(reading: Reading, cells: Int32Array, values: Float64Array): number {
  const { step } = reading.tables.cells
  let products = 0
  let squares = 0
  let before = { step: -2, value: 0 }
  for (let i = 0; i < cells.length;) {
    const t = step[cells[i]]
    let total = 0
    let n = 0
    for (; i < cells.length && step[cells[i]] === t; i++, n++) total += values[i]
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
