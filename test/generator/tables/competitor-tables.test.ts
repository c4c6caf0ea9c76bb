import { describe, expect, test } from 'vitest'
import { competitorSeriesTable, competitorsTable, competitorVenuesTable, mentionSharesTable } from '../../../generator/tables/competitor-tables.ts'
import { periodNames } from '../../support/sample-series.ts'
import { untoldCompetitors } from '../../support/sample-competitors.ts'
import { sampleFindings } from '../../support/sample-findings.ts'

const findings = sampleFindings()

describe('competitors', () => {
  test('one row each, in the order of the account; of few authors counts alone', () => {
    const { rows } = competitorsTable(findings)
    expect(rows.map(({ brand, status }) => [brand, status])).toEqual([['Tarrin Line', 'compared'], ['Corran Ferries', 'compared'], ['Lowmoor Boats', 'thin']])
    expect(rows[0]).toMatchObject({ difference: 6.4, authors: 640 })
    expect(rows[2]).toMatchObject({ mentions: 11, authors: 7, level: null, difference: null, change_difference_low: null, covered: null })
  })

  test('the series has a row for every period of those compared, the brand’s level beside; null where too few posted', () => {
    const { rows } = competitorSeriesTable(findings)
    expect(rows).toHaveLength(2 * periodNames.length)
    expect(rows[4]).toMatchObject({ brand: 'Tarrin Line', own: 'Skerrow Ferries', period: periodNames[4], level: null })
    expect(rows[4]!['own_level']).toBeTypeOf('number')
  })
})

describe('shares of mentions', () => {
  test('the account’s own brand comes first; all are in percent', () => {
    const { rows } = mentionSharesTable(findings)
    expect(rows.map(({ brand, own }) => [brand, own])).toEqual([['Skerrow Ferries', true], ['Tarrin Line', false], ['Corran Ferries', false], ['Lowmoor Boats', false]])
    expect(rows[0]).toMatchObject({ share_counted: 66.7, share_equal: 64.2, mentions: 2410 })
  })

  test('mentions by venue and brand, in the order of the review’s venues', () => {
    const { rows } = competitorVenuesTable(findings)
    expect(rows.filter(({ venue }) => venue === 'boards').map(({ brand, mentions }) => [brand, mentions])).toEqual([['Skerrow Ferries', 1100], ['Tarrin Line', 420], ['Corran Ferries', 130], ['Lowmoor Boats', 6]])
  })

  test('without competitors, or where no source tells brands apart, there is nothing', () => {
    for (const make of [competitorsTable, competitorSeriesTable, mentionSharesTable, competitorVenuesTable]) expect(make({ ...findings, competitors: null }).rows).toEqual([])
    expect(mentionSharesTable({ ...findings, competitors: untoldCompetitors('unread') }).rows).toEqual([])
  })
})
