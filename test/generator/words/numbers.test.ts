import fc from 'fast-check'
import { expect, test } from 'vitest'
import { change, count, interval, number, points, probability, probabilityBand, probabilityFigure, share, size, sizeInterval } from '../../../generator/words/numbers.ts'
import { houseWords } from '../../support/house-words.ts'

const words = await houseWords()

test('points have one decimal and the true minus sign', () => {
  expect(points(18.44, 'en-GB')).toBe('18.4')
  expect(points(-3.26, 'en-GB')).toBe('\u22123.3')
  expect(points(-3.26, 'de-DE')).toBe('\u22123,3')
})

test('a change has its sign, and none where it rounds to zero', () => {
  expect([2.71, -0.3, 0.04, -0.04, 0].map((value) => change(value, 'en-GB'))).toEqual(['+2.7', '\u22120.3', '0.0', '0.0', '0.0'])
})

test.each([points, change, number, count, (value: number) => share(value, words)])('%o never shows a negative zero nor a hyphen for a minus', (format) => {
  fc.assert(fc.property(fc.double({ min: -100, max: 100, noNaN: true }), (value) => {
    const text = format(value, 'en-GB')
    return !text.includes('-') && !/^\u22120(\.0+)?%?$/.test(text)
  }))
})

test('it can fail: Intl alone shows both', () => {
  expect(new Intl.NumberFormat('en-GB', { minimumFractionDigits: 1, maximumFractionDigits: 1 }).format(-0.04)).toBe('-0.0')
})

test('halves round away from zero, on both sides alike', () => {
  fc.assert(fc.property(fc.integer({ min: 1, max: 400 }), (quarter) => points(-quarter / 4, 'en-GB') === `\u2212${points(quarter / 4, 'en-GB')}`))
  expect([2.25, -2.25].map((value) => points(value, 'en-GB'))).toEqual(['2.3', '\u22122.3'])
})

test('shares: whole percentages, never nothing where there is something nor all where there is not', () => {
  expect([0.412, 0.0961, 0.005, 0.0049, 0, 0.994, 0.995, 1].map((value) => share(value, words))).toEqual(['41%', '10%', '1%', 'under 1%', '0%', '99%', 'over 99%', '100%'])
  expect(share(0.41, { ...words, locale: 'de-DE' })).toBe('41\u00a0%')
})

test('a probability is never rounded to certainty', () => {
  expect([0.9996, 0.991, 0.99, 0.874, 0.01, 0.004, 0, 1].map((value) => probabilityFigure(value, words)))
    .toEqual(['over 99%', 'over 99%', '99%', '87%', '1%', 'under 1%', 'under 1%', 'over 99%'])
  fc.assert(fc.property(fc.double({ min: 0, max: 1, noNaN: true }), (value) => !/^(100|0)%$/.test(probabilityFigure(value, words))))
})

test('bands of probability are those of the guidance note', () => {
  expect([0.995, 0.95, 0.7, 0.5, 0.33, 0.2, 0.05, 0.001].map(probabilityBand))
    .toEqual(['virtually_certain', 'very_likely', 'likely', 'open', 'open', 'unlikely', 'very_unlikely', 'exceptionally_unlikely'])
  expect(probability(0.94, words)).toBe('very likely (94%)')
})

test('a size has no sign, and is never nothing where something moved', () => {
  expect([2.71, -0.3, 0.04, -0.001, 0].map((value) => size(value, words))).toEqual(['2.7', '0.3', 'less than 0.1', 'less than 0.1', '0.0'])
})

test('intervals', () => {
  expect(interval({ low: 1.24, high: 5 }, points, words)).toBe('1.2 to 5.0')
  expect(sizeInterval({ low: -4.1, high: -1.2 }, words)).toBe('1.2 to 4.1')
  expect(sizeInterval({ low: 1.2, high: 4.1 }, words)).toBe('1.2 to 4.1')
  expect(sizeInterval({ low: -0.4, high: 2.1 }, words)).toBe('\u22120.4 to +2.1')
  expect(count(12480, 'en-GB')).toBe('12,480')
})
