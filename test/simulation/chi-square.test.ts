import { expect, test } from 'vitest'
import { chiSquareTail } from './chi-square.ts'

// Source: table of the chi-square distribution, Abramowitz and Stegun (1964), table 26.8, recalled from memory: 5 % points.
test.each([[1, 3.841459], [2, 5.991465], [5, 11.0705], [19, 30.14353], [20, 31.41043]])('the 5 %% point with %i degrees of freedom', (freedom, point) => {
  expect(chiSquareTail(point, freedom)).toBeCloseTo(0.05, 6)
})

test('it can fail: the point of other degrees of freedom', () => {
  expect(Math.abs(chiSquareTail(30.14353, 20) - 0.05)).toBeGreaterThan(1e-3)
})
