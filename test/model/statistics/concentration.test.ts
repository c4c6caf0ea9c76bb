import fc from 'fast-check'
import { describe, expect, test } from 'vitest'
import { concentrationOf, topShare } from '../../../model/statistics/concentration.ts'
import { sizeCounts } from './size-counts.ts'

const sizes = fc.array(fc.integer({ min: 1, max: 12 }), { minLength: 1, maxLength: 250 })

/** From the definitions, author by author and pair by pair. */
function byDefinition(x: readonly number[]) {
  const total = x.reduce((sum, size) => sum + size, 0)
  const pairs = x.reduce((sum, one) => sum + x.reduce((inner, other) => inner + Math.abs(one - other), 0), 0)
  const top = x.toSorted((one, other) => other - one).slice(0, Math.max(1, Math.ceil(x.length / 100)))
  return {
    authors: x.length, mentions: total, gini: pairs / (2 * x.length * total),
    topShare: top.reduce((sum, size) => sum + size, 0) / total,
    effectiveAuthors: 1 / x.reduce((sum, size) => sum + (size / total) ** 2, 0),
  }
}

test('agrees with the definitions, author by author, in whatever order rows come', () => {
  fc.assert(fc.property(sizes, (x) => {
    const expected = byDefinition(x)
    const split = [...sizeCounts(x.slice(0, 7)), ...sizeCounts(x.slice(7))]
    for (const found of [concentrationOf(sizeCounts(x)), concentrationOf(split)]) {
      for (const key of ['authors', 'mentions', 'gini', 'topShare', 'effectiveAuthors'] as const) expect(found?.[key]).toBeCloseTo(expected[key], 10)
    }
  }))
})

test('it can fail: one row left out shows', () => {
  const x = [1, 1, 1, 4, 9]
  expect(concentrationOf(sizeCounts(x.slice(1)))?.gini).not.toBeCloseTo(byDefinition(x).gini, 3)
})

describe('the most prolific 1 %', () => {
  // 1 author of 5 mentions and the others of 1 each: how many authors the 1 % are shows in the share.
  test.each([[1, 1], [99, 1], [100, 1], [101, 2], [700, 7], [701, 8]])('of %i authors are %i', (authors, top) => {
    const counts = [{ mentionsPerAuthor: 1, authors: authors - 1 }, { mentionsPerAuthor: 5, authors: 1 }]
    expect(topShare(counts, 1)).toBe((5 + top - 1) / (authors + 4))
    expect(concentrationOf(counts)?.topShare).toBe(topShare(counts, 1))
  })

  test('7 % of 100 authors are 7, where 0.07 x 100, rounded up, would be 8', () => {
    expect(Math.ceil(0.07 * 100)).toBe(8)
    expect(topShare([{ mentionsPerAuthor: 1, authors: 100 }], 7)).toBe(0.07)
  })
})

test('five million authors are counted exactly', () => {
  expect(concentrationOf([{ mentionsPerAuthor: 1, authors: 5_000_000 }])).toEqual({ authors: 5_000_000, mentions: 5_000_000, topShare: 0.01, gini: 0, effectiveAuthors: 5_000_000 })
})

test('nobody: no figure', () => {
  expect(concentrationOf([])).toBeNull()
  expect(concentrationOf([{ mentionsPerAuthor: 3, authors: 0 }])).toBeNull()
  expect(topShare([], 1)).toBeNull()
})

test('rows that cannot be are refused by name', () => {
  expect(() => concentrationOf([{ mentionsPerAuthor: 1, authors: 1 }, { mentionsPerAuthor: -1, authors: 1 }])).toThrow('counts[1]')
  expect(() => concentrationOf([{ mentionsPerAuthor: 1, authors: 1.5 }])).toThrow('1.5')
  expect(() => topShare([], 0)).toThrow('percent 0')
})
