import fc from 'fast-check'
import { expect, test } from 'vitest'
import { createGenerator } from '../../../model/random/generator.ts'
import { confusionShares, correctedShares, drawConfusion, poorestInvertible, rescoring, smallestSingularValue } from '../../../model/statistics/misclassification.ts'
import { dot } from '../../../model/statistics/singular-decomposition.ts'

/** A coder who is right at least six times in ten, over k labels, and true shares. */
const coders = fc.integer({ min: 2, max: 6 }).chain((k) => fc.record({
  matrix: fc.array(fc.double({ min: 0.05, max: 1, noNaN: true }), { minLength: k * k, maxLength: k * k })
    .map((raw) => confusionShares(raw.map((value, at) => value + (at % (k + 1) === 0 ? 2 * k : 0)))),
  truth: fc.array(fc.double({ min: 0.01, max: 1, noNaN: true }), { minLength: k, maxLength: k }).map((raw) => {
    const sum = raw.reduce((a, b) => a + b, 0)
    return raw.map((share) => share / sum)
  }),
  scores: fc.array(fc.double({ min: -1, max: 1, noNaN: true }), { minLength: k, maxLength: k }),
}))
const coded = (matrix: Float64Array, truth: readonly number[]) => truth.map((_, k) => truth.reduce((sum, share, t) => sum + share * matrix[t * truth.length + k], 0))

test('what the coder does to shares and means is undone', () => {
  fc.assert(fc.property(coders, ({ matrix, truth, scores }) => {
    const seen = coded(matrix, truth)
    correctedShares(matrix, seen)!.shares.forEach((share, t) => { expect(Math.abs(share - truth[t])).toBeLessThan(1e-10) })
    expect(Math.abs(dot(rescoring(matrix, scores, 0).weights!, seen) - dot(scores, truth))).toBeLessThan(1e-10)
  }))
})

test('a post that is truly t has its true score on average: M w = s', () => {
  const matrix = [0.8, 0.15, 0.05, 0.1, 0.7, 0.2, 0.05, 0.15, 0.8]
  const { weights } = rescoring(matrix, [-1, 0, 1])
  ;[-1, 0, 1].forEach((score, t) => { expect(dot(matrix.slice(3 * t, 3 * t + 3), weights!)).toBeCloseTo(score, 12) })
})

test('for two labels the smallest singular value of an even coder is se + sp - 1', () => {
  for (const right of [0.95, 0.7, 0.6]) expect(smallestSingularValue([right, 1 - right, 1 - right, right])).toBeCloseTo(2 * right - 1, 14)
})

test('too poor a coder is refused at 0.2 and below, and only then', () => {
  const even = (right: number) => [right, 1 - right, 1 - right, right]
  expect(poorestInvertible).toBe(0.2)
  expect(rescoring(even(0.601), [-1, 1]).weights).not.toBeNull()
  const refused = rescoring(even(0.599), [-1, 1])
  expect(refused).toMatchObject({ weights: null, reason: 'too-poor' })
  expect(refused.smallestSingularValue).toBeCloseTo(0.198, 12)
  expect(rescoring(even(0.599), [-1, 1], 0).weights![1]).toBeCloseTo(1 / 0.198, 10)
  expect(rescoring(even(0.5), [-1, 1], 0).weights).toBeNull()
  expect(correctedShares(even(0.5), [0.5, 0.5])).toBeNull()
})

test('shares that the coder cannot have brought about are said to be impossible, not clipped', () => {
  const found = correctedShares([0.9, 0.1, 0.2, 0.8], [0.05, 0.95])!
  expect(found.impossible).toEqual([0, 1])
  expect(found.shares[0]).toBeCloseTo((0.05 - 0.2) / 0.7, 12)
  expect(found.shares[1]).toBeCloseTo(1 + 0.15 / 0.7, 12)
})

test('a row without a coding is even', () => {
  expect([...confusionShares([0, 0, 2, 6])]).toEqual([0.5, 0.5, 0.25, 0.75])
})

test('drawn matrices: mean (1 + count) / (k + row), variance of the Dirichlet; a hundredfold audit draws closer', () => {
  const counts = [45, 4, 1, 3, 38, 9, 0, 0, 0]
  const spread = (factor: number) => {
    const generator = createGenerator(2, 0)
    const n = 20_000
    const draws = Array.from({ length: n }, () => drawConfusion(counts.map((count) => factor * count), generator))
    return counts.map((_, at) => {
      const mean = draws.reduce((sum, draw) => sum + draw[at], 0) / n
      return { mean, variance: draws.reduce((sum, draw) => sum + (draw[at] - mean) ** 2, 0) / n }
    })
  }
  const [once, hundredfold] = [spread(1), spread(100)]
  counts.forEach((count, at) => {
    const total = 3 + (at < 6 ? 50 : 0)
    const expected = (count + 1) / total
    const variance = (expected * (1 - expected)) / (total + 1)
    expect(Math.abs(once[at].mean - expected)).toBeLessThan(3.5 * Math.sqrt(variance / 20_000))
    expect(Math.abs(once[at].variance / variance - 1)).toBeLessThan(0.15)
    if (count > 0) expect(hundredfold[at].variance).toBeLessThan(variance / 20)
  })
})

test('refused by name', () => {
  expect(() => confusionShares([1, 2, 3])).toThrow('elements 3')
  expect(() => confusionShares([1])).toThrow('labels 1')
  expect(() => confusionShares([1, -2, 3, 4])).toThrow('counts[1] -2')
  expect(() => drawConfusion([1, 2, 3, -4], createGenerator(1, 0))).toThrow('counts[3] -4')
  expect(() => rescoring([0.5, 0.5, 0.3, 0.6], [0, 1])).toThrow('row 1')
  expect(() => rescoring([1.5, -0.5, 0, 1], [0, 1])).toThrow('row 0')
  expect(() => rescoring([1, 0, 0, 1], [0, 1, 2])).toThrow('labels 3')
})
