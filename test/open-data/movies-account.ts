import { readFileSync } from 'node:fs'
import { mkdir, writeFile } from 'node:fs/promises'
import { join } from 'node:path'
import { z } from 'zod'

/**
 * `movies.json` of vega-datasets (BSD-3) as an account: critics and audience are two venues, a film's main genre is
 * its topic, its release is the time. A rating is one mention without an author.
 */

/** Ends of the two rating scales, which become -1 and 1: percent of critics in favour; audience marks, of which 1 is the lowest. */
export const scales = { critics: [0, 100], audience: [1, 10] } as const
export type Rater = keyof typeof scales

/** The package exports no path to its data files. */
const dataFile = join(import.meta.dirname, '../../node_modules/vega-datasets/data/movies.json')
const years = { from: 1998, to: 2009 }

const film = z.object({
  'Release Date': z.string(),
  'Major Genre': z.string().nullable(),
  'Rotten Tomatoes Rating': z.number().nullable(),
  'IMDB Rating': z.number().nullable(),
})

export interface Film {
  /** Place in the data set: titles repeat. */
  readonly number: number
  /** As in the data: `Jun 12 1998`. */
  readonly released: string
  readonly year: number
  readonly genre: string
  readonly critics: number | null
  readonly audience: number | null
}

/** Films released 1998 to 2009, so without the two-digit years read as the future (2046); shape (films), in the data's order. */
export function readFilms(): readonly Film[] {
  const rows = z.array(film).parse(JSON.parse(readFileSync(dataFile, 'utf8')))
  return rows
    .map((row, number): Film => ({
      number, released: row['Release Date'], year: Number(row['Release Date'].slice(-4)), genre: row['Major Genre'] ?? '',
      critics: row['Rotten Tomatoes Rating'], audience: row['IMDB Rating'],
    }))
    .filter(({ year }) => year >= years.from && year <= years.to)
}

export interface PairedDifference {
  /** Critics less audience, scores on [-1, 1], over films rated by both. */
  readonly mean: number
  readonly standardError: number
  readonly films: number
  readonly byYear: readonly { readonly year: number; readonly mean: number; readonly films: number }[]
}

/** The plainest reading, free of any model: the same films, judged by both. */
export function pairedDifference(): PairedDifference {
  const pairs = readFilms().flatMap(({ year, critics, audience }) =>
    critics === null || audience === null ? [] : [{ year, difference: scoreOf(critics, 'critics') - scoreOf(audience, 'audience') }])
  const differences = pairs.map(({ difference }) => difference)
  const centre = mean(differences)
  const variance = differences.reduce((sum, difference) => sum + (difference - centre) ** 2, 0) / (pairs.length - 1)
  const byYear = Array.from({ length: years.to - years.from + 1 }, (_, i) => {
    const own = pairs.filter(({ year }) => year === years.from + i).map(({ difference }) => difference)
    return { year: years.from + i, mean: mean(own), films: own.length }
  })
  return { mean: centre, standardError: Math.sqrt(variance / pairs.length), films: pairs.length, byYear }
}

/** Writes account.yaml and one CSV per rater into a folder; all ratings, or those of films rated by both. */
export async function writeMoviesAccount(folder: string, { pairedOnly = false }: { readonly pairedOnly?: boolean } = {}): Promise<void> {
  const films = readFilms().filter(({ critics, audience }) => !pairedOnly || (critics !== null && audience !== null))
  await mkdir(join(folder, 'ratings'), { recursive: true })
  for (const rater of ['critics', 'audience'] as const) await writeFile(join(folder, 'ratings', `${rater}.csv`), ratings(films, rater))
  await writeFile(join(folder, 'account.yaml'), accountFile([...new Set(films.map(({ genre }) => genre))].filter((genre) => genre !== '').sort()))
}

function ratings(films: readonly Film[], rater: Rater): string {
  const rows = films.filter((each) => each[rater] !== null).map((each) => [each.number, each.released, rater, each[rater], each.genre].join(','))
  return ['film,released,rater,rating,genre', ...rows].join('\n') + '\n'
}

function accountFile(genres: readonly string[]): string {
  const source = (rater: Rater): string => `  - files: ratings/${rater}.csv
    columns: { id: film, posted_at: released, venue: rater, score: rating, topic: genre }
    time_format: '%b %d %Y'
    score: { range: [${scales[rater].join(', ')}] }
`
  return `account: movies
brand: Films
locale: en-GB
time_zone: UTC
grid: month
reporting: quarter
mentions:
${source('critics')}${source('audience')}venues:
  audience: { label: Audience, values: [audience] }
  critics: { label: Critics, values: [critics] }
topics:
${genres.map((genre) => `  ${genre.toLowerCase().replace(/[^a-z]+/g, '-')}: { label: ${genre}, values: [${genre}] }\n`).join('')}`
}

function scoreOf(rating: number, rater: Rater): number {
  const [low, high] = scales[rater]
  return (2 * (rating - low)) / (high - low) - 1
}

function mean(values: readonly number[]): number {
  return values.reduce((sum, value) => sum + value, 0) / values.length
}
