import { describe, expect, test } from 'vitest'
import { grade, labels, locationFor, meanScore, normalBelow, normalQuantile, scoreOf, stars } from '../../../sample-data/making/graded-score.ts'
import { seededDraws } from '../../../sample-data/making/seeded-draws.ts'

describe.each([['labels', labels], ['stars', stars]] as const)('%s', (_, grading) => {
  test.each([-0.4, -0.1, 0, 0.25])('have the wanted mean %d', (wanted) => {
    const location = locationFor(wanted, grading)
    expect(meanScore(location, grading)).toBeCloseTo(wanted, 6)
    const draws = seededDraws(7)
    let sum = 0
    for (let i = 0; i < 40_000; i++) sum += scoreOf(grade(location + draws.normal(), grading), grading)
    expect(Math.abs(sum / 40_000 - wanted)).toBeLessThan(0.012)
  })

  test('run from -1 to 1', () => {
    expect([scoreOf(grade(-9, grading), grading), scoreOf(grade(0, grading), grading), scoreOf(grade(9, grading), grading)]).toEqual([-1, 0, 1])
  })
})

// Abramowitz and Stegun (1964), Handbook of Mathematical Functions, table 26.1
test.each([[0, 0.5], [1, 0.8413447], [1.96, 0.9750021], [-2, 0.0227501]])('normal distribution function at %d', (x, p) => {
  expect(normalBelow(x)).toBeCloseTo(p, 6)
  expect(normalQuantile(p)).toBeCloseTo(x, 5)
})
