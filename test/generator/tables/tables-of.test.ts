import { describe, expect, test } from 'vitest'
import type { Findings } from '../../../model/findings/schema.ts'
import { makeTable } from '../../../generator/tables/make-table.ts'
import { tablesOf } from '../../../generator/tables/tables-of.ts'
import type { Row } from '../../../generator/tables/table.ts'
import { sampleFindings } from '../../support/sample-findings.ts'

const findings = sampleFindings()
const rowsOf = (of: Findings, name: string): readonly Row[] => tablesOf(of).find((table) => table.name === name)?.rows ?? []

describe('tablesOf', () => {
  test('has every table that the charts and the document name', () => {
    expect(tablesOf(findings).map((table) => table.name)).toEqual([
      'opinion', 'periods', 'spans', 'decomposition', 'venues', 'venue-series', 'venues-before', 'mix', 'offsets', 'concentration',
      'accounting', 'scales', 'target-mix', 'checks', 'inputs',
      'tracker', 'survey-waves', 'agreement', 'survey-lags', 'survey-candidates', 'survey-forecasts', 'next-wave', 'survey-rivals', 'lag-weights', 'departures', 'outcome-lags', 'events',
      'staying', 'spread', 'spread-series', 'pull', 'benchmark', 'benchmark-margins', 'tipping', 'coder', 'importance', 'hearing', 'advice',
      'competitors', 'competitor-series', 'mention-shares', 'competitor-venues', 'revisions', 'breaks', 'follow-up',
    ])
  })

  test('every row fills every column, and no more', () => {
    for (const table of tablesOf(findings)) {
      for (const row of table.rows) expect(Object.keys(row), table.name).toEqual(table.columns.map((column) => column.key))
    }
  })

  test('figures are those of the findings', () => {
    const first = findings.opinion.series[0]
    expect(rowsOf(findings, 'opinion')[0]).toMatchObject({ step: first.step, adjusted: first.adjusted.mean, since_base_low: first.since_base.low })
    expect(rowsOf(findings, 'venue-series')).toHaveLength(findings.venues.reduce((sum, venue) => sum + venue.series.length, 0))
    expect(rowsOf(findings, 'venues-before').slice(0, 2).map((row) => [row.when, row.level]))
      .toEqual([['base', findings.venues[0].level_base.mean], ['now', findings.venues[0].level.mean]])
  })

  test('the parts of the decomposition add up to its last row, the raw change', () => {
    const rows = rowsOf(findings, 'decomposition')
    const parts = rows.slice(0, -1).reduce((sum, row) => sum + Number(row.mean), 0)
    expect(rows.at(-1)).toMatchObject({ part: 'raw_change', low: null, high: null })
    expect(parts).toBeCloseTo(Number(rows.at(-1)?.mean), 6)
  })

  test('the stages of the accounting add up', () => {
    const rows = Object.fromEntries(rowsOf(findings, 'accounting').map((row) => [row.stage, Number(row.rows)]))
    expect(rows.received).toBe(rows.rejected + rows.duplicates + rows.out_of_scope + rows.modelled)
  })
})

describe('small groups', () => {
  test('a raw average of fewer authors than the smallest group is withheld, one of exactly as many is not', () => {
    const withAuthors = (authors: number): Findings => ({
      ...findings, opinion: { ...findings.opinion, series: findings.opinion.series.map((at) => ({ ...at, authors, raw: 1 })) },
    })
    const smallest = findings.method.smallest_group
    expect(rowsOf(withAuthors(smallest - 1), 'opinion').every((row) => row.raw === null)).toBe(true)
    expect(rowsOf(withAuthors(smallest), 'opinion').every((row) => row.raw === 1)).toBe(true)
  })

  test('a topic of few authors has no offset shown', () => {
    const few: Findings = { ...findings, topics: findings.topics.map((of, index) => (index === 0 ? { ...of, authors: 3 } : of)) }
    const topics = (of: Findings) => rowsOf(of, 'offsets').filter((row) => row.factor === 'topic').map((row) => row.level)
    expect(topics(findings)).toContain(findings.topics[0].topic)
    expect(topics(few)).not.toContain(findings.topics[0].topic)
  })
})

test('without a period before there is no decomposition to show', () => {
  expect(rowsOf({ ...findings, decomposition: null }, 'decomposition')).toEqual([])
})

test('a row that lacks a column is refused', () => {
  const broken = [{ a: 1 }] as unknown as readonly { a: number; b: number }[]
  expect(() => makeTable<'a' | 'b'>('t', { a: 'count', b: 'count' }, broken)).toThrow('lacks b')
})

test('where no author is known none is counted; where they are, they stay', () => {
  const findings = sampleFindings()
  const counted = (tables: ReturnType<typeof tablesOf>) => tables.flatMap(({ name, rows }) => rows.flatMap((row) => (['authors', 'gini', 'top_share', 'effective_authors'].some((key) => typeof row[key] === 'number') ? [name] : [])))
  expect(counted(tablesOf({ ...findings, accounting: { ...findings.accounting, authors: 'unknown' } }))).toEqual([])
  expect(counted(tablesOf(findings))).toContain('venues')
})
