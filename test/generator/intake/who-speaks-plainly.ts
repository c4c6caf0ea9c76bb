import type { PlainReading } from './plain-reading.ts'

/** Who is speaking, counted row by row from the rows that are modelled: slow, and written without a look at how intake does it. */
export type SpokenRow = PlainReading['modelled'][number]

const average = (values: readonly number[]): number => values.reduce((sum, value) => sum + value, 0) / values.length
const distinct = <T>(values: readonly T[]): readonly T[] => [...new Set(values)]
const handle = (row: SpokenRow): string => `${row.venue}|${row.author}`

/** `month|stance` to authors and those of them with a row in the month after, none of which is looked for after the last month. */
export function stayingPlainly(rows: readonly SpokenRow[], lastMonth: string): ReadonlyMap<string, readonly [authors: number, stayed: number]> {
  const table = new Map<string, readonly [number, number]>()
  const known = rows.filter((row) => row.author !== '')
  for (const month of distinct(known.map((row) => row.month)).filter((name) => name <= lastMonth)) {
    const next = monthAfter(month)
    for (const who of distinct(known.filter((row) => row.month === month).map(handle))) {
      const mine = known.filter((row) => handle(row) === who)
      const mean = average(mine.filter((row) => row.month === month).map((row) => row.score))
      // Sums of tenths are not exact here: a mean within rounding of a third is on it.
      const stance = mean < -1 / 3 - 1e-8 ? 0 : mean > 1 / 3 + 1e-8 ? 2 : 1
      const stayed = month < lastMonth && mine.some((row) => row.month === next) ? 1 : 0
      const [authors, all] = table.get(`${month}|${stance}`) ?? [0, 0]
      table.set(`${month}|${stance}`, [authors + 1, all + stayed])
    }
  }
  return table
}

function monthAfter(month: string): string {
  const [year, number] = month.split('-').map(Number)
  return new Date(Date.UTC(year, number, 1)).toISOString().slice(0, 7)
}

export interface PlainPull {
  readonly replies: number
  readonly authors: number
  readonly slope: number
  readonly standardError: number
  /** Numerator of the slope. */
  readonly xy: number
}

/**
 * A reply's score on the thread before it, in one venue and poster class (null: all of them).
 *
 * @param cellOf - the cell whose mean a score is taken from
 * @param leaveOut - whether the mean taken from an earlier row leaves the reply out, as intake does
 */
export function pullPlainly(rows: readonly SpokenRow[], venue: string, poster: string | null, cellOf: (row: SpokenRow) => string, leaveOut = true): PlainPull | null {
  const cells = new Map<string, SpokenRow[]>()
  for (const row of rows) cells.set(cellOf(row), [...(cells.get(cellOf(row)) ?? []), row])
  const placeOf = (row: SpokenRow): number => (row.place === undefined || Number.isNaN(row.place) ? Infinity : row.place)
  const order = (a: SpokenRow, b: SpokenRow): number => (placeOf(a) === placeOf(b) ? a.hour - b.hour : placeOf(a) - placeOf(b))
  const here = rows.filter((row) => row.venue === venue && row.thread !== '').sort(order)
  const replies = here.flatMap((row, index) => {
    if (row.author === '' || (poster !== null && row.poster !== poster)) return []
    const before = here.slice(0, index).filter((other) => other.thread === row.thread && other.author !== row.author)
    if (before.length === 0) return []
    const x = average(before.map((other) => other.score - average(cells.get(cellOf(other))!.filter((one) => !leaveOut || one !== row).map((one) => one.score))))
    return [{ author: row.author, x, y: row.score - average(cells.get(cellOf(row))!.map((one) => one.score)) }]
  })
  const xx = replies.reduce((sum, { x }) => sum + x * x, 0)
  if (replies.length === 0 || xx === 0) return null
  const xy = replies.reduce((sum, { x, y }) => sum + x * y, 0)
  const slope = xy / xx
  const authors = distinct(replies.map(({ author }) => author))
  const meat = authors.reduce((sum, author) => sum + replies.filter((reply) => reply.author === author).reduce((own, { x, y }) => own + x * (y - slope * x), 0) ** 2, 0)
  return { replies: replies.length, authors: authors.length, slope, standardError: Math.sqrt((authors.length / (authors.length - 1)) * meat) / xx, xy }
}

/** Joint levels, joined by `|` with `?` for one that is not known, to authors, sum and squares of their means. */
export function segmentsPlainly(
  rows: readonly SpokenRow[], traits: readonly ((row: SpokenRow) => string | null)[],
): ReadonlyMap<string, readonly [authors: number, sum: number, squares: number]> {
  const table = new Map<string, readonly [number, number, number]>()
  const voices = distinct(rows.map((row, index) => (row.author === '' ? `nobody ${index}` : handle(row))))
  for (const voice of voices) {
    const mine = rows.filter((row, index) => (row.author === '' ? `nobody ${index}` : handle(row)) === voice)
    const key = traits.map((trait) => {
      const values = mine.map(trait).filter((value) => value !== null).sort()
      const most = Math.max(0, ...values.map((value) => values.filter((other) => other === value).length))
      return values.find((value) => values.filter((other) => other === value).length === most) ?? '?'
    }).join('|')
    const mean = average(mine.map((row) => row.score))
    const [authors, sum, squares] = table.get(key) ?? [0, 0, 0]
    table.set(key, [authors + 1, sum + mean, squares + mean ** 2])
  }
  return table
}
