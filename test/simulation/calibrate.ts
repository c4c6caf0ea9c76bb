import { samplingVariance } from '../../model/cells/sampling-variance.ts'
import { targetMix } from '../../model/cells/target-mix.ts'
import { buildProblem } from '../../model/fit/build-problem.ts'
import { localExecutor } from '../../model/fit/executor.ts'
import { samplePosterior } from '../../model/fit/posterior.ts'
import { createGenerator } from '../../model/random/generator.ts'
import { createReading } from '../../model/reading/context.ts'
import { average, difference } from '../../model/reading/draw-columns.ts'
import { simulateCells, type Simulation } from '../support/simulate-cells.ts'
import { chiSquareTail } from './chi-square.ts'

/*
 * Simulation-based calibration (Talts, Betancourt, Simpson, Vehtari and Gelman 2018): truth drawn from the priors, data from the truth, the posterior fitted to the
 * data; over many replicates the rank of the truth among the draws is uniform if the computation is right.
 *
 *   npm run calibrate [-- REPLICATES [SEED]]
 */
const replicates = Number(process.argv[2] ?? 400)
const seed = Number(process.argv[3] ?? 2026)
const ranked = 99
const bins = 20

/** Truth and draws of one quantity. */
interface Ranked {
  readonly name: string
  readonly truth: number
  readonly draws: Float64Array
}

async function quantitiesOf({ tables, truth }: Simulation, replicate: number): Promise<Ranked[]> {
  const sampling = samplingVariance(tables)
  const problem = buildProblem(tables, sampling.variance)
  const posterior = await samplePosterior(problem, localExecutor(problem), { seed: replicate, proposals: 4000, draws: 1980 })
  const reading = createReading(tables, tables, targetMix(tables), sampling, posterior, 0.9)
  const { adjusted, columns, periodSteps, previousSteps } = reading
  const last = tables.timeline.steps.length - 1
  const meanOf = (values: ArrayLike<number>, steps: readonly number[]) => steps.reduce((total, t) => total + values[t], 0) / steps.length
  const change = difference(average(periodSteps.map((t) => adjusted[t])), average(previousSteps!.map((t) => adjusted[t])))
  const d = problem.scales.length
  const scale = (name: string) => problem.scales.findIndex((candidate) => candidate.name === name)
  const sigma = (name: string, value: number): Ranked => ({ name: `sigma ${name}`, truth: value, draws: Float64Array.from({ length: posterior.draws.count }, (_, i) => posterior.draws.sigmas[i * d + scale(name)]) })
  const contrast = (factor: number, name: string): Ranked => ({ name, truth: truth.offsets[factor][1] - truth.offsets[factor][0], draws: difference(columns.offset[factor][1], columns.offset[factor][0]) })
  return [
    { name: 'opinion, last step', truth: truth.adjusted[last], draws: adjusted[last] },
    { name: 'opinion, change of period', truth: meanOf(truth.adjusted, periodSteps) - meanOf(truth.adjusted, previousSteps!), draws: change },
    { name: 'opinion, last less first step', truth: truth.mu[last] - truth.mu[0], draws: difference(columns.mu[last], columns.mu[0]) },
    ...tables.factors[0].levels.map((_, v): Ranked => ({ name: `drift ${v + 1}, last step`, truth: truth.drift[v][last], draws: columns.drift[v][last] })),
    contrast(0, 'venue offsets'), contrast(1, 'topic offsets'), contrast(2, 'poster offsets'),
    sigma('mu', truth.sigmas.mu), sigma('venue', truth.sigmas.venue), sigma('topic', truth.sigmas.topic), sigma('poster', truth.sigmas.poster), sigma('tau', truth.sigmas.tau),
    ...tables.factors[0].levels.map(({ name }, v) => sigma(`venue_drift.${name}`, truth.sigmas.venueDrift[v])),
  ]
}

/** How many of evenly spaced draws lie below the truth: 0 .. ranked. */
function rankOf({ truth, draws }: Ranked): number {
  let rank = 0
  for (let k = 0; k < ranked; k++) if (draws[Math.floor(k * draws.length / ranked)] < truth) rank += 1
  return rank
}

const counts = new Map<string, number[]>()
const start = performance.now()
for (let replicate = 0; replicate < replicates; replicate++) {
  const simulation = simulateCells({ steps: 26, venues: 3, topics: 3, posters: 2, mentionsPerStep: 180, sigmas: 'prior' }, createGenerator(seed, replicate))
  for (const quantity of await quantitiesOf(simulation, replicate)) {
    const row = counts.get(quantity.name) ?? new Array<number>(bins).fill(0)
    row[Math.floor(rankOf(quantity) * bins / (ranked + 1))] += 1
    counts.set(quantity.name, row)
  }
}
const expected = replicates / bins
process.stdout.write(`${replicates} replicates, ${bins} bins, ${((performance.now() - start) / 1000).toFixed(0)} s\nquantity                        chi-square    p   below 5 %  above 95 %\n`)
for (const [name, row] of counts) {
  const chiSquare = row.reduce((total, count) => total + (count - expected) ** 2 / expected, 0)
  const [low, high] = [row[0] / replicates, row[bins - 1] / replicates]
  process.stdout.write(`${name.padEnd(32)}${chiSquare.toFixed(1).padStart(8)}${chiSquareTail(chiSquare, bins - 1).toFixed(3).padStart(8)}${low.toFixed(3).padStart(10)}${high.toFixed(3).padStart(12)}\n`)
}
