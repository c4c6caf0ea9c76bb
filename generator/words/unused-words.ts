import { closest, distance } from 'fastest-levenshtein'
import { faultOf } from '../faults/catalogue.ts'
import type { Fault } from '../faults/fault.ts'
import type { Words } from './words.ts'

/** Where a message of an account's own may be called. */
export interface OwnSources {
  /** Texts of its template, and of what belongs to it. */
  readonly texts: readonly string[]
  /** Names of the charts that can be drawn. */
  readonly charts: readonly string[]
  readonly factors: readonly string[]
}

/** So few letters apart, a name is the other one misspelt. */
const misspelt = 2

/**
 * Own messages that replace none of the house's and that nothing calls: most likely misspelt.
 *
 * The names of charts (`chart-NAME-title`), of the account's own factors (`factor-NAME`, `part-NAME_mix`) and of levels (`level-NAME`) are called by the program.
 */
export function unusedWords(words: Words, sources: OwnSources): readonly Fault[] {
  const { own } = words
  if (own === undefined) return []
  const house = words.keys.filter((key) => !own.added.includes(key))
  return own.added.filter((key) => !isCalled(key, house, sources)).map((key) => (
    faultOf('words-key-unknown', own.places[key] ?? own.place, { key, nearest: closest(key, house) })
  ))
}

function isCalled(key: string, house: readonly string[], { texts, charts, factors }: OwnSources): boolean {
  const named = [
    ...charts.flatMap((name) => ['title', 'alt', 'note'].map((part) => `chart-${name}-${part}`)),
    ...factors.flatMap((name) => [`factor-${name}`, `part-${name}_mix`]),
  ]
  if (named.includes(key)) return true
  if (key.startsWith('level-')) return distance(key, closest(key, [...house])) > misspelt
  // a table's head is called by its column
  const name = key.replace(/^column-/, '').replaceAll('-', '\\-')
  return texts.some((text) => new RegExp(`(?<![\\w-])${name}(?![\\w-])`, 'i').test(text))
}
