import fc from 'fast-check'
import { describe, expect, test } from 'vitest'
import { createBorderedPrecision, createBorderedVector, factorise, solveBackward, solveForward, type BorderedPrecision } from '../../../model/linear/bordered-precision.ts'
import { createGenerator } from '../../../model/random/generator.ts'

/** A random positive definite matrix of the shape, and the same in full. */
function randomPrecision(steps: number, block: number, border: number, seed: number): { q: BorderedPrecision; dense: number[][] } {
  const generator = createGenerator(seed, 0)
  const q = createBorderedPrecision(steps, block, border)
  const size = steps * block + border
  const dense = Array.from({ length: size }, () => new Array<number>(size).fill(0))
  const set = (i: number, j: number, x: number) => {
    dense[i][j] += x
    if (i !== j) dense[j][i] += x
  }
  for (let t = 0; t < steps; t++) {
    for (let i = 0; i < block; i++) {
      for (let j = 0; j < i; j++) {
        const x = 0.3 * generator.normal()
        q.diagonal[(t * block + i) * block + j] = x
        set(t * block + i, t * block + j, x)
      }
      if (t + 1 < steps) {
        const e = generator.normal()
        q.coupling[t * block + i] = e
        set((t + 1) * block + i, t * block + i, e)
      }
    }
    for (let i = 0; i < border; i++) {
      for (let j = 0; j < block; j++) {
        const x = 0.3 * generator.normal()
        q.rows[(t * border + i) * block + j] = x
        set(steps * block + i, t * block + j, x)
      }
    }
  }
  for (let i = 0; i < border; i++) {
    for (let j = 0; j < i; j++) {
      const x = 0.3 * generator.normal()
      q.corner[i * border + j] = x
      set(steps * block + i, steps * block + j, x)
    }
  }
  // a diagonal that outweighs its row makes it positive definite
  dense.forEach((row, i) => {
    const weight = row.reduce((total, x) => total + Math.abs(x), 0) + 0.1 + generator.uniform()
    row[i] = weight
    if (i < steps * block) {
      const [t, k] = [Math.floor(i / block), i % block]
      q.diagonal[(t * block + k) * block + k] = weight
    } else q.corner[(i - steps * block) * border + (i - steps * block)] = weight
  })
  return { q, dense }
}

function denseCholesky(matrix: readonly (readonly number[])[]): number[][] {
  const l = matrix.map((row) => row.map(() => 0))
  for (let j = 0; j < matrix.length; j++) {
    for (let i = j; i < matrix.length; i++) {
      const sum = matrix[i][j] - l[i].reduce((total, x, k) => total + (k < j ? x * l[j][k] : 0), 0)
      l[i][j] = i === j ? Math.sqrt(sum) : sum / l[j][j]
    }
  }
  return l
}

const shape = fc.record({ steps: fc.integer({ min: 1, max: 7 }), block: fc.integer({ min: 1, max: 4 }), border: fc.integer({ min: 0, max: 4 }), seed: fc.integer({ min: 0, max: 1e6 }) })

describe('against dense algebra', () => {
  test('log determinant', () => {
    fc.assert(fc.property(shape, ({ steps, block, border, seed }) => {
      const { q, dense } = randomPrecision(steps, block, border, seed)
      const expected = 2 * denseCholesky(dense).reduce((total, row, i) => total + Math.log(row[i]), 0)
      expect(factorise(q)).toBeCloseTo(expected, 10)
    }))
  })

  test('forward and backward solves give Q^-1 h, and the squared length of u is h’ Q^-1 h', () => {
    fc.assert(fc.property(shape, ({ steps, block, border, seed }) => {
      const { q, dense } = randomPrecision(steps, block, border, seed)
      const generator = createGenerator(seed, 1)
      const h = createBorderedVector(steps, block, border)
      generator.fillNormal(h.walk)
      generator.fillNormal(h.fixed)
      const right = [...h.walk, ...h.fixed]
      factorise(q)
      const squares = solveForward(q, h, new Float64Array(border))
      const x = createBorderedVector(steps, block, border)
      solveBackward(q, h, x)
      const solution = [...x.walk, ...x.fixed]
      dense.forEach((row, i) => { expect(row.reduce((total, value, k) => total + value * solution[k], 0)).toBeCloseTo(right[i], 9) })
      expect(squares).toBeCloseTo(right.reduce((total, value, k) => total + value * solution[k], 0), 9)
    }))
  })

  test('it can fail: a coupling left out changes the determinant', () => {
    const { q, dense } = randomPrecision(4, 2, 1, 7)
    q.coupling.fill(0)
    const expected = 2 * denseCholesky(dense).reduce((total, row, i) => total + Math.log(row[i]), 0)
    expect(Math.abs(factorise(q) - expected)).toBeGreaterThan(1e-6)
  })
})

test('a matrix that is not positive definite is told, not factored', () => {
  const q = createBorderedPrecision(2, 1, 0)
  q.diagonal.set([1, 1])
  q.coupling.set([-2])
  expect(factorise(q)).toBeNaN()
})

test('draws have the covariance of the inverse', () => {
  const { q, dense } = randomPrecision(2, 2, 1, 3)
  const size = dense.length
  factorise(q)
  const generator = createGenerator(9, 0)
  const sums = dense.map((row) => row.map(() => 0))
  const draws = 40_000
  const u = createBorderedVector(2, 2, 1)
  const x = createBorderedVector(2, 2, 1)
  for (let k = 0; k < draws; k++) {
    generator.fillNormal(u.walk)
    generator.fillNormal(u.fixed)
    solveBackward(q, u, x)
    const all = [...x.walk, ...x.fixed]
    for (let i = 0; i < size; i++) for (let j = 0; j < size; j++) sums[i][j] += all[i] * all[j] / draws
  }
  // Q times the sample covariance is the identity, up to five standard errors
  dense.forEach((row, i) => { for (let j = 0; j < size; j++) expect(Math.abs(row.reduce((total, value, k) => total + value * sums[k][j], 0) - (i === j ? 1 : 0))).toBeLessThan(0.06) })
})
