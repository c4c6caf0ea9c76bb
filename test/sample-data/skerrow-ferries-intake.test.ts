import { join } from 'node:path'
import { expect, test } from 'vitest'
import { readAccount } from '../../generator/account/read-account.ts'
import { readIntake } from '../../generator/intake/read-intake.ts'
import { makeDemo } from '../../sample-data/make-skerrow-ferries.ts'
import { brand } from '../../sample-data/making/posts.ts'
import { summarise } from '../../sample-data/making/summary.ts'

const account = await readAccount(join(import.meta.dirname, '../../sample-data/skerrow-ferries'))
const { accounting, factors, timeline, cells } = await readIntake(account)
const { rows, story } = makeDemo()
const count = (holds: (row: (typeof rows)[number]) => boolean) => rows.filter(holds).length
const unreadable = (row: (typeof rows)[number]) => ['time', 'score', 'venue'].includes(row.flaw)

test('intake finds every blemish that was built in, and no other', () => {
  expect(accounting.received).toBe(rows.length)
  expect(accounting.rejected).toBe(count(unreadable))
  expect(accounting.outOfScope).toBe(count((row) => !unreadable(row) && row.post.brand !== brand))
  expect(accounting.reasons).toMatchObject({
    'time-unreadable': count((row) => row.flaw === 'time'), 'score-unreadable': count((row) => row.flaw === 'score'), 'venue-missing': count((row) => row.flaw === 'venue'),
    'same-id': count((row) => row.flaw === 'id-repeated' && row.post.brand === brand), repost: count((row) => row.flaw === 'repost'),
  })
  expect(accounting.received).toBe(accounting.rejected + accounting.duplicates + accounting.outOfScope + accounting.modelled)
})

test('the times that clocks skip or show twice are read and counted', () => {
  const local = rows.filter((row) => row.post.venue === 'boards' && row.flaw !== 'time').map((row) => new Date(row.post.wall).toISOString())
  const within = (hours: readonly string[]) => local.filter((time) => hours.some((hour) => time.startsWith(hour))).length
  expect(accounting.reasons['time-nonexistent']).toBeLessThanOrEqual(within(['2025-03-30T01', '2026-03-29T01']))
  expect(accounting.reasons['time-nonexistent']).toBeGreaterThan(5)
  expect(accounting.reasons['time-doubled']).toBeLessThanOrEqual(within(['2024-10-27T01', '2025-10-26T01', '2026-10-25T01']))
  expect(accounting.reasons['time-doubled']).toBeGreaterThan(5)
})

test('the account maps every spelling but the one left for the reader to see', () => {
  expect(accounting.unmapped.map(({ factor, value }) => `${factor} ${value}`)).toEqual(['topic lost property'])
  expect(factors.map(({ name, levels }) => [name, levels.map((level) => level.name)])).toEqual([
    ['venue', ['blogs', 'boards', 'microblogs', 'reviews', 'videos']],
    ['topic', ['booking', 'fares', 'lost property', 'none', 'onboard', 'punctuality', 'staff', 'weather']],
    ['poster', ['occasional', 'prolific', 'regular', 'unknown']],
  ])
})

test('raw averages of the last two months are those of the posts without their blemishes', () => {
  const raw = (name: string) => {
    const inside = Array.from({ length: cells.count }, (_, c) => c).filter((c) => timeline.periods[timeline.periodOf[cells.step[c]]].name === name)
    return (100 * inside.reduce((sum, c) => sum + cells.mentions[c] * cells.mean[c], 0)) / inside.reduce((sum, c) => sum + cells.mentions[c], 0)
  }
  const kept = summarise(rows.filter(({ flaw, post }) => flaw === 'none' && post.brand === brand).map(({ post }) => post), story)
  expect(timeline.review.name).toBe('2026-10')
  for (const name of ['2026-09', '2026-10']) expect(raw(name)).toBeCloseTo(kept.find(({ month }) => month === name)!.raw, 8)
  expect(raw('2026-10') - raw('2026-09')).toBeLessThan(-2)
})
