import { createGenerator } from '../../../model/random/generator.ts'
import type { IntakeTables } from '../../../model/intake/intake-tables.ts'
import { readAccount } from '../../../generator/account/read-account.ts'
import { readIntake, type IntakeOptions } from '../../../generator/intake/read-intake.ts'
import type { PlainRow } from './plain-reading.ts'
import { quotedCsv, withAccount } from './temporary-account.ts'

/** Two labels of one score, and one that no binary fraction is equal to. */
const labels: Readonly<Record<string, number>> = { 'negative': -1, 'rather bad': -0.3, 'neutral': 0, 'mixed': 0, 'positive': 1 }
export const labelNames = ['negative', 'rather bad', 'mixed', 'neutral', 'positive']

export const spokenAccount = (more = ''): string => `account: demo
brand: Skerrow Ferries
time_zone: UTC
mentions:
  - files: posts.csv
    columns: { id: ref, posted_at: published, venue: source, author: handle, score: tone, topic: theme, brand: about, text: body, segment: kind, thread: talk${more.includes('places') ? ', thread_position: place' : ''} }
    score: { labels: { neutral: 0, positive: 1, negative: -1, rather bad: -0.3, mixed: 0 } }
venues: { boards: { label: Discussion boards, values: [forum, board] } }
${more.replace('places', '')}`

export const spokenHeader = ['ref', 'published', 'source', 'handle', 'tone', 'theme', 'about', 'body', 'kind', 'talk', 'place']

const start = Date.UTC(2025, 0, 1) / 3_600_000

/** A row as it stands in the file, and what it means. */
interface Spoken { readonly fields: readonly string[]; readonly row: PlainRow }

/** Posts of few authors in few threads over some months; a third of the fields of each trait say nothing or are spelled oddly. */
export function spokenRows(seed: number, count: number): readonly Spoken[] {
  const random = createGenerator(seed, 0)
  const any = <T>(...of: readonly T[]): T => of[random.integer(of.length)]
  return Array.from({ length: count }, (_, index) => {
    const hour = start + random.integer(24 * 150)
    const [source, venue] = any(['Forum', 'boards'], [' board', 'boards'], ['blog', 'blog'])
    const author = any('', ...Array.from({ length: 16 }, (__, who) => `handle-${who}`))
    const tone = any(...Object.keys(labels))
    const told = any(tone, tone.toUpperCase(), ` ${tone.replace(' ', '  ')}`)
    const topic = any('fares', 'crew', '')
    const [kind, segment] = any(['Islander', 'Islander'], ['islander ', 'Islander'], ['VISITOR', 'visitor'], ['crew', 'crew'], ['', ''], [' ', ''])
    const thread = any('', ...Array.from({ length: 9 }, (__, talk) => `talk-${talk}`))
    const place = any(Number.NaN, Number.NaN, random.integer(8))
    return {
      fields: [`p${index}`, new Date(hour * 3_600_000).toISOString(), source, author, told, topic, 'Skerrow Ferries', '', kind, thread, Number.isNaN(place) ? any('', 'first') : String(place)],
      row: { id: `p${index}`, hour, venue, author, score: labels[tone], topic, brand: 'Skerrow Ferries', text: '', tone, segment, thread, place },
    }
  })
}

export async function spokenTables(rows: readonly Spoken[], account: string, options: IntakeOptions): Promise<IntakeTables> {
  return withAccount({ 'account.yaml': account, 'posts.csv': quotedCsv(spokenHeader, rows.map(({ fields }) => fields)) }, async (folder) => readIntake(await readAccount(folder), options))
}
