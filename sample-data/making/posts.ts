import { clockChanges, day, endWall, firstMonday, firstWall } from './calendar.ts'
import { grade, labels, locationFor, meanScore, scoreOf, stars } from './graded-score.ts'
import { gatherCrowd } from './authors.ts'
import type { Author } from './authors.ts'
import type { Draws } from './seeded-draws.ts'
import { authorTypes, classOffset, topicOffset, topics, venueOffset, venues } from './story.ts'
import type { PosterClass, Topic, Venue, Week } from './story.ts'
import { classifyPosters } from './poster-class.ts'
import { followThreads } from './threads.ts'
import { sentence } from './wording.ts'

export const brand = 'Skerrow Ferries'
const rival = 'Tarrin Line'

export interface Post {
  readonly ref: string
  /** Wall time in the account's zone (calendar.ts). */
  readonly wall: number
  readonly week: number
  readonly venue: Venue
  /** Empty for the few posts that nobody assigned. */
  readonly topic: Topic | ''
  readonly brand: string
  /** Empty where the venue shows no name. */
  readonly handle: string
  readonly segment: string
  /** 0..2 for labels, 0..4 for stars. */
  readonly grade: number
  readonly score: number
  readonly thread: string
  readonly parent: string
  readonly text: string
}

/** Of the latent variance, the part that lies between authors. */
const authorShare = 0.2
const shareOfRivalPosts = 0.04
const shareWithoutTopic = 0.015
const nameless: Record<Venue, number> = { blogs: 0.04, boards: 0, microblogs: 0, reviews: 0.12, videos: 0 }
const hourWeights = [1, 1, 0.5, 0.5, 0.5, 1, 3, 6, 8, 8, 7, 7, 8, 8, 7, 7, 8, 9, 10, 10, 9, 8, 5, 3]

/** Every post as it was written, in order of time, before any export has blemished it. */
export function writePosts(story: readonly Week[], draws: Draws): readonly Post[] {
  const crowd = gatherCrowd(draws)
  const threads = followThreads(draws)
  const classOf = classifyPosters()
  const locate = locationsByMean()
  const saidLately = new Map<string, number>()
  const posts: Post[] = []

  const say = (topic: Topic | '', tone: number, week: number): string => {
    for (;;) {
      const text = sentence(topic, tone, draws)
      if ((saidLately.get(text) ?? -9) < week - 3) {
        saidLately.set(text, week)
        return text
      }
    }
  }

  const write = (index: number, wall: number): Post => {
    const week = story[index]
    const venue = venues[draws.weighted(venues.map((name) => week.venueShare[name]))]
    const type = authorTypes[draws.weighted(authorTypes.map((name) => week.typeShare[name]))]
    const topic = topics[draws.weighted(topics.map((name) => week.topicShare[venue][name]))]
    const about = draws.chance(shareOfRivalPosts) ? rival : brand
    const hidden = draws.chance(nameless[venue])
    const author = crowd.pick(venue, hidden ? 'casual' : type)
    const grading = venue === 'reviews' ? stars : labels
    const posterClass = hidden || about === rival ? 'occasional' : classOf(author.handle, type, wall)
    const location = locate(wantedMean(week, venue, topic, posterClass, about), venue === 'reviews')
    const ref = `${venue[0]}${posts.length.toString(36).padStart(4, '0')}`
    const place = venue === 'boards' ? threads.join(ref, topic, about) : { thread: venue === 'videos' ? `clip${Math.floor(wall / day) % 997}` : '', parent: '', pull: 0 }
    const latent = location + place.pull + Math.sqrt(authorShare) * author.leaning + Math.sqrt(1 - authorShare) * draws.normal()
    const graded = grade(latent, grading)
    const score = scoreOf(graded, grading)
    if (venue === 'boards') threads.heard(place.thread, score - meanScore(location, grading))
    return {
      ref, wall: venue === 'boards' ? onClockChange(wall, draws) : wall, week: index, venue, topic: draws.chance(shareWithoutTopic) ? '' : topic,
      brand: about, handle: hidden ? '' : author.handle, segment: segmentOf(author, hidden), grade: graded, score,
      thread: place.thread, parent: place.parent,
      text: venue === 'microblogs' && draws.chance(0.45) ? say(topic, graded, index) : '',
    }
  }

  story.forEach((week, index) => {
    crowd.beginWeek(week, index)
    for (const wall of timesOfWeek(week, index, draws)) posts.push(write(index, wall))
  })
  return posts
}

function segmentOf(author: Author, hidden: boolean): string {
  return hidden ? '' : author.segment
}

function wantedMean(week: Week, venue: Venue, topic: Topic, posterClass: PosterClass, about: string): number {
  const opinion = about === brand ? week.opinion + week.drift[venue] : 0.02
  return opinion + venueOffset[venue] + topicOffset[topic] + classOffset[posterClass]
}

/** Ascending wall times of a week's posts, inside the data's first and last day. */
function timesOfWeek(week: Week, index: number, draws: Draws): readonly number[] {
  const count = draws.poisson(week.posts * Math.exp(0.05 * draws.normal()))
  const dayWeights = [10, 9, 9, 10, 12, 11, 9]
  const times = Array.from({ length: count }, () => {
    const hour = draws.weighted(hourWeights)
    return firstMonday + index * 7 * day + draws.weighted(dayWeights) * day + hour * 3_600_000 + draws.integer(3600) * 1000
  })
  return times.filter((wall) => wall >= firstWall && wall < endWall).sort((a, b) => a - b)
}

/** On the nights when clocks change, boards get some posts in the hour that is skipped or comes twice. */
function onClockChange(wall: number, draws: Draws): number {
  const { spring, autumn } = clockChanges(new Date(wall).getUTCFullYear())
  const midnight = Math.floor(wall / day) * day
  const changes = midnight === spring || midnight === autumn
  return changes && draws.chance(0.3) ? midnight + 3_600_000 + draws.integer(3600) * 1000 : wall
}

/** Latent location of a wanted mean, remembered to the nearest 1/4000: a search each would be slow. */
function locationsByMean(): (mean: number, inStars: boolean) => number {
  const known = new Map<string, number>()
  return (mean, inStars) => {
    const nearest = Math.round(mean * 4000) / 4000
    const key = `${nearest}${inStars ? '*' : ''}`
    const location = known.get(key) ?? locationFor(nearest, inStars ? stars : labels)
    known.set(key, location)
    return location
  }
}
