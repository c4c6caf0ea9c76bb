import { endWall, weekOf } from './calendar.ts'
import { labels, scoreOf } from './graded-score.ts'
import { brand } from './posts.ts'
import type { Post } from './posts.ts'
import type { Draws } from './seeded-draws.ts'
import { copyOf, stormText } from './wording.ts'

/** What is wrong with a row as exported; `none` for nearly all. */
export type Flaw = 'none' | 'time' | 'score' | 'venue' | 'id-repeated' | 'repost'

export interface Row {
  readonly post: Post
  readonly flaw: Flaw
}

const hour = 3_600_000
const shares = { time: 0.0025, score: 0.002, venue: 0.0005, idRepeated: 0.005, repost: 0.02 }
const storm = { begins: Date.UTC(2026, 9, 13, 7), copies: 800, lastsHours: 110 }

/** Rows as an export yields them, in order of time: some unreadable, some twice, some texts copied by others. */
export function blemish(posts: readonly Post[], draws: Draws): readonly Row[] {
  const rows: Row[] = []
  let copies = 0
  for (const post of posts) {
    const flaw = flawOf(draws)
    rows.push({ post, flaw })
    if (flaw === 'none' && draws.chance(shares.idRepeated)) rows.push({ post: { ...post, wall: Math.min(post.wall + draws.integer(3) * hour, endWall - 1000) }, flaw: 'id-repeated' })
    if (post.text !== '' && flaw === 'none' && post.brand === brand && draws.chance(shares.repost)) rows.push({ post: repost(post, copies++, draws), flaw: 'repost' })
  }
  rows.push(...stormRows(copies, draws))
  return rows.sort((a, b) => a.post.wall - b.post.wall)
}

function flawOf(draws: Draws): Flaw {
  const at = draws.uniform()
  if (at < shares.time) return 'time'
  if (at < shares.time + shares.score) return 'score'
  return at < shares.time + shares.score + shares.venue ? 'venue' : 'none'
}

function repost(post: Post, number: number, draws: Draws): Post {
  const wall = Math.min(post.wall + Math.ceil(draws.uniform() * 96) * hour, endWall - 1000)
  return { ...post, ref: `c${number.toString(36).padStart(4, '0')}`, wall, week: weekOf(wall), handle: copier(number), text: copyOf(post.text, post.handle, draws) }
}

/** One angry text about the timetable, copied some hundred times within five days, mostly on microblogs. */
function stormRows(firstNumber: number, draws: Draws): Row[] {
  const first: Post = {
    ref: 'm-storm', wall: storm.begins, week: weekOf(storm.begins), venue: 'microblogs', topic: 'punctuality', brand, handle: copier(firstNumber), segment: 'islander',
    grade: 0, score: scoreOf(0, labels), thread: '', parent: '', text: stormText,
  }
  const copies = Array.from({ length: storm.copies }, (_, i): Row => {
    const wall = storm.begins + 1000 + Math.floor(draws.uniform() ** 2 * storm.lastsHours * 3600) * 1000
    const venue = draws.chance(0.88) ? 'microblogs' : 'videos'
    const number = firstNumber + 1 + i
    return { post: { ...first, ref: `c${number.toString(36).padStart(4, '0')}`, wall, week: weekOf(wall), venue, handle: copier(number), text: copyOf(stormText, copier(firstNumber), draws) }, flaw: 'repost' }
  })
  return [{ post: first, flaw: 'none' }, ...copies]
}

function copier(number: number): string {
  return `echo${((number * 611) % 9973).toString(36)}`
}
