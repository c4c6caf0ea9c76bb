import fc from 'fast-check'
import { expect, test } from 'vitest'
import { correlation } from '../../../model/statistics/correlation.ts'
import { relativeWeights } from '../../../model/statistics/relative-weights.ts'

/** Answers of 30 respondents: k predictors that share a common part, and a response. */
const answers = fc.integer({ min: 1, max: 6 }).chain((k) => fc.array(fc.array(fc.integer({ min: -50, max: 50 }), { minLength: k + 2, maxLength: k + 2 }), { minLength: 30, maxLength: 30 }))
  .map((rows) => rows.map(([common, ...own]) => own.map((value) => value + common / 2)))
  .map((rows) => rows[0].map((_, j) => rows.map((row) => row[j])))

function correlationsOf(columns: readonly (readonly number[])[]) {
  const [response, ...predictors] = columns
  return { among: predictors.flatMap((one) => predictors.map((other) => (one === other ? 1 : correlation(one, other)!))), withResponse: predictors.map((one) => correlation(one, response)!) }
}

test('weights are at least 0 and sum to R squared; order and sign of the predictors do not matter', () => {
  fc.assert(fc.property(answers, (columns) => {
    fc.pre(columns.every((column) => new Set(column).size > 2))
    const { among, withResponse } = correlationsOf(columns)
    const found = relativeWeights(among, withResponse)
    fc.pre(found.weights !== null)
    expect(found.weights.every((weight) => weight >= 0)).toBe(true)
    expect(found.weights.reduce((a, b) => a + b, 0)).toBeCloseTo(found.explained, 10)
    expect(found.explained).toBeLessThanOrEqual(1 + 1e-9)
    const [response, ...predictors] = columns
    const turned = correlationsOf([response, ...predictors.map((column, j) => (j === 0 ? column.map((value) => -value) : column)).reverse()])
    const again = relativeWeights(turned.among, turned.withResponse)
    again.weights!.toReversed().forEach((weight, j) => { expect(weight).toBeCloseTo(found.weights[j], 9) })
  }))
})

test('two predictors, by hand: R squared is r1^2 + r2^2 - 2 r1 r2 r over 1 - r^2; equal ones share alike', () => {
  const found = relativeWeights([1, 0.5, 0.5, 1], [0.6, 0.4])
  expect('explained' in found && found.explained).toBeCloseTo((0.36 + 0.16 - 2 * 0.6 * 0.4 * 0.5) / 0.75, 12)
  const equal = relativeWeights([1, 0.5, 0.5, 1], [0.6, 0.6]).weights!
  expect(equal[0]).toBeCloseTo(equal[1], 12)
})

test('left open where one predictor is a combination of others', () => {
  expect(relativeWeights([1, 1, 1, 1], [0.5, 0.5])).toEqual({ weights: null, reason: 'collinear' })
  expect(relativeWeights([1, 1 - 1e-9, 1 - 1e-9, 1], [0.5, 0.5])).toEqual({ weights: null, reason: 'collinear' })
  expect(relativeWeights([1, 0.999, 0.999, 1], [0.5, 0.5]).weights).not.toBeNull()
})

test('refused by name', () => {
  expect(() => relativeWeights([1, 0, 0, 1], [0.5])).toThrow('predictors 1')
  expect(() => relativeWeights([1, 0.2, 0.3, 1], [0.5, 0.5])).toThrow('0.3 at (1, 0)')
  expect(() => relativeWeights([2, 0, 0, 1], [0.5, 0.5])).toThrow('2 at (0, 0)')
  expect(() => relativeWeights([1, 0, 0, 1], [0.5, -1.5])).toThrow('withResponse[1] -1.5')
  expect(() => relativeWeights([1, 0.9, -0.9, 0.9, 1, 0.9, -0.9, 0.9, 1], [0, 0, 0])).toThrow('eigenvalue below 0')
  expect(() => relativeWeights([1, 0, 0, 1], [0.9, 0.9])).toThrow('variance explained 1.62')
})
