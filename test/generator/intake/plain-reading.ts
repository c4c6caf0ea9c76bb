/**
 * Sections 1.1 and 1.2 of the model read literally, row by row: slow, and written without a look at how intake does it.
 * Times are whole hours since 1970; NaN where the row has no readable one.
 */
export interface PlainRow {
  readonly id: string
  readonly hour: number
  readonly venue: string
  readonly author: string
  readonly score: number
  readonly topic: string
  readonly brand: string
  readonly text: string
  /** Read by who-speaks-plainly.ts alone; NaN for no place. */
  readonly tone?: string
  readonly segment?: string
  readonly thread?: string
  readonly place?: number
}

export interface PlainCell {
  mentions: number
  authors: number
  mean: number
  squares: number
  clustering: number
}

export interface PlainReading {
  readonly received: number
  readonly rejected: number
  readonly outOfScope: number
  readonly sameId: number
  readonly repost: number
  readonly modelled: readonly (PlainRow & { readonly poster: string; readonly step: number; readonly month: string })[]
  readonly cells: ReadonlyMap<string, PlainCell>
}

const hours = { day: 24, week: 7 * 24, ninety: 90 * 24 }
const month = (hour: number): string => new Date(hour * 3_600_000).toISOString().slice(0, 7)
const monday = (hour: number): number => Math.floor((Math.floor(hour / 24) + 3) / 7) * 7 - 3

export function readPlainly(rows: readonly PlainRow[], lastMonth: string): PlainReading {
  const readable = rows.filter((row) => !Number.isNaN(row.hour) && !Number.isNaN(row.score) && row.venue !== '')
  const inScope = readable.filter((row) => row.brand === 'Skerrow Ferries' && month(row.hour) <= lastMonth)
  const single = inScope.filter((row, index) => row.id === '' || inScope.findIndex((other) => other.id === row.id) === index)
  const unique = withoutReposts(single)
  const first = Math.min(...unique.map((row) => row.hour))
  const modelled = unique.map((row) => {
    const mine = unique.filter((other) => other.author === row.author && other.venue === row.venue)
    const window = row.hour < first + hours.ninety
      ? mine.filter((other) => other.hour < first + hours.ninety)
      : mine.filter((other) => other.hour > row.hour - hours.ninety && (other.hour < row.hour || (other.hour === row.hour && unique.indexOf(other) <= unique.indexOf(row))))
    const poster = row.author === '' ? 'unknown' : window.length <= 1 ? 'occasional' : window.length <= 5 ? 'regular' : 'prolific'
    return { ...row, poster, step: monday(row.hour), month: month((monday(row.hour) + 3) * 24) }
  })
  return {
    received: rows.length, rejected: rows.length - readable.length, outOfScope: readable.length - inScope.length,
    sameId: inScope.length - single.length, repost: single.length - unique.length, modelled, cells: cellsOf(modelled),
  }
}

function withoutReposts(rows: readonly PlainRow[]): readonly PlainRow[] {
  const plain = (text: string): string => text.toLowerCase().replace(/https?:\/\/\S+|@\w+|\s/g, '')
  const dropped = new Set<PlainRow>()
  const counting = new Map<string, number>()
  for (const row of [...rows].sort((a, b) => a.hour - b.hour)) {
    const text = plain(row.text)
    if (text.length < 40) continue
    const since = counting.get(text)
    if (since !== undefined && row.hour <= since + hours.week) dropped.add(row)
    else counting.set(text, row.hour)
  }
  return rows.filter((row) => !dropped.has(row))
}

function cellsOf(rows: PlainReading['modelled']): ReadonlyMap<string, PlainCell> {
  const groups = new Map<string, PlainReading['modelled'][number][]>()
  for (const row of rows) {
    const key = [row.step, row.venue, row.topic || 'none', row.poster].join('|')
    groups.set(key, [...(groups.get(key) ?? []), row])
  }
  return new Map([...groups].map(([key, group]) => {
    const mean = group.reduce((sum, row) => sum + row.score, 0) / group.length
    const voices = new Map<string, number>()
    for (const [index, row] of group.entries()) {
      const voice = row.author === '' ? `nobody ${index}` : row.author
      voices.set(voice, (voices.get(voice) ?? 0) + 1)
    }
    return [key, {
      mentions: group.length, authors: voices.size, mean, squares: group.reduce((sum, row) => sum + (row.score - mean) ** 2, 0),
      clustering: [...voices.values()].reduce((sum, posts) => sum + posts * posts, 0) / group.length,
    }]
  }))
}

/** One-way analysis of variance by author in a venue, of scores less their step's mean, known authors only. */
export function variationOf(rows: PlainReading['modelled'], venue: string): { readonly authors: number; readonly mentions: number; readonly between: number; readonly within: number } {
  const known = rows.filter((row) => row.venue === venue && row.author !== '')
  const average = (values: readonly number[]): number => values.reduce((sum, value) => sum + value, 0) / values.length
  const left = known.map((row) => ({ author: row.author, value: row.score - average(known.filter((other) => other.step === row.step).map((other) => other.score)) }))
  const grand = average(left.map((row) => row.value))
  const authors = [...new Set(left.map((row) => row.author))].map((author) => left.filter((row) => row.author === author).map((row) => row.value))
  return {
    authors: authors.length, mentions: known.length,
    between: authors.reduce((sum, values) => sum + values.length * (average(values) - grand) ** 2, 0),
    within: authors.reduce((sum, values) => sum + values.reduce((inner, value) => inner + (value - average(values)) ** 2, 0), 0),
  }
}
