import { grade, labels, locationFor, scoreOf, stars, type Grading } from '../making/graded-score.ts'
import type { Draws } from '../making/seeded-draws.ts'
import { posterOffset, posters, posterShare, topicOffset, topics, topicShare, venueOffset, venues, type Poster, type Topic, type Venue, type Week } from './story.ts'

/** Dealers' customers give stars, forums are coded with three labels. */
const gradings: Readonly<Record<Venue, Grading>> = { forum: labels, fachhandel: stars }
/** How likely a further post of a cell is by somebody who is in it already. */
const samePerson: Readonly<Record<Poster, number>> = { occasional: 0, regular: 0.12, prolific: 0.4 }
/** Share of the latent variance that lies between authors. */
const betweenAuthors = 0.2
/** Intraclass correlation that the design effects are stated with. */
const intraclass = 0.15

interface Author {
  readonly stance: number
  posts: number
}

/** The lines of cells/wochen.csv: a table as a warehouse makes it, of cells in which somebody posted. */
export function cellLines(story: readonly Week[], draws: Draws): readonly string[] {
  const rows = story.flatMap((week) => venues.flatMap((venue) => venueLines(week, venue, draws)))
  return ['step,venue,topic,poster,mentions,authors,mean,variance,deff', ...rows]
}

function venueLines(week: Week, venue: Venue, draws: Draws): readonly string[] {
  const counts = new Map<string, number>()
  for (let left = draws.poisson(week.posts[venue]); left > 0; left--) {
    const key = `${drawnFrom(topics, topicShare, draws)} ${drawnFrom(posters, posterShare, draws)}`
    counts.set(key, (counts.get(key) ?? 0) + 1)
  }
  return topics.flatMap((topic) => posters.flatMap((poster) => {
    const mentions = counts.get(`${topic} ${poster}`)
    return mentions === undefined ? [] : [[week.monday, venue, topic, poster, mentions, ...cell(week, venue, topic, poster, mentions, draws)].join(',')]
  }))
}

/** Authors, mean, variance (nothing of a single post) and design effect of a cell. */
function cell(week: Week, venue: Venue, topic: Topic, poster: Poster, mentions: number, draws: Draws): readonly (number | string)[] {
  const grading = gradings[venue]
  const location = locationFor(week.opinion + venueOffset[venue] + topicOffset[topic] + posterOffset[poster], grading)
  const authors: Author[] = []
  const scores = Array.from({ length: mentions }, () => {
    const author = authors.length > 0 && draws.chance(samePerson[poster]) ? draws.pick(authors) : newAuthor(authors, draws)
    author.posts += 1
    return scoreOf(grade(location + Math.sqrt(betweenAuthors) * author.stance + Math.sqrt(1 - betweenAuthors) * draws.normal(), grading), grading)
  })
  const mean = sum(scores) / mentions
  const variance = mentions === 1 ? '' : (sum(scores.map((score) => (score - mean) ** 2)) / (mentions - 1)).toFixed(4)
  return [authors.length, mean.toFixed(4), variance, designEffect(authors, mentions).toFixed(3)]
}

function newAuthor(authors: Author[], draws: Draws): Author {
  const author = { stance: draws.normal(), posts: 0 }
  authors.push(author)
  return author
}

/** Of clusters of unequal size: 1 + rho (sum of squares of sizes / sum of sizes - 1); Kish (1965), Survey Sampling, chapter 5 (from memory). */
function designEffect(authors: readonly Author[], mentions: number): number {
  return 1 + intraclass * (sum(authors.map(({ posts }) => posts * posts)) / mentions - 1)
}

function drawnFrom<K extends string>(keys: readonly K[], shares: Readonly<Record<K, number>>, draws: Draws): K {
  return keys[draws.weighted(keys.map((key) => shares[key]))]
}

function sum(values: readonly number[]): number {
  return values.reduce((total, value) => total + value, 0)
}
