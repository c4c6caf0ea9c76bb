import { expect, test } from 'vitest'
import { writeBounds, writeCell } from '../../../generator/words/cells.ts'
import { formNames, write } from '../../../generator/words/forms.ts'
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
  expect(write('not-established', 'code', words)).toBe('not_established')
  expect([0.04, -0.06, 3].map((value) => write(value, 'sign', words))).toEqual(['flat', 'down', 'up'])
})

test('null, and what a form is not made for, is "not known" in every form', () => {
  for (const form of formNames.filter((name) => name !== 'code')) {
    expect(write(null, form, words)).toBe('not known')
    expect(write(undefined, form, words)).toBe('not known')
  }
  expect(write(null, 'code', words)).toBe('none')
  expect(write('text', 'points', words)).toBe('not known')
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
  expect(writeBounds(null, 2, 'change', words)).toBe('–')
})
