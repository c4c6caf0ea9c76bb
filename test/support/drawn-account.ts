import { mkdir, writeFile } from 'node:fs/promises'
import { join } from 'node:path'
import { createGenerator } from '../../model/random/generator.ts'

/** How much an account that is made up at random holds. */
export interface DrawnAccount {
  readonly seed: number
  readonly posts: number
  /** Of posts; they end on 31 August 2025. */
  readonly weeks: number
  /** 2 to 5. */
  readonly venues: number
  readonly locale?: string
  /** Lines added to account.yaml. */
  readonly more?: string
}

const venueNames = ['boards', 'blogs', 'microblogs', 'reviews', 'video'] as const
const topics = ['fares', 'crew', 'timetable', 'booking', 'food', 'weather'] as const
const day = 86_400_000
const end = Date.UTC(2025, 8, 1)

/**
 * Write an account whose posts are drawn: opinion is a random walk over weeks, each venue has a level and a share of its own, and few authors post often.
 * The same seed writes the same bytes.
 */
export async function writeDrawnAccount(folder: string, drawn: DrawnAccount): Promise<void> {
  await mkdir(join(folder, 'posts'), { recursive: true })
  await writeFile(join(folder, 'account.yaml'), accountText(drawn))
  await writeFile(join(folder, 'posts', 'posts.csv'), postsText(drawn))
}

function accountText({ seed, locale = 'en-GB', more = '' }: DrawnAccount): string {
  return `account: drawn-${seed}
brand: Brand ${seed}
locale: ${locale}
prepared_by: Ana Reis
reviewed_by: Bo Lund
mentions:
  - files: posts/*.csv
    columns: { id: ref, posted_at: at, venue: place, author: who, score: tone, topic: theme }
    score: { labels: { negative: -1, neutral: 0, positive: 1 } }
${more}`
}

function postsText({ seed, posts, weeks, venues }: DrawnAccount): string {
  const random = createGenerator(seed, 0)
  const levels = Array.from({ length: venues }, () => 0.2 * random.normal())
  let opinion = 0.1
  const path = Array.from({ length: weeks }, () => (opinion += 0.02 * random.normal()))
  const rows = Array.from({ length: posts }, (_, i) => {
    const at = end - Math.ceil(random.uniform() * weeks * 7 * day / 1000) * 1000
    const venue = Math.floor(venues * random.uniform() ** 1.5)
    const week = Math.min(weeks - 1, Math.floor((at - (end - weeks * 7 * day)) / (7 * day)))
    const praise = 0.4 + (path[week] + levels[venue]) / 2
    const draw = random.uniform()
    const tone = draw < praise ? 'positive' : draw < praise + 0.2 ? 'neutral' : 'negative'
    return `p${i},${new Date(at).toISOString()},${venueNames[venue]},h${Math.floor(random.uniform() ** 3 * posts * 0.4)},${tone},${topics[random.integer(topics.length)]}`
  })
  return `ref,at,place,who,tone,theme\n${rows.join('\n')}\n`
}
