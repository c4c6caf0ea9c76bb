import type { Factor, Level } from '../../model/intake/intake-tables.ts'
import type { Account, LevelEntry } from '../account/account.ts'

/** The account's name of a value of a factor, counted under its own name where the account has none for it. */
export type LevelReader = (factor: string, value: string, mentions: number) => string

export interface LevelNames {
  readonly levelOf: LevelReader
  readonly unmapped: () => readonly { readonly factor: string; readonly value: string; readonly mentions: number }[]
}

/** A value as a name: control characters, which nobody sees, count as spacing, and there is none around it. */
export const tidyValue = (value: string): string => value.replace(/\p{Cc}+/gu, ' ').replace(/^ +| +$/g, '')

/** Upper and lower case and spacing do not tell values apart. */
export const foldValue = (value: string): string => value.trim().toLowerCase().replace(/\s+/g, ' ')

/**
 * A factor with more levels than this is refused: the column was mistaken, and the fit's time grows with the square of its
 * venues. Spellings, of which a level may have several, are counted before they are named.
 */
export const mostLevels = (factor: string): number => (factor === 'venue' ? 60 : 400)
export const mostSpellings = 2000

/** Read values by the account's `venues` and `topics`; the values of other factors are their own names. */
export function levelNames(account: Account): LevelNames {
  const names: Readonly<Record<string, ReadonlyMap<string, string>>> = { venue: valueMap(account.venues), topic: valueMap(account.topics) }
  const unmapped = new Map<string, { readonly factor: string; readonly value: string; mentions: number }>()
  return {
    levelOf: (factor, value, mentions) => {
      const map = names[factor]
      const name = map?.get(foldValue(value))
      if (name !== undefined) return name
      if (map !== undefined && map.size > 0 && value !== 'none') {
        const key = JSON.stringify([factor, value])
        const entry = unmapped.get(key) ?? { factor, value, mentions: 0 }
        entry.mentions += mentions
        unmapped.set(key, entry)
      }
      return value
    },
    unmapped: () => [...unmapped.values()].sort((a, b) => byText(a.factor, b.factor) || b.mentions - a.mentions || byText(a.value, b.value)),
  }
}

/** The levels that mentions are in, sorted by name, with what the account says of them. */
export function factorOf(account: Account, name: string, present: Iterable<string>): Factor {
  const entries = name === 'venue' ? account.venues : name === 'topic' ? account.topics : []
  const levels = [...new Set(present)].sort(byText).map((level): Level => {
    const entry = entries.find((candidate) => candidate.name === level)
    return {
      name: level, label: entry?.label ?? level,
      ...(entry?.anchor === true ? { anchor: true } : {}),
      ...(typeof entry?.costPerAuthor === 'number' ? { costPerAuthor: entry.costPerAuthor } : {}),
    }
  })
  return { name, levels }
}

/** By code unit: the same order on every machine. */
export function byText(a: string, b: string): number {
  return a < b ? -1 : a > b ? 1 : 0
}

function valueMap(entries: readonly LevelEntry[]): ReadonlyMap<string, string> {
  return new Map(entries.flatMap((entry) => [entry.name, ...entry.values].map((value) => [foldValue(value), entry.name] as const)))
}
