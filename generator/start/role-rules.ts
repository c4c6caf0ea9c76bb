import type { ColumnProfile } from './column-profile.ts'
import type { Role } from './column-names.ts'
import { readLabels, readRange } from './score-forms.ts'

/** What the values of a column say for one of our columns. */
export interface Evidence {
  /** In [0, 1]; 0 is never said. */
  readonly weight: number
  /** In words, for the account file. */
  readonly reason: string
}

/** What the rules look at beside the column itself. */
export interface Surroundings {
  /** Rows that were read. */
  readonly rows: number
  /** Values of the column that most likely holds ids; null where none does. */
  readonly ids: { readonly column: ColumnProfile; readonly values: ReadonlySet<string> } | null
  /** The account's name in words, such as `skerrow ferries`. */
  readonly account: string
}

type Rule = (column: ColumnProfile, around: Surroundings) => Evidence | null

/** Evidence from values, column by column of ours. A column without any value is judged by its name alone. */
export const roleRules: Readonly<Record<Role, Rule>> = {
  posted_at: ({ time }) => {
    if (time === null) return null
    const said = { iso: 'are ISO 8601', seconds: 'are seconds since 1970', milliseconds: 'are milliseconds since 1970', form: `read as '${time.format}'` }[time.kind]
    return { weight: time.share * (time.kind === 'seconds' || time.kind === 'milliseconds' ? 0.75 : 1), reason: `${percent(time.share)} of its values ${said}` }
  },
  score: (column) => labelledScore(column) ?? rangedScore(column),
  venue: (column, { rows }) => {
    const few = fewValues(column, 60)
    if (few === null) return null
    const places = column.tally.filter(({ value }) => isPlace(value)).reduce((sum, value) => sum + value.rows, 0) / column.filled
    const weight = (places > 0 ? 0.6 + 0.4 * places : column.distinct === 1 ? 0.45 : 0.55) * (column.filled / rows)
    return { weight, reason: places > 0 ? `${few}, kinds of place or sites in ${percent(places)} of rows` : few }
  },
  author: (column, { rows }) => {
    const { distinct, filled, repeated, characters, words, numbers } = column
    if (column.time !== null || distinct < Math.min(5, rows) || characters > 40 || words > 4 || repeated === 0 || filled < 0.3 * rows || isScore(column)) return null
    // a handful of numbers is a scale or a count
    if (numbers !== null && numbers.high < 1000) return null
    const many = distinct >= 0.02 * filled ? 1 : 0.5
    return { weight: (0.65 + 0.25 * Math.min(1, 2 * repeated)) * many, reason: `${count(distinct)} different values, ${percent(repeated)} of rows with one that comes back` }
  },
  topic: (column) => {
    const few = fewValues(column, 400)
    return few === null ? null : { weight: column.distinct === 1 ? 0.2 : 0.5, reason: few }
  },
  id: ({ distinct, filled, characters, words, time }, { rows }) => {
    if (filled < 0.9 * rows || distinct < 0.9 * filled || characters > 200 || words > 2) return null
    return { weight: (distinct === filled ? 1 : 0.8) * (time === null ? 1 : 0.3) * (filled === rows ? 1 : 0.9), reason: distinct === filled ? 'no value twice' : `${percent(distinct / filled)} of its values are there once` }
  },
  thread: (column, { rows }) => {
    const { distinct, filled, repeated, characters, words, time } = column
    if (time !== null || distinct < 2 || repeated < 0.2 || characters > 200 || words > 3 || filled < 0.02 * rows || isScore(column)) return null
    return { weight: 0.6, reason: `${count(distinct)} different values, ${percent(repeated)} of rows with one that comes back` }
  },
  reply_to: (column, { ids }) => {
    if (ids === null || ids.column === column || column.filled === 0) return null
    const filled = column.values.flatMap((value, row) => (value.trim() === '' ? [] : [{ value: value.trim(), own: ids.column.values[row]!.trim() }]))
    const known = filled.filter(({ value }) => ids.values.has(value)).length / filled.length
    // the first post of a thread may give the thread its name
    if (known < 0.2 || filled.some(({ value, own }) => value === own)) return null
    return { weight: 0.7 + 0.3 * known, reason: `${percent(known)} of its values are an id in \`${ids.column.name}\`` }
  },
  brand: (column, { account }) => {
    const few = fewValues(column, 50)
    if (few === null) return null
    const [most] = column.tally
    const share = most!.rows / column.filled
    const named = column.tally.some(({ value }) => value.toLowerCase() === account)
    if (!named && share < 0.3) return null
    return { weight: named ? 1 : 0.65, reason: `${few}, one of them in ${percent(share)} of rows` }
  },
  segment: (column) => {
    const few = fewValues(column, 30)
    return few === null || column.distinct === 1 ? null : { weight: 0.5, reason: few }
  },
  text: ({ characters, words, distinct, filled }) => (words < 4 || characters < 25 || distinct < 0.5 * filled ? null
    : { weight: Math.min(1, 0.6 + words / 25), reason: `texts of ${count(Math.round(words))} words on average` }),
}

function labelledScore(column: ColumnProfile): Evidence | null {
  const labels = readLabels(column.tally)
  if (labels === null) return null
  const rows = labels.labels.reduce((sum, label) => sum + label.rows, 0)
  if (rows < 0.4 * column.filled) return null
  const share = rows / column.filled
  return { weight: column.numbers === null ? share : 0.8 * share, reason: `${percent(share)} of its values are ${labels.labels.map(({ label }) => label).join(', ')}` }
}

function rangedScore(column: ColumnProfile): Evidence | null {
  if (column.numbers === null || column.time !== null || column.distinct === column.filled && column.numbers.whole) return null
  const range = readRange(column.numbers)
  return range === null ? null : { weight: range.weight, reason: `numbers from ${column.numbers.low} to ${column.numbers.high}` }
}

function isScore(column: ColumnProfile): boolean {
  return labelledScore(column) !== null
}

/** Said where a column has a few values that repeat, as names of kinds do; null otherwise. */
function fewValues(column: ColumnProfile, most: number): string | null {
  const { distinct, filled, characters, words, numbers, time } = column
  if (filled === 0 || distinct > most || distinct > Math.max(3, filled / 3) || characters > 40 || words > 5 || numbers !== null || time !== null || isScore(column)) return null
  // codes of languages and countries are few too
  if (column.tally.every(({ value }) => /^[A-Za-z]{2}([-_][A-Za-z]{2,4})?$/.test(value))) return null
  return distinct === 1 ? 'one value in all rows' : `${count(distinct)} different values`
}

const placeWords = /\b(forum|forums|foren|foro|board|boards|blog|blogs|weblog|microblog|microblogs|short post|review|reviews|video|videos|news|podcast|chat|comment|comments|bewertung(en)?|kommentare?|nachrichten|avis|presse|resenas?|noticias|opiniones|avaliac(ao|oes)|recensioni|social)\b/

/** Whether a value is a kind of place, or a site's address. */
function isPlace(value: string): boolean {
  const plain = value.normalize('NFKD').replace(/\p{M}/gu, '').toLowerCase()
  return placeWords.test(plain) || /^(https?:\/\/)?([a-z0-9-]+\.)+[a-z]{2,}\/?$/.test(plain)
}

/** @example percent(0.984) // => '98 %' */
export function percent(share: number): string {
  // what is not all is not said to be all, nor what is something nothing
  if (share > 0 && share < 0.005) return 'under 1 %'
  return `${share < 1 ? Math.min(99, Math.round(100 * share)) : 100} %`
}

/** @example count(12345) // => '12,345' */
export function count(number: number): string {
  return number.toLocaleString('en-GB')
}

/** @example counted(1, 'row') // => '1 row' */
export function counted(number: number, noun: string): string {
  return `${count(number)} ${noun}${number === 1 ? '' : 's'}`
}
