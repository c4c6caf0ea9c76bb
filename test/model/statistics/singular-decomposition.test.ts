import fc from 'fast-check'
import { expect, test } from 'vitest'
import { dot, singularDecomposition } from '../../../model/statistics/singular-decomposition.ts'

const squares = fc.integer({ min: 1, max: 9 }).chain((n) => fc.array(fc.double({ min: -3, max: 3, noNaN: true }), { minLength: n * n, maxLength: n * n }))

test('U diag(values) V\' is the matrix again; values descend; vectors are orthonormal', () => {
  fc.assert(fc.property(squares, (matrix) => {
    const { side, values, left, right } = singularDecomposition(matrix)
    matrix.forEach((element, at) => {
      const [i, j] = [Math.floor(at / side), at % side]
      expect(Math.abs(values.reduce((sum, value, k) => sum + value * left[k][i] * right[k][j], 0) - element)).toBeLessThan(1e-12)
    })
    for (let k = 0; k < side; k += 1) {
      if (k > 0) expect(values[k]).toBeLessThanOrEqual(values[k - 1])
      for (let l = 0; l < side; l += 1) {
        expect(Math.abs(dot(right[k], right[l]) - (k === l ? 1 : 0))).toBeLessThan(1e-12)
        if (values[k] > 1e-6 && values[l] > 1e-6) expect(Math.abs(dot(left[k], left[l]) - (k === l ? 1 : 0))).toBeLessThan(1e-8)
      }
    }
  }))
})

// By hand: eigenvalues of [[2, 1], [1, 2]] are 3 and 1; those of the second difference matrix of side n are 2 - 2 cos(k pi / (n + 1)).
test('known values', () => {
  const two = singularDecomposition([2, 1, 1, 2])
  expect([...two.values].map((value) => Number(value.toFixed(14)))).toEqual([3, 1])
  expect(Math.abs(two.right[0][0])).toBeCloseTo(Math.SQRT1_2, 14)
  const n = 6
  const second = Array.from({ length: n * n }, (_, at) => [2, -1][Math.abs(Math.floor(at / n) - (at % n))] ?? 0)
  singularDecomposition(second).values.forEach((value, k) => { expect(value).toBeCloseTo(2 - 2 * Math.cos(((n - k) * Math.PI) / (n + 1)), 13) })
})

test('a tiny singular value is as precise as a large one', () => {
  // Columns (1, 1e-9) and (1, -1e-9) up to rotation: values sqrt(2) and sqrt(2) 1e-9; the square of the matrix would lose the second.
  const { values } = singularDecomposition([1, 1, 1e-9, -1e-9])
  expect(values[0]).toBeCloseTo(Math.SQRT2, 14)
  expect(values[1] / (Math.SQRT2 * 1e-9)).toBeCloseTo(1, 12)
})

test('without full rank: the value is 0 to rounding, and nothing is NaN', () => {
  const { values, left, right } = singularDecomposition([1, 2, 3, 2, 4, 6, 1, 1, 1])
  expect(values[2]).toBeLessThan(1e-14)
  for (const vector of [...left, ...right]) for (const element of vector) expect(Number.isFinite(element)).toBe(true)
  expect([...singularDecomposition([0, 0, 0, 0]).values]).toEqual([0, 0])
})

test('refused by name', () => {
  expect(() => singularDecomposition([1, 2, 3])).toThrow('elements 3')
  expect(() => singularDecomposition([])).toThrow('elements 0')
  expect(() => singularDecomposition([1, 2, 3, Number.NaN])).toThrow('matrix[3] NaN')
})
