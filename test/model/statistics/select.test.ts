import { describe, expect, test } from 'vitest'
import { createGenerator } from '../../../model/random/generator.ts'
import { select } from '../../../model/statistics/select.ts'

const n = 5000
const generator = createGenerator(21, 0)
const shapes: Record<string, (i: number) => number> = {
  random: () => generator.normal(), ascending: (i) => i, descending: (i) => -i, equal: () => 7,
  'few values': () => generator.integer(3), 'organ pipe': (i) => Math.min(i, n - i), infinities: (i) => (i % 2 === 0 ? Infinity : -Infinity),
}

describe.each(Object.entries(shapes))('%s', (_, shape) => {
  test.each([0, 1, 249, 250, 2500, 4749, 4998, 4999])('rank %i is where sorting puts it, and parts the rest', (rank) => {
    const values = Float64Array.from({ length: n }, (_, i) => shape(i))
    const sorted = values.slice().sort()
    select(values, rank, 0, n - 1)
    expect(values[rank]).toBe(sorted[rank])
    expect(values.subarray(0, rank).every((value) => value <= sorted[rank])).toBe(true)
    expect(values.subarray(rank).every((value) => value >= sorted[rank])).toBe(true)
    expect([...values.sort()]).toEqual([...sorted])
  })
})

test('only the given stretch is touched', () => {
  const values = Float64Array.of(9, 3, 1, 2, 0)
  select(values, 1, 1, 3)
  expect([values[0], values[1], values[4]]).toEqual([9, 1, 0])
})
