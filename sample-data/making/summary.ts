import { middleOf, monthOf } from './calendar.ts'
import { classOfCount } from './poster-class.ts'
import type { Post } from './posts.ts'
import type { Week } from './story.ts'

/** One month of the demo: what was built in, beside the two simplest readings of the posts (points). */
export interface MonthSummary {
  readonly month: string
  readonly posts: number
  /** Mean of the weeks that have their middle in the month. */
  readonly truth: number
  readonly raw: number
  /** Mean over cells of venue, topic and poster class, weighted as in the first twelve months. */
  readonly standardised: number
}

/**
 * Monthly raw and standardised averages of one brand's posts.
 * @param posts - in order of time
 */
export function summarise(posts: readonly Post[], story: readonly Week[]): readonly MonthSummary[] {
  const classes = posterClasses(posts)
  const cells = posts.map((post, i) => `${post.venue}/${post.topic}/${classes[i]}`)
  const months = posts.map((post) => monthOf(middleOf(post.week)))
  const order = [...new Set(months)]
  const inBase = new Set(order.slice(0, 12))
  const baseWeights = count(cells.filter((_, i) => inBase.has(months[i])))
  return order.map((month) => {
    const own = posts.map((_, i) => i).filter((i) => months[i] === month)
    return {
      month, posts: own.length,
      truth: 100 * mean(story.filter((_, week) => monthOf(middleOf(week)) === month).map((week) => week.opinion)),
      raw: 100 * mean(own.map((i) => posts[i].score)),
      standardised: 100 * standardised(own.map((i) => ({ cell: cells[i], score: posts[i].score })), baseWeights),
    }
  })
}

/** Occasional 1, regular 2 to 5, prolific 6 or more posts in the 90 days up to the post; the first 90 days count whole. */
export function posterClasses(posts: readonly Post[]): readonly string[] {
  const span = 90 * 86_400_000
  const firstEnd = posts[0].wall + span
  const inFirst = count(posts.filter((post) => post.wall < firstEnd).map(nameOf))
  const recent = new Map<string, number[]>()
  return posts.map((post) => {
    if (post.handle === '') return 'unknown'
    const times = (recent.get(nameOf(post)) ?? []).filter((time) => time > post.wall - span)
    times.push(post.wall)
    recent.set(nameOf(post), times)
    return classOfCount(post.wall < firstEnd ? inFirst.get(nameOf(post))! : times.length)
  })
}

/** Intraclass correlation by author of one venue (one-way analysis of variance), scores less their week's mean. */
export function intraclass(posts: readonly Post[]): number {
  const byWeek = groupMeans(posts.map((post) => [String(post.week), post.score]))
  const known = posts.filter((post) => post.handle !== '').map((post) => [post.handle, post.score - byWeek.get(String(post.week))!.mean] as const)
  const byAuthor = groupMeans(known)
  const grand = mean(known.map(([, score]) => score))
  const between = [...byAuthor.values()].reduce((sum, group) => sum + group.size * (group.mean - grand) ** 2, 0) / (byAuthor.size - 1)
  const within = known.reduce((sum, [handle, score]) => sum + (score - byAuthor.get(handle)!.mean) ** 2, 0) / (known.length - byAuthor.size)
  const size = (known.length - [...byAuthor.values()].reduce((sum, group) => sum + group.size ** 2, 0) / known.length) / (byAuthor.size - 1)
  return (between - within) / (between + (size - 1) * within)
}

function nameOf(post: Post): string {
  return `${post.venue} ${post.handle}`
}

function standardised(posts: readonly { readonly cell: string; readonly score: number }[], weights: ReadonlyMap<string, number>): number {
  let total = 0
  let whole = 0
  for (const [cell, group] of groupMeans(posts.map((post) => [post.cell, post.score]))) {
    const weight = weights.get(cell) ?? 0
    total += weight * group.mean
    whole += weight
  }
  return total / whole
}

function groupMeans(pairs: readonly (readonly [string, number])[]): Map<string, { size: number; mean: number }> {
  const groups = new Map<string, { size: number; mean: number }>()
  for (const [key, value] of pairs) {
    const group = groups.get(key) ?? { size: 0, mean: 0 }
    group.size += 1
    group.mean += (value - group.mean) / group.size
    groups.set(key, group)
  }
  return groups
}

function count(keys: readonly string[]): Map<string, number> {
  const counts = new Map<string, number>()
  for (const key of keys) counts.set(key, (counts.get(key) ?? 0) + 1)
  return counts
}

function mean(values: readonly number[]): number {
  return values.reduce((sum, value) => sum + value, 0) / values.length
}
