import { day, firstWall } from './calendar.ts'
import type { AuthorType, PosterClass } from './story.ts'

const span = 90 * day
const classOfType: Record<AuthorType, PosterClass> = { casual: 'occasional', regular: 'regular', prolific: 'prolific' }

/**
 * Tells the class of each new post's author, in order of time: by the posts of the last 90 days with this one.
 * In the first 90 days, which a review counts whole, the kind of author stands for what is to come.
 */
export function classifyPosters(): (handle: string, type: AuthorType, wall: number) => PosterClass {
  const recent = new Map<string, readonly number[]>()
  return (handle, type, wall) => {
    const times = [...(recent.get(handle) ?? []).filter((time) => time > wall - span), wall]
    recent.set(handle, times)
    return wall < firstWall + span ? classOfType[type] : classOfCount(times.length)
  }
}

/** Occasional 1, regular 2 to 5, prolific 6 or more posts in 90 days. */
export function classOfCount(posts: number): PosterClass {
  if (posts >= 6) return 'prolific'
  return posts >= 2 ? 'regular' : 'occasional'
}
