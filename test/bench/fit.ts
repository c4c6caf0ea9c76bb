import { execFileSync } from 'node:child_process'
import { fileURLToPath } from 'node:url'
import { samplingVariance } from '../../model/cells/sampling-variance.ts'
import { buildProblem } from '../../model/fit/build-problem.ts'
import { effortFor } from '../../model/fit/effort.ts'
import { localExecutor } from '../../model/fit/executor.ts'
import { samplePosterior } from '../../model/fit/posterior.ts'
import type { IntakeTables } from '../../model/intake/intake-tables.ts'
import { createGenerator } from '../../model/random/generator.ts'
import { analyseHere } from '../support/analyse-reference.ts'
import { referenceTables } from '../support/reference-cells.ts'
import { simulateCells } from '../support/simulate-cells.ts'

/*
 * What a fit costs, on one core: npx tsx test/bench/fit.ts [steps|jags]
 *   (nothing)  156 weekly steps, 5 venues, 6 topics, 3 classes, about 11,000 cells
 *   steps      156 against 1,560 steps
 *   jags       effective draws a second of the slowest standard deviation, beside JAGS on the same cells (needs R, jags, rjags, posterior)
 */
function brand(steps: number): IntakeTables {
  return simulateCells({
    steps, venues: 5, topics: 6, posters: 3, mentionsPerStep: 560,
    sigmas: { mu: 0.012, venueDrift: [0.015, 0.004, 0.002, 0.006, 0.0005], venue: 0.1, topic: 0.15, poster: 0.1, tau: 0.05 },
    mix: {
      venue: { from: [0.2, 0.35, 0.1, 0.15, 0.2], to: [0.4, 0.25, 0.1, 0.1, 0.15] }, poster: { from: [0.6, 0.25, 0.15], to: [0.4, 0.3, 0.3] },
      topic: { from: [0.2, 0.2, 0.2, 0.15, 0.15, 0.1], to: [0.4, 0.15, 0.1, 0.15, 0.1, 0.1] },
    },
  }, createGenerator(5, 0)).tables
}

async function timed<T>(work: () => Promise<T>): Promise<{ readonly seconds: number; readonly result: T }> {
  const start = performance.now()
  const result = await work()
  return { seconds: (performance.now() - start) / 1000, result }
}

const median = (values: readonly number[]) => [...values].sort((a, b) => a - b)[Math.floor(values.length / 2)]

async function fit(tables: IntakeTables, seed: number) {
  const problem = buildProblem(tables, samplingVariance(tables).variance)
  return timed(() => samplePosterior(problem, localExecutor(problem), { seed, ...effortFor(problem) }))
}

async function one(): Promise<void> {
  const tables = brand(156)
  const runs = [await fit(tables, 0), await fit(tables, 1), await fit(tables, 2), await fit(tables, 3)].slice(1)
  const whole = await timed(() => analyseHere(tables))
  const { result } = runs[0]
  process.stdout.write(`${tables.cells.count} cells: posterior ${median(runs.map(({ seconds }) => seconds)).toFixed(2)} s, with all findings ${whole.seconds.toFixed(2)} s; ` +
    `${result.sigmas.count} proposals worth ${result.effective.toFixed(0)}, ${result.draws.count} joint draws, Pareto k ${result.paretoK?.toFixed(2) ?? 'none'}\n`)
}

async function steps(): Promise<void> {
  const [short, long] = [brand(156), brand(1560)]
  const seconds = async (tables: IntakeTables) => median([await fit(tables, 1), await fit(tables, 2), await fit(tables, 3)].map((run) => run.seconds))
  await fit(short, 0)
  const [a, b] = [await seconds(short), await seconds(long)]
  process.stdout.write(`156 steps ${a.toFixed(2)} s, 1,560 steps ${b.toFixed(2)} s: ${(b / a).toFixed(1)} times\n`)
}

async function jags(): Promise<void> {
  const tables = referenceTables()
  await fit(tables, 0)
  const runs = [await fit(tables, 1), await fit(tables, 2), await fit(tables, 3)]
  const ours = median(runs.map(({ seconds, result }) => slowest(result) / seconds))
  const here = (name: string) => fileURLToPath(new URL(name, import.meta.url))
  const text = execFileSync('Rscript', [here('jags/time_jags.R'), here('../reference/mix-model-cells.csv'), '60', '2025-03-03', '2025-05-25'], { encoding: 'utf8' })
  const theirs = Number(/ess_per_second_min_sigma=([\d.]+)/.exec(text)?.[1])
  process.stdout.write(`${text}effective draws a second of the slowest standard deviation, whole fit: ${ours.toFixed(0)}; JAGS, sampling alone: ${theirs}; ${(ours / theirs).toFixed(0)} times\n`)
}

/**
 * Effective draws of the slowest standard deviation: for self-normalised weights, Var(sigma) over the variance of its estimated mean,
 * sum w^2 (sigma - mean)^2 (Owen 2013, Monte Carlo theory, methods and examples, section 9.2).
 */
function slowest({ sigmas, problem }: Awaited<ReturnType<typeof samplePosterior>>): number {
  const d = problem.scales.length
  return Math.min(...problem.scales.map((_, j) => {
    const value = (i: number) => sigmas.values[i * d + j]
    const mean = sigmas.weights.reduce((total, w, i) => total + w * value(i), 0)
    const variance = sigmas.weights.reduce((total, w, i) => total + w * (value(i) - mean) ** 2, 0)
    return variance / sigmas.weights.reduce((total, w, i) => total + w * w * (value(i) - mean) ** 2, 0)
  }))
}

const parts = { one, steps, jags }
const part = process.argv[2] ?? 'one'
await parts[part as keyof typeof parts]()
