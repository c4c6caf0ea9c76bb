import { firstMonday, isoDate, middleOf, weeks } from './calendar.ts'
import type { Draws } from './seeded-draws.ts'

/**
 * The truth that is built into the demo data (in words: skerrow-ferries/TRUTH.md). Levels are scores on [-1, 1].
 * A post's expected score is opinion + venue offset + venue drift + topic offset + poster-class offset.
 */
export const venues = ['blogs', 'boards', 'microblogs', 'reviews', 'videos'] as const
export type Venue = (typeof venues)[number]
export const topics = ['booking', 'fares', 'onboard', 'punctuality', 'staff', 'weather'] as const
export type Topic = (typeof topics)[number]
export const authorTypes = ['casual', 'regular', 'prolific'] as const
export type AuthorType = (typeof authorTypes)[number]
export type PosterClass = 'occasional' | 'regular' | 'prolific'

export const venueOffset: Record<Venue, number> = { blogs: 0.1, boards: -0.07, microblogs: -0.04, reviews: 0.14, videos: 0.01 }
export const topicOffset: Record<Topic, number> = { booking: -0.02, fares: -0.12, onboard: 0.16, punctuality: -0.24, staff: 0.2, weather: -0.1 }
export const classOffset: Record<PosterClass, number> = { occasional: 0.03, regular: 0, prolific: -0.13 }

/** Dates and values; straight lines between. */
type Path = readonly (readonly [date: string, value: number])[]

const opinionPath: Path = [
  ['2024-05-01', 0.05], ['2024-06-20', 0.07], ['2024-07-20', 0.03], ['2024-09-05', 0.08], ['2024-11-28', 0.06],
  ['2025-01-02', -0.02], ['2025-02-20', 0.03], ['2025-03-25', 0.055], ['2025-04-24', 0.01], ['2025-06-20', 0.05],
  ['2025-09-10', 0.04], ['2025-10-20', 0.055], ['2025-12-04', 0.03], ['2026-01-15', 0], ['2026-03-05', 0.05],
  ['2026-05-14', 0.09], ['2026-07-02', 0.06], ['2026-09-12', 0.073], ['2026-10-16', 0.128], ['2026-10-31', 0.132],
]
const shareOfVenue: Record<Venue, Path> = {
  blogs: [['2024-05-01', 0.09], ['2026-10-31', 0.07]],
  boards: [['2024-05-01', 0.2], ['2026-10-31', 0.4]],
  microblogs: [['2024-05-01', 0.37], ['2026-10-31', 0.28]],
  reviews: [['2024-05-01', 0.14], ['2026-10-31', 0.11]],
  videos: [['2024-05-01', 0.2], ['2026-10-31', 0.14]],
}
const shareOfPunctuality: Path = [['2024-05-01', 0.17], ['2026-08-27', 0.18], ['2026-09-17', 0.23], ['2026-10-01', 0.36], ['2026-10-15', 0.53], ['2026-10-31', 0.53]]
const shareOfProlific: Path = [['2024-05-01', 0.18], ['2025-10-01', 0.26], ['2026-09-01', 0.33], ['2026-10-31', 0.4]]
const postsPerWeek: Path = [['2024-05-01', 420], ['2025-10-01', 560], ['2026-08-20', 740], ['2026-09-17', 1150], ['2026-10-31', 1280]]
const boardsDrift: Path = [['2024-05-01', 0], ['2026-10-31', -0.17]]

export interface Week {
  readonly monday: string
  readonly posts: number
  readonly opinion: number
  readonly drift: Record<Venue, number>
  readonly venueShare: Record<Venue, number>
  readonly typeShare: Record<AuthorType, number>
  readonly topicShare: Record<Venue, Record<Topic, number>>
}

/** The truth week by week, shape (weeks). */
export function tellStory(draws: Draws): readonly Week[] {
  const wobble = returningWalk(draws, 0.0075, 0.85)
  const driftWobble = perKey(venues, (venue) => returningWalk(draws, venue === 'boards' ? 0.006 : 0.0006, 0.9))
  return Array.from({ length: weeks }, (_, index): Week => {
    const at = middleOf(index)
    const prolific = valueAt(shareOfProlific, at)
    const restless = 1 - prolific
    return {
      monday: isoDate(firstMonday + index * 7 * 86_400_000),
      posts: valueAt(postsPerWeek, at) * (1 + 0.16 * Math.cos(summer(at))),
      opinion: round(valueAt(opinionPath, at) + wobble[index] - wobble[0]),
      drift: perKey(venues, (venue) => round((venue === 'boards' ? valueAt(boardsDrift, at) - valueAt(boardsDrift, middleOf(0)) : 0) + driftWobble[venue][index] - driftWobble[venue][0])),
      venueShare: perKey(venues, (venue) => valueAt(shareOfVenue[venue], at)),
      typeShare: { casual: restless * 0.6, regular: restless * 0.4, prolific },
      topicShare: perKey(venues, (venue) => topicMix(venue, at)),
    }
  })
}

/** How much more than elsewhere a venue talks about a topic. */
const tilt: Partial<Record<Venue, Partial<Record<Topic, number>>>> = {
  boards: { punctuality: 1.15, staff: 0.8 },
  reviews: { onboard: 1.5, staff: 1.5, punctuality: 0.6 },
  blogs: { onboard: 1.4, punctuality: 0.7 },
}

function topicMix(venue: Venue, at: number): Record<Topic, number> {
  const punctuality = valueAt(shareOfPunctuality, at)
  const weather = 0.13 - 0.07 * Math.cos(summer(at))
  const others: Record<Topic, number> = { booking: 0.2, fares: 0.24, onboard: 0.24, punctuality: 0, staff: 0.2, weather }
  const scale = (1 - punctuality) / sum(Object.values(others))
  const tilted = perKey(topics, (topic) => (topic === 'punctuality' ? punctuality : others[topic] * scale) * (tilt[venue]?.[topic] ?? 1))
  const whole = sum(Object.values(tilted))
  return perKey(topics, (topic) => tilted[topic] / whole)
}

/** Angle of the year, 0 in mid July. */
function summer(at: number): number {
  return (2 * Math.PI * (at - Date.UTC(2024, 6, 15))) / (365.25 * 86_400_000)
}

function valueAt(path: Path, at: number): number {
  const times = path.map(([date]) => Date.parse(`${date}T00:00:00Z`))
  const next = times.findIndex((time) => time >= at)
  if (next <= 0) return next === 0 ? path[0][1] : path[path.length - 1][1]
  const share = (at - times[next - 1]) / (times[next] - times[next - 1])
  return path[next - 1][1] + share * (path[next][1] - path[next - 1][1])
}

/** A walk that is drawn back to 0: each step keeps `memory` of the one before. */
function returningWalk(draws: Draws, sd: number, memory: number): readonly number[] {
  let value = 0
  return Array.from({ length: weeks }, () => (value = memory * value + sd * draws.normal()))
}

export function perKey<K extends string, T>(keys: readonly K[], make: (key: K) => T): Record<K, T> {
  return Object.fromEntries(keys.map((key) => [key, make(key)])) as Record<K, T>
}

function sum(values: readonly number[]): number {
  return values.reduce((total, value) => total + value, 0)
}

function round(value: number): number {
  return Math.round(value * 1e5) / 1e5
}
