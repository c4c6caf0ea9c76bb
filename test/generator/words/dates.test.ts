import { expect, test } from 'vitest'
import { date, days, period, shortDate, when } from '../../../generator/words/dates.ts'
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

test('when something was: a period with its preposition', () => {
  expect(['2026-10', '2026-Q4', '2026-W04', 'autumn'].map((name) => when(name, words))).toEqual(['in October 2026', 'in quarter 4 of 2026', 'in week 4 of 2026', 'in autumn'])
})

test('a stretch of days in the order and with the signs of the locale, and no space that a typeface lacks', () => {
  const span = { start: '2026-10-01', end: '2026-10-31' }
  expect(['en-GB', 'de-DE', 'fr-FR', 'pt-BR'].map((locale) => days(span, locale))).toEqual(['1 – 31 October 2026', '1.–31. Oktober 2026', '1–31 octobre 2026', '1 – 31 de outubro de 2026'])
})
