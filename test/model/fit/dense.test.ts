import fc from 'fast-check'
import { expect, test } from 'vitest'
import { buildProblem } from '../../../model/fit/build-problem.ts'
import { createWorkspace, logEvidence } from '../../../model/fit/evidence.ts'
import type { IntakeTables } from '../../../model/intake/intake-tables.ts'
import { createGenerator } from '../../../model/random/generator.ts'

/*
 * The model written down literally, as the covariance of the cells, against the bordered factor: one to three venues, anchors, any number of
 * factors, empty steps, day, week and month grids.
 */
interface Shape {
  readonly steps: number
  readonly stepDays: number
  /** One entry per venue: is it an anchor? */
  readonly anchors: readonly boolean[]
  /** Levels of each further factor. */
  readonly factors: readonly number[]
  readonly seed: number
}

const shape: fc.Arbitrary<Shape> = fc.record({
  steps: fc.integer({ min: 1, max: 6 }), stepDays: fc.constantFrom(1, 7, 30.4375),
  anchors: fc.array(fc.boolean(), { minLength: 1, maxLength: 3 }),
  factors: fc.array(fc.integer({ min: 1, max: 3 }), { maxLength: 3 }),
  seed: fc.integer({ min: 0, max: 1e6 }),
})

/** A table with cells at random, some steps empty, some cells twice. */
function tableOf({ steps, stepDays, anchors, factors, seed }: Shape): IntakeTables {
  const generator = createGenerator(seed, 0)
  const sizes = [anchors.length, ...factors]
  const drawn = Array.from({ length: 14 }, () => ({ step: generator.integer(steps), levels: sizes.map((size) => generator.integer(size)) })).sort((a, b) => a.step - b.step)
  const names = ['venue', 'topic', 'poster', 'language']
  return {
    timeline: { stepDays, steps: Array.from({ length: steps }, (_, t) => String(t)) },
    factors: sizes.map((size, f) => ({ name: names[f], levels: Array.from({ length: size }, (_, l) => ({ name: `l${l}`, label: '', ...(f === 0 && anchors[l] ? { anchor: true } : {}) })) })),
    cells: {
      count: drawn.length, step: Int32Array.from(drawn, ({ step }) => step),
      levels: sizes.map((_, f) => Int32Array.from(drawn, ({ levels }) => levels[f])),
      mean: Float64Array.from(drawn, () => 0.3 * generator.normal()),
    },
  } as unknown as IntakeTables
}

function denseLogLikelihood(tables: IntakeTables, variance: Float64Array, sigmaOf: (name: string) => number): number {
  const { cells, factors } = tables
  const several = factors[0].levels.length > 1
  const covariance = Array.from({ length: cells.count }, (_, a) => Array.from({ length: cells.count }, (__, b) => {
    const walked = Math.min(cells.step[a], cells.step[b])
    let sum = 0.25 + walked * sigmaOf('mu') ** 2 + (a === b ? variance[a] + sigmaOf('tau') ** 2 : 0)
    factors.forEach(({ name, levels }, f) => {
      if (levels.length > 1 && cells.levels[f][a] === cells.levels[f][b]) sum += sigmaOf(name) ** 2
    })
    const venue = factors[0].levels[cells.levels[0][a]]
    if (several && cells.levels[0][a] === cells.levels[0][b] && venue.anchor !== true) sum += walked * sigmaOf(`venue_drift.${venue.name}`) ** 2
    return sum
  }))
  const l = covariance.map((row) => row.map(() => 0))
  let logLikelihood = -0.5 * cells.count * Math.log(2 * Math.PI)
  const z = new Float64Array(cells.count)
  for (let i = 0; i < cells.count; i++) {
    for (let j = 0; j <= i; j++) {
      const rest = covariance[i][j] - l[i].reduce((total, x, k) => total + (k < j ? x * l[j][k] : 0), 0)
      l[i][j] = i === j ? Math.sqrt(rest) : rest / l[j][j]
    }
    z[i] = (cells.mean[i] - l[i].reduce((total, x, k) => total + (k < i ? x * z[k] : 0), 0)) / l[i][i]
    logLikelihood -= Math.log(l[i][i]) + 0.5 * z[i] * z[i]
  }
  return logLikelihood
}

test('the evidence is that of the model written down literally', () => {
  fc.assert(fc.property(shape, (given) => {
    const tables = tableOf(given)
    const generator = createGenerator(given.seed, 1)
    const variance = Float64Array.from({ length: tables.cells.count }, () => 0.01 + 0.2 * generator.uniform())
    const problem = buildProblem(tables, variance)
    const sigma = Float64Array.from(problem.scales, ({ prior }) => prior * (0.2 + 2 * generator.uniform()))
    const named = new Map(problem.scales.map(({ name }, j) => [name, sigma[j]]))
    const expected = denseLogLikelihood(tables, variance, (name) => named.get(name)!)
    expect(Math.abs(logEvidence(problem, sigma, createWorkspace(problem)) - expected)).toBeLessThan(1e-8)
  }), { numRuns: 300 })
})

test('walks are scaled to the length of a step, other scales are not', () => {
  const priorOf = (stepDays: number) => new Map(buildProblem(tableOf({ steps: 3, stepDays, anchors: [false, false], factors: [2], seed: 1 }), new Float64Array(14).fill(0.1)).scales.map(({ name, prior }) => [name, prior]))
  expect(priorOf(7).get('mu')).toBeCloseTo(0.03, 12)
  expect(priorOf(1).get('mu')).toBeCloseTo(0.03 / Math.sqrt(7), 12)
  expect(priorOf(30.4375).get('venue_drift.l0')).toBeCloseTo(0.02 * Math.sqrt(30.4375 / 7), 12)
  expect(priorOf(1).get('tau')).toBe(0.2)
})

test('a factor with one level has no effect, one venue no drift, an anchor no walk', () => {
  const names = (anchors: readonly boolean[], factors: readonly number[]) => buildProblem(tableOf({ steps: 3, stepDays: 7, anchors, factors, seed: 1 }), new Float64Array(14).fill(0.1)).scales.map(({ name }) => name)
  expect(names([false], [1])).toEqual(['mu', 'tau'])
  expect(names([false, true], [2])).toEqual(['mu', 'venue_drift.l0', 'venue', 'topic', 'tau'])
})
