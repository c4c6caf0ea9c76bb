import { expect, test } from 'vitest'
import { date, period, shortDate } from '../../../generator/words/dates.ts'
import { houseWords } from '../../support/house-words.ts'

const words = await houseWords()

test('a day is written as the locale has it, whatever the time zone', () => {
  expect(date('2026-10-26', 'en-GB')).toBe('26 October 2026')
  expect(date('2026-10-26', 'en-US')).toBe('October 26, 2026')
  expect(shortDate('2024-02-29', 'en-GB')).toBe('29 Feb 2024')
})

test('months, quarters and weeks by name; what is none stays', () => {
  expect(['2026-10', '2026-Q4', '2026-W04', 'autumn'].map((name) => period(name, words))).toEqual(['October 2026', 'quarter 4 of 2026', 'week 4 of 2026', 'autumn'])
})
