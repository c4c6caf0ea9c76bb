import { existsSync } from 'node:fs'
import path from 'node:path'
import { describe, expect, test } from 'vitest'
import { readAccount } from '../../../generator/account/read-account.ts'
import { readIntake } from '../../../generator/intake/read-intake.ts'

const folder = path.join(import.meta.dirname, 'fixtures/open-cells')
const sum = (values: Iterable<number>): number => [...values].reduce((total, value) => total + value, 0)

describe('an account whose cells come ready-made', () => {
  test('is read whole', async () => {
    expect(existsSync(folder)).toBe(true)
    const tables = await readIntake(await readAccount(folder))
    const { cells, timeline, accounting, factors } = tables
    // The counts that the reference fit of these cells was made with.
    expect([cells.count, timeline.steps.length, sum(cells.mentions), sum(timeline.inBase)]).toEqual([424, 26, 6888, 12])
    const stepsWithCells = new Set(cells.step)
    expect(timeline.steps.filter((_, step) => !stepsWithCells.has(step))).toEqual(['2025-06-23'])
    expect(sum(cells.mentions.filter((_, cell) => timeline.inBase[cells.step[cell]!] === 1))).toBe(3103)
    expect(factors.map((factor) => factor.levels.map((level) => level.name))).toEqual([
      ['boards', 'microblogs', 'reviews'], ['fares', 'onboard', 'punctuality'], ['occasional', 'regular'],
    ])
    expect(accounting).toMatchObject({ received: 424, rejected: 0, duplicates: 0, outOfScope: 0, modelled: 424, readyMade: true })
  })

  test('keeps its variances: the pooled ones are those of the reference', async () => {
    const { cells } = await readIntake(await readAccount(folder))
    const ofVenue = (column: Float64Array, venue: number): number => sum(column.filter((_, cell) => cells.levels[0]![cell] === venue))
    const pooled = [0, 1, 2].map((venue) => ofVenue(cells.squares, venue) / ofVenue(cells.freedom, venue))
    const reference = [0.149607289455548, 0.217014141875172, 0.12195089244186]
    for (const [venue, value] of reference.entries()) expect(pooled[venue]! / value).toBeCloseTo(1, 12)
    expect([0, 1, 2].map((venue) => ofVenue(cells.freedom, venue))).toEqual([1451, 3637, 1376])
  })

  test('reads no cell whose step belongs to a later period', async () => {
    const { timeline, accounting, authors } = await readIntake(await readAccount(folder), { period: '2025-07' })
    expect([timeline.review.name, timeline.steps.at(-1), timeline.periods.at(-1)!.name]).toEqual(['2025-07', '2025-07-28', '2025-07'])
    expect(accounting.received).toBe(accounting.modelled + accounting.outOfScope)
    expect(accounting.reasons).toEqual({ 'after-period': accounting.outOfScope })
    expect(authors.exact).toBe(false)
  })
})
