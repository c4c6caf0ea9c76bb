import fc from 'fast-check'
import { expect, test } from 'vitest'
import { defectCorrelation, effectiveSizeBound, equalSampleSize, standardisedError } from '../../../model/statistics/data-defect.ts'
import { correlation } from '../../../model/statistics/correlation.ts'
import { mean } from '../../../model/statistics/moments.ts'

test('it is the correlation between being heard and what is said, over the population', () => {
  const people = fc.array(fc.tuple(fc.boolean(), fc.integer({ min: -5, max: 5 })), { minLength: 4, maxLength: 60 })
  fc.assert(fc.property(people, (rows) => {
    const said = rows.map(([, value]) => value)
    const heard = rows.filter(([posted]) => posted).map(([, value]) => value)
    fc.pre(heard.length > 0 && heard.length < rows.length && new Set(said).size > 1)
    const centre = mean(said)
    const sd = Math.sqrt(mean(said.map((value) => (value - centre) ** 2)))
    const found = defectCorrelation({ size: heard.length, population: rows.length, gap: mean(heard) - centre, sd }).value!
    expect(found).toBeCloseTo(correlation(rows.map(([posted]) => (posted ? 1 : 0)), said)!, 10)
    const bound = effectiveSizeBound(found, heard.length / rows.length).value
    if (Math.abs(found) > 1e-6) expect(bound! / equalSampleSize(mean(heard) - centre, 0, sd).value!).toBeCloseTo(1, 8)
  }))
})

test('what the survey itself may err by raises the worth of the posts, until nothing can be said', () => {
  expect(equalSampleSize(-0.1, 0, 0.5).value).toBeCloseTo(25, 12)
  expect(equalSampleSize(-0.1, 0.06, 0.5).value).toBeCloseTo(0.25 / 0.0064, 10)
  expect(equalSampleSize(0.1, 0.1, 0.5)).toEqual({ value: null, reason: 'within-survey-error' })
  expect(equalSampleSize(0, 0.1, 0.5)).toEqual({ value: null, reason: 'within-survey-error' })
  expect(equalSampleSize(0.1, 0, 0)).toEqual({ value: null, reason: 'no-variation' })
})

test('left open with its reason', () => {
  expect(defectCorrelation({ size: 10, population: 10, gap: 0, sd: 1 })).toEqual({ value: null, reason: 'not-a-part' })
  expect(defectCorrelation({ size: 20, population: 10, gap: 0.1, sd: 1 })).toEqual({ value: null, reason: 'not-a-part' })
  expect(defectCorrelation({ size: 5, population: 10, gap: 0, sd: 0 })).toEqual({ value: null, reason: 'no-variation' })
  expect(effectiveSizeBound(0, 0.5)).toEqual({ value: null, reason: 'no-defect' })
})

test('refused by name', () => {
  expect(() => defectCorrelation({ size: 0, population: 10, gap: 0, sd: 1 })).toThrow('size 0')
  expect(() => defectCorrelation({ size: 1, population: 10, gap: Number.NaN, sd: 1 })).toThrow('gap NaN')
  expect(() => equalSampleSize(0.1, -1, 1)).toThrow('standardError -1')
  expect(() => effectiveSizeBound(1.5, 0.5)).toThrow('correlation 1.5')
  expect(() => effectiveSizeBound(0.5, 1)).toThrow('fraction 1')
  expect(() => standardisedError(0.5, 0)).toThrow('population of 0')
})
