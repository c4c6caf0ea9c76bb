import { describe, expect, test } from 'vitest'
import { ModelError } from '../../../model/model-error.ts'
import { createGenerator } from '../../../model/random/generator.ts'

const draws = (count: number, draw: () => number) => Float64Array.from({ length: count }, draw)
const mean = (x: Float64Array) => x.reduce((sum, value) => sum + value, 0) / x.length
const moment = (x: Float64Array, power: number) => mean(x.map((value) => value ** power))

/** Pearson's statistic of counts that are expected to be equal. */
function chiSquare(counts: readonly number[]): number {
  const expected = counts.reduce((sum, count) => sum + count, 0) / counts.length
  return counts.reduce((sum, count) => sum + (count - expected) ** 2 / expected, 0)
}
const tally = (values: Float64Array, cells: number, cell: (value: number) => number) => {
  const counts = new Array<number>(cells).fill(0)
  for (const value of values) counts[cell(value)] += 1
  return counts
}
const correlation = (x: Float64Array, y: Float64Array) => mean(x.map((value, i) => value * y[i]))

describe('uniform', () => {
  const values = draws(200_000, createGenerator(1, 0).uniform)

  test('in (0, 1), and even over 100 cells (99.9 % point of chi-square with 99 degrees: 148.2)', () => {
    expect(values.every((value) => value > 0 && value < 1)).toBe(true)
    expect(chiSquare(tally(values, 100, (value) => Math.floor(value * 100)))).toBeLessThan(148.2)
  })

  test('pairs fill the square evenly (255 degrees: 330.5)', () => {
    const counts = new Array<number>(256).fill(0)
    for (let i = 0; i < values.length; i += 2) counts[Math.floor(values[i] * 16) * 16 + Math.floor(values[i + 1] * 16)] += 1
    expect(chiSquare(counts)).toBeLessThan(330.5)
  })

  test('all 53 bits are random: the last eight are even too (255 degrees)', () => {
    expect(chiSquare(tally(values, 256, (value) => Number(BigInt(value * 2 ** 53) & 255n)))).toBeLessThan(330.5)
  })

  test('it can fail: squared uniforms are uneven', () => {
    expect(chiSquare(tally(values, 100, (value) => Math.floor(value * value * 100)))).toBeGreaterThan(10_000)
  })
})

describe('normal', () => {
  const count = 400_000
  const values = draws(count, createGenerator(2, 0).normal)

  test.each([[1, 0, 1], [2, 1, 2], [3, 0, 15], [4, 3, 96], [6, 15, 10_170]])('moment %i is %d within 3.5 standard errors', (power, expected, variance) => {
    expect(Math.abs(moment(values, power) - expected)).toBeLessThan(3.5 * Math.sqrt(variance / count))
  })

  test('the tail beyond the last edge of the ziggurat, 5.7608e-4 of draws, is there on both sides', () => {
    const share = 2.8804e-4
    for (const side of [-1, 1]) {
      const found = values.filter((value) => side * value > 3.442619855899)
      expect(Math.abs(found.length - share * count)).toBeLessThan(3.5 * Math.sqrt(share * count))
      expect(side * Math.max(...found.map((value) => side * value))).not.toBe(0)
      expect(Math.max(...found.map((value) => side * value))).toBeGreaterThan(3.9)
    }
  })

  test('fillNormal gives the same draws as normal', () => {
    const filled = new Float64Array(1000)
    createGenerator(2, 0).fillNormal(filled)
    expect([...filled]).toEqual([...values.subarray(0, 1000)])
  })

  test('successive draws are uncorrelated', () => {
    expect(Math.abs(correlation(values.subarray(1), values.subarray(0, count - 1)))).toBeLessThan(3.5 / Math.sqrt(count))
  })
})

describe('streams', () => {
  test('the same seed and stream repeat; another stream or seed does not', () => {
    const first = (seed: number, stream: number) => [...draws(5, createGenerator(seed, stream).uniform)]
    expect(first(3, 1)).toEqual(first(3, 1))
    expect(first(3, 1)).not.toEqual(first(3, 2))
    expect(first(3, 1)).not.toEqual(first(4, 1))
  })

  test('20 streams of a seed are uncorrelated in pairs (190 pairs of 20,000 draws)', () => {
    const streams = Array.from({ length: 20 }, (_, stream) => draws(20_000, createGenerator(9, stream).normal))
    const pairs = streams.flatMap((x, i) => streams.slice(i + 1).map((y) => correlation(x, y)))
    expect(Math.max(...pairs.map(Math.abs)) * Math.sqrt(20_000)).toBeLessThan(4.4)
    expect(correlation(streams[0], streams[0])).toBeGreaterThan(0.9)
  })

  test('first draws of 10,000 streams, and of 10,000 seeds, are even (99 degrees: 148.2)', () => {
    for (const start of [(i: number) => createGenerator(1, i), (i: number) => createGenerator(i, 0)]) {
      const firsts = Float64Array.from({ length: 10_000 }, (_, i) => start(i).uniform())
      expect(chiSquare(tally(firsts, 100, (value) => Math.floor(value * 100)))).toBeLessThan(148.2)
    }
  })
})

describe('integer and shuffle', () => {
  test('each value equally likely (6 degrees: 22.46), also where 2^32 is no multiple (2 degrees: 13.82)', () => {
    const generator = createGenerator(5, 0)
    expect(chiSquare(tally(draws(70_000, () => generator.integer(7)), 7, (value) => value))).toBeLessThan(22.46)
    const large = 3 * 2 ** 30
    expect(chiSquare(tally(draws(60_000, () => generator.integer(large)), 3, (value) => Math.floor(value / 2 ** 30)))).toBeLessThan(13.82)
  })

  test('every order equally likely (23 degrees: 49.73), and nothing is lost', () => {
    const generator = createGenerator(6, 0)
    const seen = new Map<string, number>()
    for (let i = 0; i < 24_000; i += 1) {
      const cards = ['a', 'b', 'c', 'd']
      generator.shuffle(cards)
      seen.set(cards.join(''), (seen.get(cards.join('')) ?? 0) + 1)
    }
    expect(seen.size).toBe(24)
    expect(chiSquare([...seen.values()])).toBeLessThan(49.73)
  })
})

test.each([[-1, 0], [1.5, 0], [Number.NaN, 0], [1, -1], [1, 2 ** 53]])('seed %d, stream %d is refused by name', (seed, stream) => {
  expect(() => createGenerator(seed, stream)).toThrow(expect.objectContaining({ code: 'seed-invalid' }) as ModelError)
})

test.each([0, 2.5, 2 ** 32 + 1])('integer(%d) is refused', (n) => {
  expect(() => createGenerator(1, 1).integer(n)).toThrow(ModelError)
})
