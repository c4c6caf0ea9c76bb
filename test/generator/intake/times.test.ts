import { describe, expect, test } from 'vitest'
import { readAccount } from '../../../generator/account/read-account.ts'
import { zoneClock } from '../../../generator/calendar/time-zone.ts'
import { isoDate } from '../../../generator/calendar/days.ts'
import { openDatabase, literal } from '../../../generator/intake/database.ts'
import { readIntake } from '../../../generator/intake/read-intake.ts'
import { timeSql, timeText, zoneSql } from '../../../generator/intake/time-sql.ts'
import { withAccount } from './temporary-account.ts'

const range = [Date.UTC(2009, 0, 1) / 1000, Date.UTC(2026, 0, 1) / 1000] as const

/** How times are read in a zone: the instant in ISO form, the local day, and by which rule. */
async function readings(texts: readonly string[], zone: string, until = '2100-01-01'): Promise<readonly string[]> {
  return withAccount({}, async (scratch) => {
    const database = await openDatabase({ readable: [], scratch, threads: 1 })
    const time = timeSql('posted', null)
    const sql = zoneSql(zoneClock(zone, ...range))
    const levels = [time.draft, time.zoned, time.reading, time.clock]
      .reduce((inner, column) => `SELECT *, ${column} FROM (${inner})`, `SELECT place, ${timeText('raw')} AS posted FROM (VALUES ${texts.map((text, index) => `(${index}, ${literal(text)})`).join(', ')}) AS t(place, raw)`)
    const rows = await database.rows<{ instant: bigint | null; day: number | null; rule: string; inside: boolean }>(
      `SELECT ${sql.instant} AS instant, ${sql.day} AS day, CASE WHEN ${sql.nonexistent} THEN ' nonexistent' WHEN ${sql.doubled} THEN ' doubled' ELSE '' END AS rule,
        ${sql.until(Date.parse(until) / 86_400_000)} AS inside FROM (${levels}) ORDER BY place`)
    database.close()
    return rows.map(({ instant, day, rule, inside }) => (instant === null ? 'none' : `${new Date(Number(instant) / 1000).toISOString()} ${isoDate(day!)}${rule}${inside ? '' : ' later'}`))
  })
}

describe('times', () => {
  test('ISO 8601 with and without offset, its basic form, epochs in seconds and milliseconds', async () => {
    expect(await readings(['2025-07-01T10:00:00', '2025-07-01 10:00', '2025-07-01', ' 2025-07-01 ', '2025-07-01T10:00:00Z', '2025-07-01T10:00:00.250z', '2025-07-01T00:30:00+02:00', '2025-07-01T10:00-02',
      '2025-07-01 10:00:00 UTC', '20250701', '20250701T101112', '20250701T101112Z', '1751364000', '1751364000000', '1751364000.5'], 'Europe/Lisbon')).toEqual([
      '2025-07-01T09:00:00.000Z 2025-07-01', '2025-07-01T09:00:00.000Z 2025-07-01', '2025-06-30T23:00:00.000Z 2025-07-01', '2025-06-30T23:00:00.000Z 2025-07-01',
      '2025-07-01T10:00:00.000Z 2025-07-01', '2025-07-01T10:00:00.250Z 2025-07-01', '2025-06-30T22:30:00.000Z 2025-06-30', '2025-07-01T12:00:00.000Z 2025-07-01',
      '2025-07-01T10:00:00.000Z 2025-07-01', '2025-06-30T23:00:00.000Z 2025-07-01', '2025-07-01T09:11:12.000Z 2025-07-01', '2025-07-01T10:11:12.000Z 2025-07-01',
      '2025-07-01T10:00:00.000Z 2025-07-01', '2025-07-01T10:00:00.000Z 2025-07-01', '2025-07-01T10:00:00.500Z 2025-07-01',
    ])
  })

  test('what is no time is none', async () => {
    const texts = ['', 'yesterday', 'infinity', '-infinity', 'epoch', ' epoch', '2025-02-30', '2025-13-01', '0099-01-01', '9999-01-01', 'nan', '1e300', '2025-07', '12/31/2025', '2025-07-01T25:00:00']
    expect(await readings(texts, 'UTC')).toEqual(texts.map(() => 'none'))
  })

  test('a skipped time is read as the moment of the change, a doubled one as its first showing', async () => {
    expect(await readings(['2025-03-30T00:59:59', '2025-03-30T01:30:00', '2025-03-30T02:00:00', '2025-10-26T00:59:59', '2025-10-26T01:30:00', '2025-10-26T02:00:00', '2025-10-26T01:30:00Z'], 'Europe/Lisbon')).toEqual([
      '2025-03-30T00:59:59.000Z 2025-03-30', '2025-03-30T01:00:00.000Z 2025-03-30 nonexistent', '2025-03-30T01:00:00.000Z 2025-03-30',
      '2025-10-25T23:59:59.000Z 2025-10-26', '2025-10-26T00:30:00.000Z 2025-10-26 doubled', '2025-10-26T02:00:00.000Z 2025-10-26', '2025-10-26T01:30:00.000Z 2025-10-26',
    ])
  })

  test('days that begin late, begin twice or were left out', async () => {
    // Sao Paulo set clocks at midnight; Apia left out the whole of 30 December 2011.
    expect(await readings(['2018-11-04T00:30:00', '2018-11-04T02:59:59Z', '2018-11-04T03:00:00Z'], 'America/Sao_Paulo', '2018-11-03')).toEqual([
      '2018-11-04T03:00:00.000Z 2018-11-04 nonexistent later', '2018-11-04T02:59:59.000Z 2018-11-03', '2018-11-04T03:00:00.000Z 2018-11-04 later',
    ])
    expect(await readings(['2018-02-17T23:30:00', '2018-02-18T01:59:59Z', '2018-02-18T02:30:00Z', '2018-02-18T03:00:00Z'], 'America/Sao_Paulo', '2018-02-17')).toEqual([
      '2018-02-18T01:30:00.000Z 2018-02-17 doubled', '2018-02-18T01:59:59.000Z 2018-02-17', '2018-02-18T02:30:00.000Z 2018-02-17', '2018-02-18T03:00:00.000Z 2018-02-18 later',
    ])
    expect(await readings(['2011-12-29T23:59:59', '2011-12-30T12:00:00', '2011-12-31T00:00:00'], 'Pacific/Apia', '2011-12-30')).toEqual([
      '2011-12-30T09:59:59.000Z 2011-12-29', '2011-12-30T10:00:00.000Z 2011-12-31 nonexistent later', '2011-12-30T10:00:00.000Z 2011-12-31 later',
    ])
  })

  test('rules applied are counted, and a mention after the period is out of scope by the account\'s clock', async () => {
    const yaml = 'account: demo\nbrand: B\ntime_zone: Europe/Lisbon\nmentions:\n  - files: a.csv\n    columns: { posted_at: t, venue: v, score: s }\n    score: { range: [-1, 1] }\n'
    const tables = await withAccount({ 'account.yaml': yaml, 'a.csv': 't,v,s\n2025-03-30T01:30:00,a,0\n2025-10-26T01:30:00,a,1\n2025-10-31T23:30:00-01:00,a,1\n2025-10-31T23:30:00,a,1\n' },
      async (folder) => readIntake(await readAccount(folder), { period: '2025-10' }))
    expect(tables.accounting).toMatchObject({ received: 4, modelled: 3, outOfScope: 1, reasons: { 'time-nonexistent': 1, 'time-doubled': 1, 'after-period': 1 } })
  })
})
