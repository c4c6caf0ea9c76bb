import { expect, test } from 'vitest'
import { seededDraws } from '../../../sample-data/making/seeded-draws.ts'

const many = 50_000
const mean = (values: readonly number[]) => values.reduce((sum, value) => sum + value, 0) / values.length

test('the same seed draws the same, another seed other values', () => {
  const first = (seed: number) => { const draws = seededDraws(seed); return [draws.uniform(), draws.normal(), draws.integer(1000)] }
  expect(first(3)).toEqual(first(3))
  expect(first(3)).not.toEqual(first(4))
})

test('uniform and normal draws have their means and variances', () => {
  const draws = seededDraws(11)
  const uniforms = Array.from({ length: many }, () => draws.uniform())
  const normals = Array.from({ length: many }, () => draws.normal())
  expect(Math.abs(mean(uniforms) - 0.5)).toBeLessThan(0.005)
  expect(Math.abs(mean(uniforms.map((u) => (u - 0.5) ** 2)) - 1 / 12)).toBeLessThan(0.002)
  expect(Math.abs(mean(normals))).toBeLessThan(0.018)
  expect(Math.abs(mean(normals.map((z) => z * z)) - 1)).toBeLessThan(0.026)
})

test.each([3, 80])('counts have mean and variance %d', (rate) => {
  const draws = seededDraws(5)
  const counts = Array.from({ length: many }, () => draws.poisson(rate))
  expect(Math.abs(mean(counts) / rate - 1)).toBeLessThan(0.012)
  expect(Math.abs(mean(counts.map((count) => (count - rate) ** 2)) / rate - 1)).toBeLessThan(0.03)
})

test('weights are kept, and a weight of 0 is never drawn', () => {
  const draws = seededDraws(9)
  const drawn = Array.from({ length: many }, () => draws.weighted([1, 0, 3]))
  expect(drawn).not.toContain(1)
  expect(Math.abs(mean(drawn.map((index) => (index === 2 ? 1 : 0))) - 0.75)).toBeLessThan(0.008)
})
