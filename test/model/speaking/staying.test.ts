import { describe, expect, test } from 'vitest'
import type { IntakeTables, StayingRow } from '../../../model/intake/intake-tables.ts'
import { readStaying } from '../../../model/speaking/staying.ts'

/** Ten monthly periods, the first four of them the base; of 100 authors of each stance so many stay. */
function tablesOf(stays: (period: number) => readonly [negative: number, middle: number, positive: number], authors = 100): IntakeTables {
  const rows = Array.from({ length: 10 }, (_, period) => stays(period).map((stayed, stance): StayingRow => ({ period, stance: stance as 0 | 1 | 2, authors, stayed: period === 9 ? 0 : stayed }))).flat()
  return {
    staying: rows,
    timeline: { current: 9, periods: Array.from({ length: 10 }, (_, p) => ({ name: `2026-${String(p + 1).padStart(2, '0')}` })), periodOf: Int32Array.from({ length: 10 }, (_, p) => p), inBase: Uint8Array.from({ length: 10 }, (_, p) => (p < 4 ? 1 : 0)) },
  } as unknown as IntakeTables
}

describe('who stays', () => {
  test('is the share active again, by stance, with its Wilson interval; the last period has none after it', () => {
    const found = readStaying(tablesOf(() => [81, 50, 50], 263), 0.95, 10)!
    expect(found.periods).toHaveLength(27)
    // Wilson interval of 81 of 263: Newcombe (1998), Statistics in Medicine 17:857, table I, method 3
    expect(found.periods[0]).toMatchObject({ from: '2026-01', to: '2026-02', stance: 'negative', authors: 263, stayed: 81 })
    expect(found.periods[0].low).toBeCloseTo(0.2553, 4)
    expect(found.periods[0].high).toBeCloseTo(0.3662, 4)
  })
  test('moderate voices that begin to leave are seen', () => {
    const found = readStaying(tablesOf((period) => [60, period < 5 ? 60 : 30, 60]), 0.9, 10)!
    expect(found.middle_gap).toMatchObject({ movement: 'down' })
    expect(found.middle_gap!.difference).toBeCloseTo(-30, 9)
    expect(found.middle_gap_change).toMatchObject({ movement: 'down' })
  })
  test('a gap that was always there is no change', () => {
    const found = readStaying(tablesOf(() => [60, 30, 60]), 0.9, 10)!
    expect(found.middle_gap!.movement).toBe('down')
    expect(found.middle_gap_change).toMatchObject({ difference: 0, movement: 'not-established' })
  })
  test('of fewer authors than may be shown nothing is told', () => {
    const found = readStaying(tablesOf(() => [5, 3, 5], 9), 0.9, 10)!
    expect(found.periods.every(({ share, stayed, authors }) => share === null && stayed === null && authors === 0)).toBe(true)
    expect(readStaying({ ...tablesOf(() => [1, 1, 1]), staying: [] }, 0.9, 10)).toBeNull()
  })
})
