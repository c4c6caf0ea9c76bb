import { afterAll, beforeAll, expect, test } from 'vitest'
import { breakBetween, periodsOf } from '../../../generator/archive-page/order-reviews.ts'
import { readReviews, type ListedArchive } from '../../../generator/archive-page/read-reviews.ts'
import { fivePeriods, inventedArchive } from './invented-archive.ts'

let listed: ListedArchive
let remove: () => Promise<void>
beforeAll(async () => {
  const made = await inventedArchive(fivePeriods)
  remove = made.remove
  listed = await readReviews(made.folder)
})
afterAll(() => remove())

const names = (archive: ListedArchive) => periodsOf(archive.reviews).map((those) => those.map(({ name }) => name))

test('the newest period first, and in it the review that stands', () => {
  expect(names(listed)).toEqual([['2026-10'], ['2026-09'], ['2026-08.r3', '2026-08.r2', '2026-08'], ['2026-07'], ['2026-06']])
})

test('the order does not hang on that in which they were read', () => {
  expect(names({ ...listed, reviews: listed.reviews.toReversed() })).toEqual(names(listed))
})

test('a quarter stands among months by its first day, and a review without figures by its name', async () => {
  const mixed = await inventedArchive([{ period: '2026-09', level: 1 }, { period: '2026-12', level: 1, findings: '{}' }, { period: '2026-10', level: 1 }])
  expect(names(await readReviews(mixed.folder))).toEqual([['2026-12'], ['2026-10'], ['2026-09']])
  await mixed.remove()
  const { reviews: [review] } = listed
  const other = (period: string, start: string) => ({ ...review, manifest: { ...review.manifest, period }, figures: typeof review.figures === 'string' ? review.figures : { ...review.figures, period: { start, end: start } } })
  expect(periodsOf([other('2026-Q3', '2026-07-01'), other('2026-06', '2026-06-01'), other('2026-10', '2026-10-01')]).map(([{ manifest }]) => manifest.period)).toEqual(['2026-10', '2026-Q3', '2026-06'])
})

test('a break is another version, or other code of the model; other code elsewhere is none', () => {
  const [one] = listed.reviews
  const by = (change: Partial<typeof one.manifest.program>) => ({ ...one, manifest: { ...one.manifest, program: { ...one.manifest.program, ...change } } })
  expect(breakBetween(by({ version: '2.0.0' }), one)).toBe('version')
  expect(breakBetween(by({ model: 'c'.repeat(64) }), one)).toBe('model')
  expect(breakBetween(by({ code: 'c'.repeat(64), browser: null, runtime: 'node 22' }), one)).toBeNull()
})
