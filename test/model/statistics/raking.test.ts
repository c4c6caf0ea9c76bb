import fc from 'fast-check'
import { expect, test } from 'vitest'
import { kishEffectiveSize } from '../../../model/statistics/kish.ts'
import { rake, type JointCounts } from '../../../model/statistics/raking.ts'

/** A full table of two margins, row by row. */
const grid = (counts: readonly (readonly number[])[]): JointCounts & { readonly counts: readonly number[] } => ({
  levels: [counts.flatMap((row, i) => row.map(() => i)), counts.flatMap((row) => row.map((_, j) => j))],
  counts: counts.flat(),
})
const shareOf = (table: JointCounts, weights: Float64Array, margin: number, level: number) => {
  let [there, all] = [0, 0]
  weights.forEach((weight, row) => {
    all += weight * table.counts[row]
    if (table.levels[margin][row] === level) there += weight * table.counts[row]
  })
  return there / all
}

const tables = fc.record({
  counts: fc.array(fc.array(fc.integer({ min: 1, max: 60 }), { minLength: 3, maxLength: 3 }), { minLength: 2, maxLength: 5 }),
  seeds: fc.array(fc.double({ min: 0.2, max: 1, noNaN: true }), { minLength: 8, maxLength: 8 }),
}).map(({ counts, seeds }) => ({ table: grid(counts), targets: [seeds.slice(0, counts.length), seeds.slice(5)] }))

test('margins are met, the mean weight is 1, and every cross ratio of the sample is kept', () => {
  fc.assert(fc.property(tables, ({ table, targets }) => {
    const found = rake(table, targets)!
    expect(found.converged).toBe(true)
    targets.forEach((shares, margin) => {
      const all = shares.reduce((a, b) => a + b, 0)
      shares.forEach((share, level) => { expect(Math.abs(shareOf(table, found.weights, margin, level) - share / all)).toBeLessThan(1e-9) })
    })
    expect(Math.abs(found.weights.reduce((sum, weight, row) => sum + weight * table.counts[row], 0) / found.size - 1)).toBeLessThan(1e-9)
    const w = found.weights
    for (let i = 0; i + 3 < w.length; i += 3) expect(Math.abs((w[i] * w[i + 4]) / (w[i + 1] * w[i + 3]) - 1)).toBeLessThan(1e-9)
    expect(found.effectiveSize).toBeCloseTo(kishEffectiveSize(Array.from(w).flatMap((weight, row) => new Array<number>(table.counts[row]).fill(weight))), 8)
  }))
})

test('bounds hold in every case; where they leave a way the margins are met', () => {
  fc.assert(fc.property(tables, fc.double({ min: 0.05, max: 0.9, noNaN: true }), fc.double({ min: 1.1, max: 6, noNaN: true }), ({ table, targets }, lower, upper) => {
    const free = rake(table, targets)!
    const found = rake(table, targets, { lower, upper, cycles: 300 })!
    expect(found.lowest).toBeGreaterThanOrEqual(lower)
    expect(found.highest).toBeLessThanOrEqual(upper)
    expect(Math.abs(found.weights.reduce((sum, weight, row) => sum + weight * table.counts[row], 0) / found.size - 1)).toBeLessThan(1e-9)
    if (free.lowest >= lower && free.highest <= upper) expect(found.converged).toBe(true)
    expect(found.converged).toBe(found.error <= 1e-10)
  }))
})

test('margins of any weights within bounds are met within those bounds', () => {
  const cases = fc.record({
    counts: fc.array(fc.array(fc.integer({ min: 1, max: 60 }), { minLength: 3, maxLength: 3 }), { minLength: 2, maxLength: 4 }),
    seeds: fc.array(fc.double({ min: 0.3, max: 3, noNaN: true }), { minLength: 12, maxLength: 12 }),
  })
  fc.assert(fc.property(cases, ({ counts, seeds }) => {
    const table = grid(counts)
    const sums = [0, 1].map((margin) => Array.from({ length: margin === 0 ? counts.length : 3 }, (_, level) =>
      table.counts.reduce<number>((sum, count, row) => (table.levels[margin][row] === level ? sum + count * seeds[row] : sum), 0)))
    const mean = sums[0].reduce((a, b) => a + b, 0) / table.counts.reduce<number>((a, b) => a + b, 0)
    const used = seeds.slice(0, table.counts.length)
    const found = rake(table, sums, { lower: (0.98 * Math.min(...used)) / mean, upper: (1.02 * Math.max(...used)) / mean, tolerance: 1e-8, cycles: 5000 })!
    expect(found.converged).toBe(true)
  }))
})

test('bounds that bind: met by other weights than without, and those held are counted', () => {
  const table = grid([[40, 10, 10], [10, 10, 20]])
  const targets = [[0.4, 0.6], [0.6, 0.2, 0.2]]
  const [free, found] = [rake(table, targets)!, rake(table, targets, { lower: 0.2, upper: 2.5 })!]
  expect(free.highest).toBeGreaterThan(2.7)
  expect(found).toMatchObject({ converged: true, bounded: 20, lowest: 0.2 })
  expect(found.highest).toBeCloseTo(2.5, 9)
  expect(shareOf(table, found.weights, 0, 1)).toBeCloseTo(0.6, 9)
  expect(shareOf(table, found.weights, 1, 0)).toBeCloseTo(0.6, 9)
})

test('bounds that leave no way: said, with the error that is left', () => {
  const table = grid([[98, 100], [1, 1]])
  const found = rake(table, [[0.5, 0.5], [0.5, 0.5]], { lower: 0.2, upper: 5, cycles: 50 })!
  expect(found).toMatchObject({ converged: false, cycles: 50, highest: 5, bounded: 2 })
  expect(found.error).toBeCloseTo(0.45, 3)
})

test('a level that nobody has is unreachable; the others of its margin are raised in proportion', () => {
  const table = grid([[30, 20, 0], [10, 40, 0]])
  const found = rake(table, [[0.5, 0.5], [0.45, 0.3, 0.25]])!
  expect(found.converged).toBe(true)
  expect(found.unreachable).toEqual([{ margin: 1, level: 2, target: 0.25 }])
  expect(shareOf(table, found.weights, 1, 0)).toBeCloseTo(0.6, 9)
})

test('a level that no customer has is not weighed, and others may become unreachable by it', () => {
  const table = grid([[30, 20, 0], [10, 40, 7]])
  const found = rake(table, [[0.5, 0.5], [0.5, 0.5, 0]], { lower: 0.2, upper: 5 })!
  expect(found).toMatchObject({ converged: true, excluded: 7, size: 100, unreachable: [] })
  expect(found.weights[5]).toBe(0)
  expect(found.lowest).toBeGreaterThan(0.2)
  expect(rake(table, [[1, 0], [0.2, 0.2, 0.6]])).toMatchObject({ excluded: 57, size: 50, unreachable: [{ margin: 1, level: 2 }] })
})

test('empty cells that leave no way, without bounds: said; weights stay finite', () => {
  const found = rake(grid([[10, 0], [10, 10]]), [[0.8, 0.2], [0.3, 0.7]], { cycles: 5000 })!
  expect(found.converged).toBe(false)
  expect(found.error).toBeGreaterThan(0.1)
  expect(found.bounded).toBe(0)
  expect(found.weights.every((weight) => Number.isFinite(weight))).toBe(true)
})

test('nobody to weigh, and a sample that is right already', () => {
  expect(rake({ levels: [[0, 1]], counts: [0, 0] }, [[0.5, 0.5]])).toBeNull()
  expect(rake({ levels: [[0]], counts: [5] }, [[0, 1]])).toBeNull()
  expect(rake(grid([[1, 1], [1, 1]]), [[0.5, 0.5], [0.5, 0.5]])).toMatchObject({ converged: true, cycles: 0, lowest: 1, highest: 1, bounded: 0, effectiveSize: 4 })
})

test('refused by name', () => {
  const table = grid([[1, 2], [3, 4]])
  expect(() => rake(table, [[0.5, 0.5]])).toThrow('margins 2, expected 1')
  expect(() => rake({ levels: [[0, 1, 0]], counts: [1, 2] }, [[0.5, 0.5]])).toThrow('levels[0] 3')
  expect(() => rake({ levels: [[0, 2]], counts: [1, 2] }, [[0.5, 0.5]])).toThrow('levels[0][1] 2')
  expect(() => rake({ levels: [[0, 1]], counts: [1, -2] }, [[0.5, 0.5]])).toThrow('counts[1] -2')
  expect(() => rake(table, [[0.5, 0.5], [0.5, -0.5]])).toThrow('targets[1][1] -0.5')
  expect(() => rake(table, [[0.5, 0.5], [0.5, 0.5]], { lower: 1.2 })).toThrow('[1.2, Infinity]')
})
