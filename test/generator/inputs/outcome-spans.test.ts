import fc from 'fast-check'
import { expect, test } from 'vitest'
import { dayNumber, isoDate } from '../../../generator/calendar/days.ts'
import { outcomeSpans } from '../../../generator/inputs/outcome-spans.ts'

const lastDay = (...dates: readonly string[]) => isoDate(outcomeSpans(dates.map(dayNumber)).at(-1)!.last)

test('the last span is as long as the usual one', () => {
  expect(lastDay('2026-01-05', '2026-01-12', '2026-01-19')).toBe('2026-01-25')
  // 7, 14 and 7 days
  expect(lastDay('2026-01-05', '2026-01-12', '2026-01-26', '2026-02-02')).toBe('2026-02-08')
})

test('by the month it ends with the month, whatever its length', () => {
  expect(lastDay('2025-12-01', '2026-01-01', '2026-02-01')).toBe('2026-02-28')
  expect(lastDay('2026-04-01', '2026-05-01', '2026-06-01')).toBe('2026-06-30')
  expect(lastDay('2025-07-01', '2025-10-01', '2026-01-01', '2026-04-01')).toBe('2026-06-30')
  expect(lastDay('2026-04-15', '2026-05-15', '2026-06-15')).toBe('2026-07-14')
})

test('spans follow one another without gap', () => {
  fc.assert(fc.property(fc.uniqueArray(fc.integer({ min: 0, max: 30_000 }), { minLength: 2, maxLength: 20 }), (given) => {
    const days = given.toSorted((a, b) => a - b)
    const spans = outcomeSpans(days)
    expect(spans.map(({ first }) => first)).toEqual(days)
    for (const [index, { first, last }] of spans.entries()) {
      expect(last).toBeGreaterThanOrEqual(first)
      if (index > 0) expect(spans[index - 1]!.last).toBe(first - 1)
    }
  }))
})
