import fc from 'fast-check'
import { describe, expect, test } from 'vitest'
import { knownPartnerOf, partnerOf, type StepSeries } from '../../../model/survey/windows.ts'

const series: StepSeries = { value: Float64Array.of(1, 2, 4, 8, 16, 32), weight: new Float64Array(6).fill(1) }
const window = (startStep: number, ...days: number[]) => ({ start: '', end: '', startStep, days: Float64Array.from(days) })

describe('the partner of a wave', () => {
  test('is the mean over the days of fieldwork, by the step they fall in', () => {
    expect(partnerOf(series, window(2, 5, 2), 0)).toBeCloseTo((5 * 4 + 2 * 8) / 7, 12)
  })
  test('at a lag above 0 is what the series was before', () => {
    expect(partnerOf(series, window(2, 5, 2), 1)).toBeCloseTo((5 * 2 + 2 * 4) / 7, 12)
  })
  test('at a lag below 0 is what it was after', () => {
    expect(partnerOf(series, window(2, 7), -3)).toBe(32)
  })
  test('of a window partly outside the grid is the part inside, if that is at least half', () => {
    expect(partnerOf(series, window(5, 7, 7), 0)).toBe(32)
    expect(partnerOf(series, window(5, 6, 7), 0)).toBeNull()
    expect(partnerOf(series, window(-1, 7, 7), 0)).toBe(1)
    expect(partnerOf(series, window(0, 7), 1)).toBeNull()
  })
  test('of an average of mentions weighs by mentions, and is missing where there are none', () => {
    const counted = { value: Float64Array.of(0, 10, 0), weight: Float64Array.of(3, 1, 0) }
    expect(partnerOf(counted, window(0, 7, 7), 0)).toBeCloseTo(2.5, 12)
    expect(partnerOf(counted, window(2, 7), 0)).toBeNull()
  })
  test('moving window and lag together changes nothing', () => {
    fc.assert(fc.property(fc.integer({ min: 0, max: 4 }), fc.integer({ min: 0, max: 4 }), fc.array(fc.integer({ min: 1, max: 7 }), { minLength: 1, maxLength: 3 }), (start, lag, days) => {
      expect(partnerOf(series, window(start + lag, ...days), lag)).toBe(partnerOf(series, window(start, ...days), 0))
    }))
  })
})

describe('the partner that a forecast may know', () => {
  const path = series.value
  test('leaves out the days of the moved window on which the fieldwork had begun', () => {
    expect(knownPartnerOf(path, window(3, 7, 7), 1)).toBe(4)
    expect(knownPartnerOf(path, window(3, 7, 7), 2)).toBe(3)
  })
  test('without a lead is the last step before the fieldwork', () => {
    expect(knownPartnerOf(path, window(3, 7), 0)).toBe(4)
  })
  test('of a wave after the last post is the last step there is', () => {
    expect(knownPartnerOf(path, window(9, 7), 1)).toBe(32)
    expect(knownPartnerOf(path, window(9, 7), 4)).toBe(32)
    expect(knownPartnerOf(path, window(9, 7), 5)).toBe(16)
  })
  test('is missing where the posts had not begun', () => {
    expect(knownPartnerOf(path, window(0, 7), 0)).toBeNull()
    expect(knownPartnerOf(path, window(2, 7), 3)).toBeNull()
  })
  test('does not depend on any step from the fieldwork on', () => {
    fc.assert(fc.property(fc.integer({ min: 1, max: 5 }), fc.integer({ min: 0, max: 4 }), fc.double({ noNaN: true }), (start, lag, other) => {
      const changed = path.map((value, t) => (t >= start ? other : value))
      expect(knownPartnerOf(changed, window(start, 7, 3), lag)).toBe(knownPartnerOf(path, window(start, 7, 3), lag))
    }))
  })
})
