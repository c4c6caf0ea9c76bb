import { expect, test } from 'vitest'
import { inOrder, levelOrder } from '../../../generator/tables/level-order.ts'
import { tablesOf } from '../../../generator/tables/tables-of.ts'
import { sampleFindings } from '../../support/sample-findings.ts'

const findings = sampleFindings()
const levelsIn = (name: string, factor: string, of = findings) => [...new Set(tablesOf(of).find((table) => table.name === name)!.rows.filter((row) => row.factor === factor).map((row) => row.level))]

test('poster classes stand from those who post least to those who post most, in every table', () => {
  for (const name of ['mix', 'offsets', 'target-mix']) expect(levelsIn(name, 'poster'), name).toEqual(['occasional', 'regular', 'prolific'])
})

test('venues stand from the largest share to the smallest, in every table', () => {
  const expected = [...findings.venues].sort((a, b) => b.share - a.share).map(({ venue }) => venue)
  expect(expected).not.toEqual(findings.venues.map(({ venue }) => venue))
  for (const name of ['mix', 'offsets', 'target-mix']) expect(levelsIn(name, 'venue'), name).toEqual(expected)
  for (const name of ['venues', 'venue-series', 'venues-before']) {
    expect([...new Set(tablesOf(findings).find((table) => table.name === name)!.rows.map((row) => row.venue))], name).toEqual(expected)
  }
})

test('topics stand from the kindest on; those without a name of their own come after, however kind', () => {
  const extra = { ...findings.topics[0], topic: 'harbour works', label: 'harbour works', offset: { mean: 40, low: 38, high: 42, sd: 1 } }
  const none = { ...extra, topic: 'none', label: 'none', offset: { mean: 50, low: 48, high: 52, sd: 1 } }
  const levels = levelsIn('offsets', 'topic', { ...findings, topics: [extra, none, ...findings.topics] })
  expect(levels).toEqual(['staff', 'on-board', 'weather', 'booking', 'fares', 'punctuality', 'none', 'harbour works'])
})

test('a level that is not known stands last, those of one place keep their order', () => {
  expect(inOrder(['new', 'prolific', 'newer', 'regular'], 'poster', levelOrder(findings), (name) => name)).toEqual(['regular', 'prolific', 'new', 'newer'])
})
