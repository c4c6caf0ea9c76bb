import type { Findings } from '../../model/findings/schema.ts'

/**
 * The one order in which levels stand, in every table and chart: venues and further factors from the largest share to the smallest, poster
 * classes from those who post least to those who post most.
 */
export interface LevelOrder {
  /** Place of a level among those of its factor, from 0; a level that is not known stands last. */
  readonly placeOf: (factor: string, level: string) => number
}

const posterClasses: readonly string[] = ['occasional', 'regular', 'prolific', 'unknown']

/** The order of the levels of these findings. */
export function levelOrder({ venues, topics, posters, factors, accounting }: Pick<Findings, 'venues' | 'topics' | 'posters' | 'factors' | 'accounting'>): LevelOrder {
  const orders = new Map<string, readonly string[]>([
    ['venue', bySize(venues.map((of) => ({ level: of.venue, size: of.share })))],
    ['topic', namedFirst(bySize(topics.map((of) => ({ level: of.topic, size: of.offset.mean }))), accounting.unmapped)],
    ['poster', [...posterClasses, ...posters.map((of) => of.poster).filter((name) => !posterClasses.includes(name))]],
    ...factors.map(({ factor, levels }) => [factor, bySize(levels.map((of) => ({ level: of.level, size: of.share })))] as const),
  ])
  return {
    placeOf: (factor, level) => {
      const order = orders.get(factor) ?? []
      const place = order.indexOf(level)
      return place < 0 ? order.length : place
    },
  }
}

/** A list of levels put in order; those of one place keep theirs. */
export function inOrder<T>(list: readonly T[], factor: string, order: LevelOrder, nameOf: (item: T) => string): readonly T[] {
  return [...list].sort((a, b) => order.placeOf(factor, nameOf(a)) - order.placeOf(factor, nameOf(b)))
}

function bySize(levels: readonly { readonly level: string, readonly size: number }[]): readonly string[] {
  return [...levels].sort((a, b) => b.size - a.size).map(({ level }) => level)
}

/** Topics, kindest first; those that the account gives no name, and mentions without a topic, after them: they are leftovers. */
function namedFirst(topics: readonly string[], unmapped: Findings['accounting']['unmapped']): readonly string[] {
  const leftover = (topic: string) => topic === 'none' || unmapped.some(({ factor, value }) => factor === 'topic' && value === topic)
  return [...topics.filter((topic) => !leftover(topic)), ...topics.filter(leftover)]
}
