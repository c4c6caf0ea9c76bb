import { expect, test } from 'vitest'
import { aheadOfUtc, isoDate, middleOf, monthOf, quarterOf, weekOf, weeks } from '../../../sample-data/making/calendar.ts'

const wall = (time: string) => Date.parse(`${time}Z`)
const offsetInLisbon = (utc: number) => {
  const parts = Object.fromEntries(new Intl.DateTimeFormat('en-GB', { timeZone: 'Europe/Lisbon', dateStyle: 'short', timeStyle: 'medium' }).formatToParts(utc).map(({ type, value }) => [type, value]))
  return wall(`${parts['year']}-${parts['month']}-${parts['day']}T${parts['hour']}:${parts['minute']}:${parts['second']}`) - utc
}

test('wall clocks agree with the zone database, hour by hour around every change', () => {
  for (const change of ['2024-10-27', '2025-03-30', '2025-10-26', '2026-03-29', '2026-10-25']) {
    for (let hour = -6; hour < 12; hour++) {
      const utc = Date.parse(`${change}T00:30:00Z`) + hour * 3_600_000
      const reading = utc + offsetInLisbon(utc)
      const first = offsetInLisbon(reading - 3_600_000) === 3_600_000 ? 3_600_000 : offsetInLisbon(utc)
      expect(aheadOfUtc(reading), new Date(utc).toISOString()).toBe(first)
    }
  }
})

test('weeks begin on Monday, and the last holds the end of October 2026', () => {
  expect(weeks).toBe(131)
  expect(weekOf(wall('2024-05-05T23:59:59'))).toBe(0)
  expect(weekOf(wall('2024-05-06T00:00:00'))).toBe(1)
  expect(isoDate(middleOf(130))).toBe('2026-10-29')
  expect([monthOf(middleOf(0)), quarterOf(middleOf(130))]).toEqual(['2024-05', '2026-Q4'])
})
