import { describe, expect, test } from 'vitest'
import { kishDesignEffect } from '../../model/statistics/kish.ts'
import { rake, type JointCounts } from '../../model/statistics/raking.ts'
import { trimWeights } from '../../model/statistics/trimming.ts'

const relative = (found: number, expected: number) => Math.abs(found / expected - 1)
const dot = (one: ArrayLike<number>, other: ArrayLike<number>) => Array.from(one).reduce((sum, value, i) => sum + value * other[i], 0)
const grid = (rows: number, columns: number) => [
  Array.from({ length: rows * columns }, (_, at) => Math.floor(at / columns)), Array.from({ length: rows * columns }, (_, at) => at % columns),
]

/*
 * California schools, API 2000 (California Department of Education), from the R package survey 4.1-1. What weights by school type
 * (E, H, M) and by whether the school-wide target was met (no, yes) need of them: schools, sum of api00, sum of enroll in each cell.
 */
const cluster = { counts: [12, 132, 3, 11, 8, 17], api: [7156, 86281, 1978, 6682, 4851, 10935], enroll: [5243, 57088, 2237, 13587, 5983, 16460] }
const stratified = { counts: [9, 91, 24, 26, 15, 35], api: [5641, 61802, 14294, 16997, 8228, 23602], enroll: [3776, 37902, 36472, 29563, 14509, 27115] }
const [types, wide] = grid(3, 2)
const byType = [4421, 755, 1018]
const byWide = [1072, 5122]
const population = 6194

/** Weights that sum to the population instead of having mean 1. */
function expand(table: JointCounts, targets: readonly (readonly number[])[], options = {}) {
  const found = rake(table, targets, options)!
  return { ...found, weights: found.weights.map((weight) => (weight * targets[0].reduce((a, b) => a + b, 0)) / found.size) }
}
const mean = (weights: Float64Array, of: { counts: readonly number[]; api: readonly number[] }) => dot(weights, of.api) / dot(weights, of.counts)

describe('WT-01: stratified sample of schools, weighted to the strata', () => {
  // Lumley, R package survey, help of svydesign and svymean: mean 662.29, total 3687178. Computed by survey 4.1.1, R 4.2.2. Tolerance 1e-6
  // relative. (Its standard errors, with finite population correction, are no part of a review.)
  const { weights } = expand({ levels: [types], counts: stratified.counts }, [byType])

  test('mean and total', () => {
    expect(relative(mean(weights, stratified), 662.287363159321)).toBeLessThan(1e-6)
    expect(relative(dot(weights, stratified.enroll), 3687177.53243828)).toBeLessThan(1e-6)
    expect(mean(weights, stratified).toFixed(2)).toBe('662.29')
  })

  test('it can fail: unweighted', () => {
    expect(relative(mean(new Float64Array(6).fill(1), stratified), 662.287363159321)).toBeGreaterThan(0.01)
  })
})

describe('WT-02: cluster sample of schools, post-stratified by school type', () => {
  // Lumley, R package survey, help of postStratify: mean 644.17 before, 642.31 after, total 3680893 (help-page figures recalled). Computed by
  // survey 4.1.1, R 4.2.2. Tolerance 1e-6 relative. (Its standard errors, by clusters, are no part of a review.)
  const found = expand({ levels: [types], counts: cluster.counts }, [byType])

  test('weights, mean, total, Kish design effect', () => {
    ;[30.7013888888889, 53.9285714285714, 40.72].forEach((expected, type) => { expect(relative(found.weights[2 * type], expected)).toBeLessThan(1e-6) })
    expect(relative(mean(found.weights.map(() => 1), cluster), 644.169398907104)).toBeLessThan(1e-6)
    expect(relative(mean(found.weights, cluster), 642.310788211582)).toBeLessThan(1e-6)
    expect(relative(dot(found.weights, cluster.enroll), 3680892.94511905)).toBeLessThan(1e-6)
    expect(relative(found.size / found.effectiveSize, 1.0393591943129)).toBeLessThan(1e-6)
  })

  test('it can fail: high and middle schools exchanged', () => {
    expect(relative(mean(expand({ levels: [types], counts: cluster.counts }, [[4421, 1018, 755]]).weights, cluster), 642.310788211582)).toBeGreaterThan(1e-4)
  })
})

// Lumley, R package survey, help of rake (population by stype and sch.wide). Computed by survey 4.1.1, R 4.2.2, with epsilon 1e-10.
const schools = expand({ levels: [types, wide], counts: cluster.counts }, [byType, byWide])

describe('WT-03: the same raked to two margins', () => {
  // Tolerance 1e-6 relative, at convergence.
  const cells = [39.8392362469351, 29.870675492628, 67.1255292412626, 50.3294011162406, 49.0690721641239, 36.7910248643798]

  test('weights, mean, total, Kish design effect and effective size', () => {
    expect(schools.converged).toBe(true)
    cells.forEach((expected, cell) => { expect(relative(schools.weights[cell], expected)).toBeLessThan(1e-6) })
    expect(relative(dot(schools.weights, cluster.counts), population)).toBeLessThan(1e-6)
    expect(relative(mean(schools.weights, cluster), 641.2303209268)).toBeLessThan(1e-6)
    expect(relative(dot(schools.weights, cluster.enroll), 3647280.14807054)).toBeLessThan(1e-6)
    expect(relative(schools.size / schools.effectiveSize, 1.05165669560485)).toBeLessThan(1e-6)
    expect(relative(schools.effectiveSize, 174.011158550889)).toBeLessThan(1e-6)
    expect(relative(kishDesignEffect(cluster.counts.flatMap((n, cell) => new Array<number>(n).fill(schools.weights[cell]))), 1.05165669560485)).toBeLessThan(1e-6)
  })

  test('it can fail: stopped after one cycle, or weighted to one margin', () => {
    const once = expand({ levels: [types, wide], counts: cluster.counts }, [byType, byWide], { cycles: 1 })
    expect(once.converged).toBe(false)
    expect(relative(once.weights[0], cells[0])).toBeGreaterThan(1e-5)
    expect(relative(expand({ levels: [types], counts: cluster.counts }, [byType]).weights[0], cells[0])).toBeGreaterThan(0.1)
  })
})

describe('WT-04: iterative proportional fitting of a table of four by four', () => {
  // Worked example of the encyclopedia article "Iterative proportional fitting"; method: Deming and Stephan (1940), Annals of Mathematical
  // Statistics 11:427-444. Printed table found, which is that after three cycles, not the limit; recomputed in R 4.2.2. 0.005 against print, 1e-6 against the limit.
  const seed = [40, 30, 20, 10, 35, 50, 100, 75, 30, 80, 70, 120, 20, 30, 40, 50]
  const [rows, columns] = [[150, 300, 400, 150], [200, 300, 400, 100]]
  const printed = [64.61, 46.28, 35.42, 3.83, 49.95, 68.15, 156.49, 25.37, 56.7, 144.4, 145.06, 53.76, 28.74, 41.18, 63.03, 17.03]
  const limit = [
    64.5585097765735, 46.2324597088463, 35.3842982643499, 3.82473225029878, 49.9679194186641, 68.1593540717534, 156.498546421847, 25.3741800877077,
    56.7219436020851, 144.428225566284, 145.082481431408, 53.7673494001863, 28.7516272026772, 41.1799606531158, 63.0346738823948, 17.0337382618072,
  ]
  const firstRowStep = [
    60, 45, 30, 15, 40.3846153846154, 57.6923076923077, 115.384615384615, 86.5384615384615, 40, 106.666666666667, 93.3333333333333, 160,
    21.4285714285714, 32.1428571428571, 42.8571428571429, 53.5714285714286,
  ]
  const levels = grid(4, 4)
  const table = (options = {}) => expand({ levels, counts: seed }, [rows, columns], options).weights.map((weight, cell) => weight * seed[cell])
  const farthest = (found: Float64Array, expected: readonly number[]) => Math.max(...expected.map((value, cell) => Math.abs(found[cell] - value)))

  test('three cycles as printed, the limit, and rows alone', () => {
    expect(farthest(table({ cycles: 3 }), printed)).toBeLessThan(0.005)
    expect(farthest(table(), limit)).toBeLessThan(1e-6)
    expect(farthest(expand({ levels: [levels[0]], counts: seed }, [rows]).weights.map((weight, cell) => weight * seed[cell]), firstRowStep)).toBeLessThan(1e-6)
  })

  test('it can fail: the printed table is not the limit, nor that after two cycles', () => {
    expect(farthest(table(), printed)).toBeGreaterThan(0.02)
    expect(farthest(table({ cycles: 2 }), printed)).toBeGreaterThan(0.02)
  })
})

describe('WT-07: raked weights trimmed to [5, 60]', () => {
  // R package survey, help of trimWeights: the excess is added equally to the untrimmed. Computed by survey 4.1.1, R 4.2.2. Tolerance 1e-8.
  const bounds = { lower: 5, upper: 60 }
  const trimmed = trimWeights(schools.weights, cluster.counts, bounds)

  test('sum, range, number trimmed, mean', () => {
    expect(relative(dot(trimmed, cluster.counts), population)).toBeLessThan(1e-8)
    expect(relative(Math.min(...trimmed), 29.9894343133157)).toBeLessThan(1e-8)
    expect(Math.max(...trimmed)).toBe(60)
    expect(dot(trimmed.map((weight) => (weight === 60 ? 1 : 0)), cluster.counts)).toBe(3)
    expect(relative(mean(trimmed, cluster), 641.17711528789)).toBeLessThan(1e-8)
  })

  test('it can fail: the excess spread in proportion', () => {
    const cut = schools.weights.map((weight) => Math.min(60, weight))
    const factor = (population - 3 * 60) / (dot(cut, cluster.counts) - 3 * 60)
    expect(relative(mean(cut.map((weight) => (weight === 60 ? 60 : weight * factor)), cluster), 641.17711528789)).toBeGreaterThan(1e-7)
  })
})
