import { expect, test } from 'vitest'
import { writeBounds, writeCell } from '../../../generator/words/cells.ts'
import { formNames, needsUnit, write } from '../../../generator/words/forms.ts'
import { levelLabel } from '../../../generator/words/labels.ts'
import { houseWords } from '../../support/house-words.ts'

const words = await houseWords()

test('a form writes what it is made from', () => {
  expect(write(-2.31, 'change', words)).toBe('\u22122.3')
  expect(write({ mean: 2, low: 1.2, high: 2.8, sd: 1 }, 'interval', words)).toBe('1.2 to 2.8')
  expect(write(['a', 'b', 'c'], 'list', words)).toBe('a, b and c')
  expect(write([-2.11, 2.34, 2.2], 'size-range', words)).toBe('2.1 to 2.3')
  expect(write([2.21, 2.19], 'size-range', words)).toBe('2.2')
  expect(write({ start: '2026-10-01', end: '2026-10-31' }, 'days', words)).toBe('1 – 31 October 2026')
  expect([[0.2, 0.3], [0.3, 0.2], [0.301, 0.304]].map(([share_from, share_to]) => write({ share_from, share_to }, 'share-direction', words))).toEqual(['up', 'down', 'flat'])
  expect([0.0109, -0.00052].map((value) => write(value, 'tiny-number', words))).toEqual(['0.011', '\u22120.00052'])
  expect([write(3.6, 'half-width', words), write(-0.128, 'number-size', words), write('islander', 'name', words)]).toEqual(['1.80', '0.13', 'Islander'])
  expect(write('not-established', 'code', words)).toBe('not_established')
  expect([0.04, -0.06, 3].map((value) => write(value, 'sign', words))).toEqual(['flat', 'down', 'up'])
})

test('items that hold a comma are parted by semicolons', () => {
  const german = { ...words, locale: 'de-DE' }
  expect(write(['37,3', '31,0', '2,0'], 'list', german)).toBe('37,3; 31,0 und 2,0')
  expect(write(['Blogs', 'Foren', 'Filme'], 'list', german)).toBe('Blogs, Foren und Filme')
})

test('null, and what a form is not made for, is "not known" in every form', () => {
  for (const form of formNames.filter((name) => name !== 'code')) {
    expect(write(null, form, words)).toBe('not known')
    expect(write(undefined, form, words)).toBe('not known')
  }
  expect(write(null, 'code', words)).toBe('none')
  expect(write('text', 'points', words)).toBe('not known')
})

test('a form that is counted in something is told in what', () => {
  const bounds = { low: 40.06, high: 46.34 }
  expect(write(43.24, 'measure', words, 'share')).toBe('43.2%')
  expect(write(7.238, 'measure', words, 'mean')).toBe('7.24')
  expect(write(bounds, 'measure-interval', words, 'share')).toBe('40.1% to 46.3%')
  expect(write({ low: -0.314, high: 0.2 }, 'measure-change-interval', words, 'mean')).toBe('\u22120.31 to +0.20')
  expect(write(-2.06, 'measure-change', words, 'share')).toBe('\u22122.1')
  expect(write(-2.06, 'measure-size', words, 'share')).toBe('2.1')
  expect([[1, 'week'], [-4, 'week'], [0, 'day'], [2, 'month']].map(([value, unit]) => write(value, 'steps', words, String(unit)))).toEqual(['1 week', '4 weeks', '0 days', '2 months'])
  expect(formNames.filter(needsUnit)).toEqual(['measure', 'measure-change', 'measure-size', 'measure-interval', 'measure-change-interval', 'steps'])
})

test('an interval that lacks a bound is not known', () => {
  expect(write({ low: null, high: null, r: 0.3 }, 'number-interval', words)).toBe('not known')
  expect(write({ low: -0.214, high: 0.5 }, 'number-interval', words)).toBe('\u22120.21 to 0.50')
})

test('ratios, p-values, fieldwork, events, counts', () => {
  expect([0.69, 1.31, 0.998, 1].map((ratio) => write(ratio, 'ratio-sign', words))).toEqual(['down', 'up', 'down', 'flat'])
  expect([0.0004, 0.0031, 0.0316, 0.0996, 0.443, 1].map((p) => write(p, 'p-value', words))).toEqual(['under 0.001', '0.003', '0.032', '0.10', '0.44', '1.00'])
  expect(write({ wave: 'W1', field_start: '2026-09-28', field_end: '2026-10-09' }, 'fieldwork', words)).toBe('28 September – 9 October 2026')
  expect(write({ label: 'Storm', date: '2026-10-05', kind: '' }, 'event', words)).toBe('Storm (5 October 2026)')
  expect([[1204, 380, 410], [400, 400], []].map((list) => write(list, 'count-range', words))).toEqual(['380 to 1,204', '400', 'not known'])
})

test('chance, what lies outside an interval, effects of one point, lags of the outcome', () => {
  expect([0.049, 0.05, 0.0501].map((p) => write(p, 'chance', words))).toEqual(['clear', 'clear', 'open'])
  expect([0.9, 0.95].map((interval) => write(interval, 'outside', words))).toEqual(['10%', '5%'])
  expect([write(-2.14, 'per-point', words), write(-2.14, 'per-point-size', words), write({ low: -0.4, high: 12 }, 'per-point-interval', words)]).toEqual(['\u22120.21', '0.21', '\u22120.04 to +1.20'])
  expect([[1, 30], [2, 31], [3, 7], [1, 27]].map(([best_lag, span_days]) => write({ best_lag, span_days }, 'span-lag', words))).toEqual(['one month', '2 months', 'about 21 days', 'about 27 days'])
})

test('a share told as below 5% is not lifted there by rounding', () => {
  expect([0.02, 0.0449, 0.045, 0.04928, 0.0499999].map((share) => write(share, 'minor-share', words))).toEqual(['2%', '4%', 'under 5%', 'under 5%', 'under 5%'])
  expect([0.05, 0.2].map((share) => write(share, 'minor-share', words))).toEqual(['5%', '20%'])
})

test('a period before that stands otherwise now than it was sealed, as one decimal shows; parts of a definition', () => {
  const restated = (previous: number, sealed: number) => write({ previous: { mean: previous }, previous_sealed: { mean: sealed } }, 'restated', words)
  expect([restated(23.6, 24.3), restated(24.04, 24.06), restated(24.06, 24.14), restated(-0.04, 0.04), restated(24.1, 24.1)]).toEqual(['yes', 'no', 'no', 'no', 'no'])
  expect(write({ previous: { mean: 1 }, previous_sealed: null }, 'restated', words)).toBe('not known')
  expect(write('target_mix', 'definition', words)).toBe('the fixed mix that opinion is stated at')
})

test('a level without a label of its own is worded, one with a label is not', () => {
  expect(levelLabel({ label: 'prolific', poster: 'prolific' }, words)).toBe('Prolific posters')
  expect(levelLabel({ label: 'Heavy', poster: 'prolific' }, words)).toBe('Heavy')
  expect(levelLabel({ label: 'jetty', topic: 'jetty' }, words)).toBe('Jetty')
  expect(levelLabel({ label: 'eBay', topic: 'eBay' }, words)).toBe('eBay')
})

test('cells of tables', () => {
  const none = new Map<string, string>()
  expect(writeCell({ key: 'part', kind: 'text' }, { part: 'venue_mix' }, words, none)).toBe('Where people posted')
  expect(writeCell({ key: 'part', kind: 'text' }, { part: 'segment_mix' }, words, none)).toBe('The mix of segment')
  expect(writeCell({ key: 'sha256', kind: 'text' }, { sha256: 'ab12'.repeat(16) }, words, none)).toBe('ab12ab12ab12')
  expect(writeCell({ key: 'raw', kind: 'points' }, { raw: null }, words, none)).toBe('–')
  expect(writeCell({ key: 'venue', kind: 'text' }, { venue: 'boards' }, words, new Map([['boards', 'Discussion boards']]))).toBe('Discussion boards')
  expect(writeCell({ key: 'scale', kind: 'text' }, { scale: 'venue_drift.boards' }, words, new Map([['boards', 'Discussion boards']]))).toBe('Drift, step to step: Discussion boards')
  expect(writeBounds(-0.44, 2, 'change', words)).toBe('\u22120.4 to +2.0')
  expect(writeBounds(0.387, 0.452, 'share', words)).toBe('39% to 45%')
  expect(writeBounds(null, 2, 'change', words)).toBe('–')
  expect(writeBounds(40.06, 46.34, 'measure', words, { kind: 'share' })).toBe('40.1% to 46.3%')
  expect(writeBounds(6.6, 7, 'measure', words, { kind: 'mean' })).toBe('6.60 to 7.00')
  expect(writeCell({ key: 'value', kind: 'measure' }, { value: 43.24, kind: 'share', shown: 'shown' }, words, none)).toBe('43.2%')
  expect(writeCell({ key: 'value', kind: 'measure' }, { value: 43.24, kind: 'share', shown: 'flagged' }, words, none)).toBe('43.2%*')
  expect(writeCell({ key: 'moved_by', kind: 'steps' }, { moved_by: 4, grid: 'week' }, words, none)).toBe('4 weeks')
  expect(writeCell({ key: 'label', kind: 'text' }, { label: 'raw', series: 'raw', venue: null }, words, none)).toBe('Raw average')
  expect(writeCell({ key: 'label', kind: 'text' }, { label: 'Blogs', series: 'venue', venue: 'blogs' }, words, none)).toBe('Blogs, raw')
  expect(writeCell({ key: 'label', kind: 'text' }, { label: 'Favourability', metric: 'favourability', segment: 'visitor' }, words, none)).toBe('Favourability, visitor')
  expect(writeCell({ key: 'label', kind: 'text' }, { label: 'Favourability', metric: 'favourability', segment: null }, words, none)).toBe('Favourability')
  // a metric's own label is never taken for a word of the catalogue
  expect(writeCell({ key: 'label', kind: 'text' }, { label: 'raw', metric: 'raw' }, words, none)).toBe('raw')
})
