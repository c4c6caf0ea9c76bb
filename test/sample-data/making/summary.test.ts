import { expect, test } from 'vitest'
import { day, firstWall } from '../../../sample-data/making/calendar.ts'
import type { Post } from '../../../sample-data/making/posts.ts'
import { intraclass, posterClasses } from '../../../sample-data/making/summary.ts'

const post = (dayOf: number, handle: string, score = 0): Post => ({
  ref: '', wall: firstWall + dayOf * day, week: 0, venue: 'boards', topic: 'fares', brand: '', handle, segment: '', grade: 0, score, thread: '', parent: '', text: '',
})

test('poster classes: the first 90 days count whole, later ones up to the post', () => {
  const posts = [post(0, 'ada'), post(1, 'bo'), ...[2, 3, 4, 5, 6].map((at) => post(at, 'ada')), post(7, ''), post(120, 'cy'), post(130, 'cy'), post(250, 'cy')]
  expect(posterClasses(posts)).toEqual(['prolific', 'occasional', 'prolific', 'prolific', 'prolific', 'prolific', 'prolific', 'unknown', 'occasional', 'regular', 'occasional'])
})

test('intraclass correlation: 1 where authors never vary, by hand where they do', () => {
  expect(intraclass([post(0, 'ada', 1), post(1, 'ada', 1), post(2, 'bo', -1), post(3, 'bo', -1)])).toBeCloseTo(1, 12)
  // Means 0.5 and -0.5 around 0: mean square between 2 * 2 * 0.25 / 1 = 1, within 4 * 0.25 / 2 = 0.5; (1 - 0.5) / (1 + 0.5).
  expect(intraclass([post(0, 'ada', 1), post(1, 'ada', 0), post(2, 'bo', -1), post(3, 'bo', 0)])).toBeCloseTo(1 / 3, 12)
})
