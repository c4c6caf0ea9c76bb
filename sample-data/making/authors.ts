import { normalQuantile } from './graded-score.ts'
import type { Draws } from './seeded-draws.ts'
import { perKey, venues } from './story.ts'
import type { AuthorType, Venue, Week } from './story.ts'

export interface Author {
  readonly handle: string
  /** How far the author stands from the average, in standard deviations of authors. */
  readonly leaning: number
  readonly segment: string
  /** Posts in 90 days, on average. */
  readonly activity: number
}

export interface Crowd {
  /** Lets authors leave and join so that each venue's stock fits the week's posts. */
  readonly beginWeek: (week: Week, index: number) => void
  readonly pick: (venue: Venue, type: AuthorType) => Author
}

/** In a surge of posts it is the authors already there who post more: their number grows by 1 % a week at most. */
const fastestGrowth = 1.01

type Lasting = Exclude<AuthorType, 'casual'>
const meanActivity: Record<Lasting, number> = { regular: 2.8, prolific: 15 }
const segments = ['islander', 'commuter', 'holiday', 'student', 'freight', ''] as const
const segmentWeights = [30, 22, 27, 3, 5, 13]

/** All authors of the demo, venue by venue: casual ones post once, the others stay for months. */
export function gatherCrowd(draws: Draws): Crowd {
  const leanings = perKey(venues, () => ({ casual: spreadEvenly(draws), regular: spreadEvenly(draws), prolific: spreadEvenly(draws) }))
  const stocks = perKey(venues, () => ({ regular: emptyStock(), prolific: emptyStock() }))
  let born = 0

  const join = (venue: Venue, type: AuthorType): Author => ({
    handle: handleOf(born++),
    leaning: leanings[venue][type](),
    segment: segments[draws.weighted(segmentWeights)],
    activity: type === 'casual' ? 1 : activityOf(type, draws),
  })

  const renew = (venue: Venue, type: Lasting, week: Week, index: number): void => {
    const needed = Math.max(2, Math.round((week.posts * week.venueShare[venue] * week.typeShare[type] * 13) / meanActivity[type]))
    const before = stocks[venue][type].authors
    const wanted = before.length === 0 ? needed : Math.min(needed, Math.ceil(before.length * fastestGrowth))
    const staying = before.filter((author) => !draws.chance(leavingRate(author, index)))
    while (staying.length < wanted) staying.push(join(venue, type))
    stocks[venue][type] = stockOf(staying)
  }

  return {
    beginWeek: (week, index) => {
      for (const venue of venues) for (const type of ['regular', 'prolific'] as const) renew(venue, type, week, index)
    },
    pick: (venue, type) => (type === 'casual' ? join(venue, type) : drawFrom(stocks[venue][type], draws)),
  }
}

/** Share that leaves in a week: the moderate third leaves more and more, those with a strong view stay. */
function leavingRate(author: Author, index: number): number {
  const moderate = Math.abs(author.leaning) < 0.43
  return moderate ? 0.008 + 0.022 * Math.min(1, Math.max(0, (index - 40) / 80)) : 0.008
}

/** Prolific authors have a Pareto tail (exponent 1.7), cut at 60 posts in 90 days. */
function activityOf(type: Lasting, draws: Draws): number {
  if (type === 'regular') return meanActivity.regular * (0.6 + 0.8 * draws.uniform())
  return Math.min(60, 8 * draws.uniform() ** (-1 / 1.7))
}

/**
 * Normal quantiles of an additive recurrence (the golden ratio's): as random to look at, yet any run of newcomers
 * averages near 0, so that the coming and going of a few loud authors is not mistaken for opinion.
 */
function spreadEvenly(draws: Draws): () => number {
  let point = draws.uniform()
  return () => {
    point = (point + 0.6180339887498949) % 1
    return normalQuantile(Math.min(0.999, Math.max(0.001, point)))
  }
}

interface Stock {
  readonly authors: Author[]
  /** Running sum of activities. */
  readonly upTo: readonly number[]
}

function emptyStock(): Stock {
  return { authors: [], upTo: [] }
}

function stockOf(authors: Author[]): Stock {
  let total = 0
  return { authors, upTo: authors.map((author) => (total += author.activity)) }
}

function drawFrom(stock: Stock, draws: Draws): Author {
  const at = draws.uniform() * stock.upTo[stock.upTo.length - 1]
  let low = 0
  let high = stock.upTo.length - 1
  while (low < high) {
    const middle = (low + high) >> 1
    if (stock.upTo[middle] < at) low = middle + 1
    else high = middle
  }
  return stock.authors[low]
}

const heads = ['ael', 'bro', 'cui', 'dwe', 'eph', 'fyl', 'gro', 'huv', 'iri', 'jol', 'kez', 'lum', 'myr', 'nol', 'oza', 'pli', 'quo', 'rud', 'syl', 'tov', 'umb', 'vex', 'wib', 'yon', 'zur']
const tails = ['bac', 'dro', 'fen', 'gip', 'hob', 'jun', 'kli', 'lop', 'mub', 'nix', 'pog', 'rez', 'sni', 'tup', 'vol', 'wug', 'zam']

/** An invented handle, different for every number. */
function handleOf(number: number): string {
  const mixed = (number * 7919) % 1_000_003
  return `${heads[mixed % heads.length]}${tails[Math.floor(mixed / heads.length) % tails.length]}${Math.floor(mixed / (heads.length * tails.length))}`
}
