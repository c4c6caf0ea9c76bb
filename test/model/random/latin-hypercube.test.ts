import { expect, test } from 'vitest'
import { ModelError } from '../../../model/model-error.ts'
import { createGenerator, type Generator } from '../../../model/random/generator.ts'
import { latinHypercube } from '../../../model/random/latin-hypercube.ts'

const column = (points: Float64Array, d: number, index: number) => points.filter((_, i) => i % d === index)
const strataHit = (x: Float64Array) => new Set(x.map((value) => Math.floor(value * x.length))).size

test.each([[1, 1], [7, 3], [64, 5], [1000, 8]])('%i points in %i dimensions: each stratum of each column once', (n, d) => {
  const points = latinHypercube(n, d, createGenerator(11, n))
  expect(points).toHaveLength(n * d)
  expect(points.every((value) => value > 0 && value < 1)).toBe(true)
  for (let index = 0; index < d; index += 1) expect(strataHit(column(points, d, index))).toBe(n)
})

test('it can fail: plain uniforms leave strata empty', () => {
  const generator = createGenerator(11, 0)
  expect(strataHit(Float64Array.from({ length: 1000 }, generator.uniform))).toBeLessThan(700)
})

test('columns are permuted independently, and points are spread inside their strata', () => {
  const n = 2000
  const points = latinHypercube(n, 2, createGenerator(12, 0))
  const [x, y] = [column(points, 2, 0), column(points, 2, 1)]
  const r = x.reduce((sum, value, i) => sum + 12 * (value - 0.5) * (y[i] - 0.5), 0) / n
  expect(Math.abs(r)).toBeLessThan(3.5 / Math.sqrt(n))
  const jitter = x.map((value) => value * n - Math.floor(value * n))
  expect(jitter.reduce((sum, value) => sum + value, 0) / n).toBeCloseTo(0.5, 1)
  expect(Math.max(...jitter)).toBeGreaterThan(0.99)
})

test('the mean of a smooth function varies far less than with plain draws', () => {
  const error = (mean: number) => Math.abs(mean - (Math.E - 1))
  const meanOf = (x: Float64Array) => x.reduce((sum, value) => sum + Math.exp(value), 0) / x.length
  const stratified = Array.from({ length: 20 }, (_, stream) => error(meanOf(latinHypercube(200, 1, createGenerator(13, stream)))))
  const plain = Array.from({ length: 20 }, (_, stream) => error(meanOf(Float64Array.from({ length: 200 }, createGenerator(13, stream).uniform))))
  expect(Math.max(...stratified)).toBeLessThan(0.05 * Math.max(...plain))
})

test.each([[0, 1], [1, 0], [2.5, 1]])('shape %d x %d is refused', (n, d) => {
  expect(() => latinHypercube(n, d, createGenerator(1, 0))).toThrow(ModelError)
})

test('a jitter that rounds up to the next stratum, or to 1, is held below it', () => {
  const last: Generator = { ...createGenerator(1, 0), uniform: () => 1 - Number.EPSILON / 2, shuffle: () => undefined }
  const points = latinHypercube(1000, 1, last)
  expect(points.every((value, i) => value < (i + 1) / 1000)).toBe(true)
  expect((999 + last.uniform()) / 1000).toBe(1)
})
