import { day, isoDate } from '../making/calendar.ts'

/**
 * The truth that is built into the account of Pellwick Fahrräder (in words: pellwick-cycles/TRUTH.md). Levels are scores
 * on [-1, 1]. A post's expected score is opinion + venue offset + topic offset + poster-class offset; no venue drifts.
 */
export const venues = ['forum', 'fachhandel'] as const
export type Venue = (typeof venues)[number]
export const topics = ['lieferung', 'preis', 'rad', 'werkstatt'] as const
export type Topic = (typeof topics)[number]
export const posters = ['occasional', 'regular', 'prolific'] as const
export type Poster = (typeof posters)[number]

export const venueOffset: Readonly<Record<Venue, number>> = { forum: -0.08, fachhandel: 0.16 }
export const topicOffset: Readonly<Record<Topic, number>> = { lieferung: -0.16, preis: -0.08, rad: 0.12, werkstatt: 0 }
export const posterOffset: Readonly<Record<Poster, number>> = { occasional: 0.02, regular: 0, prolific: -0.1 }

export const topicShare: Readonly<Record<Topic, number>> = { lieferung: 0.26, preis: 0.08, rad: 0.42, werkstatt: 0.24 }
export const posterShare: Readonly<Record<Poster, number>> = { occasional: 0.62, regular: 0.29, prolific: 0.09 }

/** The week that holds 1 May 2025, and those up to the end of October 2026: eighteen months. */
const firstMonday = Date.UTC(2025, 3, 28)
export const weeks = 79

/** Dates and values; straight lines between. */
type Path = readonly (readonly [date: string, value: number])[]

const opinion: Path = [['2025-04-28', 0.05], ['2025-09-15', 0.08], ['2026-03-16', 0.07], ['2026-05-04', -0.02], ['2026-08-10', 0.01], ['2026-11-01', 0.05]]
const shareOfDealers: Path = [['2025-04-28', 0.45], ['2026-11-01', 0.3]]
const postsAWeek: Path = [['2025-04-28', 34], ['2025-12-22', 17], ['2026-04-20', 40], ['2026-11-01', 19]]

export interface Week {
  readonly monday: string
  readonly opinion: number
  /** Posts expected, by venue. */
  readonly posts: Readonly<Record<Venue, number>>
}

/** The truth week by week, shape (weeks); nothing in it is drawn. */
export function tellStory(): readonly Week[] {
  return Array.from({ length: weeks }, (_, week) => {
    const monday = firstMonday + 7 * week * day
    const middle = monday + 3.5 * day
    const [posts, dealers] = [valueAt(postsAWeek, middle), valueAt(shareOfDealers, middle)]
    return { monday: isoDate(monday), opinion: valueAt(opinion, middle), posts: { forum: posts * (1 - dealers), fachhandel: posts * dealers } }
  })
}

/** Opinion in points, the mean of the days from `start` to `end` (wall times of days within the story). */
export function opinionOver(start: number, end: number): number {
  const days = Math.round((end - start) / day) + 1
  const values = Array.from({ length: days }, (_, i) => valueAt(opinion, start + (i + 0.5) * day))
  return (100 * values.reduce((sum, value) => sum + value, 0)) / days
}

function valueAt(path: Path, at: number): number {
  const times = path.map(([date]) => Date.parse(date))
  const next = Math.max(1, times.findIndex((time) => time >= at))
  const share = (at - times[next - 1]) / (times[next] - times[next - 1])
  return path[next - 1][1] + share * (path[next][1] - path[next - 1][1])
}
