import { expect, test } from 'vitest'
import { createGenerator } from '../../../model/random/generator.ts'
import { correlation } from '../../../model/statistics/correlation.ts'
import { mean, standardDeviation } from '../../../model/statistics/moments.ts'
import { fillMemory, restrictedLogLikelihood, type Memory } from '../../../model/statistics/noisy-autoregression.ts'

const values = [3.1, 2.4, 2.9, 4.4, 4.1, 3.3, 5.2]
const errors = [0.3, 0.2, 0.4, 0.3, 0.25, 0.6, 0.3]

/** Gaussian elimination of a positive definite matrix. */
function eliminate(matrix: readonly (readonly number[])[], right: readonly number[]): { readonly solution: readonly number[]; readonly logDeterminant: number } {
  const n = right.length
  const rows = matrix.map((row, i) => [...row, right[i]])
  rows.forEach((row, i) => {
    for (const below of rows.slice(i + 1)) {
      const factor = below[i] / row[i]
      for (let j = i; j <= n; j++) below[j] -= factor * row[j]
    }
  })
  const solution = new Array<number>(n).fill(0)
  for (let i = n - 1; i >= 0; i--) solution[i] = (rows[i][n] - solution.reduce((sum, value, j) => (j > i ? sum + value * rows[i][j] : sum), 0)) / rows[i][i]
  return { solution, logDeterminant: rows.reduce((sum, row, i) => sum + Math.log(row[i]), 0) }
}

/** The same, from the covariance matrix written out. */
function dense({ coefficient, innovation }: Memory): number {
  const covariance = values.map((_, i) => values.map((__, j) => {
    const shared = coefficient === 1
      ? innovation ** 2 * Math.min(i, j)
      : innovation ** 2 / (1 - coefficient ** 2) * coefficient ** Math.abs(i - j)
    return shared + (i === j ? errors[i] : 0)
  }))
  const { solution: ones, logDeterminant } = eliminate(covariance, values.map(() => 1))
  const { solution: solved } = eliminate(covariance, values)
  const sum = (of: readonly number[]) => of.reduce((a, b) => a + b, 0)
  const information = sum(ones)
  const squares = sum(values.map((value, i) => value * solved[i])) - sum(solved) ** 2 / information
  return -0.5 * (logDeterminant + Math.log(information) + squares)
}

test.each([[0, 0.5], [0.4, 1], [0.9, 0.3], [0.99, 0.7], [1, 0.5], [1, 2]])('coefficient %d, innovation %d: as from the whole covariance matrix', (coefficient, innovation) => {
  expect(restrictedLogLikelihood(values, errors, { coefficient, innovation })).toBeCloseTo(dense({ coefficient, innovation }), 10)
})

test('a mean of any size makes no difference, a trend does', () => {
  const memory = { coefficient: 0.6, innovation: 0.5 }
  const moved = restrictedLogLikelihood(values.map((value) => value + 1e4), errors, memory)
  expect(moved).toBeCloseTo(restrictedLogLikelihood(values, errors, memory), 8)
  expect(restrictedLogLikelihood(values.map((value, t) => value + t), errors, memory)).toBeLessThan(moved - 1)
})

test('a drawn series has the spread and the memory asked for', () => {
  const series = new Float64Array(200_000)
  fillMemory(series, { coefficient: 0.8, innovation: 0.6 }, createGenerator(3, 0))
  expect(mean(series)).toBeCloseTo(0, 1)
  expect(standardDeviation(series)).toBeCloseTo(1, 1.7)
  expect(correlation(series.subarray(1), series.subarray(0, -1))).toBeCloseTo(0.8, 1.7)
})

test('a walk begins at 0 and takes steps of the innovation', () => {
  const series = new Float64Array(50_000)
  fillMemory(series, { coefficient: 1, innovation: 2 }, createGenerator(3, 1))
  expect(series[0]).toBe(0)
  expect(standardDeviation(series.slice(1).map((value, t) => value - series[t]))).toBeCloseTo(2, 1)
  fillMemory(new Float64Array(0), { coefficient: 1, innovation: 2 }, createGenerator(3, 1))
})

test.each([[{ coefficient: -0.1, innovation: 1 }], [{ coefficient: 1.1, innovation: 1 }], [{ coefficient: 0.5, innovation: 0 }], [{ coefficient: Number.NaN, innovation: 1 }]])('%o is no memory', (memory) => {
  expect(() => restrictedLogLikelihood(values, errors, memory)).toThrow('Unexpected memory')
  expect(() => { fillMemory(new Float64Array(2), memory, createGenerator(1, 0)) }).toThrow('Unexpected memory')
})
