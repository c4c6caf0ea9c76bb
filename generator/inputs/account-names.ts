import { closest } from 'fastest-levenshtein'
import type { Account, LevelEntry } from '../account/account.ts'
import { faultOf } from '../faults/catalogue.ts'
import type { Fault } from '../faults/fault.ts'
import { foldValue } from '../intake/level-names.ts'

/** Reads what a file calls a venue, a topic or a label by what the account calls it; case and spacing do not tell names apart. */
export interface AccountNames {
  /** The account's name; null for one that it has not. Where it has none at all, every name is as written. */
  readonly nameOf: (written: string) => string | null
  readonly fault: (written: string, place: string) => Fault
}

export function venueNames(account: Account): AccountNames {
  return accountNames('venue', 'venues', account.venues.map(({ name }) => name), spellingsOf(account.venues))
}

export function topicNames(account: Account): AccountNames {
  return accountNames('topic', 'topics', account.topics.map(({ name }) => name), spellingsOf(account.topics))
}

/** Labels of all sources that are scored by labels. */
export function labelNames(account: Account): AccountNames {
  const labels = account.mentions.flatMap((source) => (source.kind === 'mentions' && source.score.kind === 'labels' ? source.score.labels : []))
    .map(({ label }) => label)
  const spellings = labels.map((label) => [label, label] as const)
  return accountNames('label', 'labels', [...firstOf(spellings).values()], spellings)
}

/** Everything that a level is called, names and values of all before their labels, which may be those of others: each with its name. */
export function spellingsOf(levels: readonly LevelEntry[]): readonly (readonly [spelling: string, name: string])[] {
  return [
    ...levels.flatMap(({ name, values }) => [name, ...values].map((spelling) => [spelling, name] as const)),
    ...levels.map(({ name, label }) => [label, name] as const),
  ]
}

function accountNames(what: string, key: string, known: readonly string[], spellings: readonly (readonly [string, string])[]): AccountNames {
  const names = firstOf(spellings)
  return {
    nameOf: (written) => (names.size === 0 ? written : names.get(foldValue(written)) ?? null),
    fault: (written, place) => faultOf('input-name-unknown', place, { what, actual: written, nearest: closest(foldValue(written), [...names.keys()]), known, key }),
  }
}

function firstOf(spellings: readonly (readonly [string, string])[]): ReadonlyMap<string, string> {
  const names = new Map<string, string>()
  for (const [spelling, name] of spellings) if (!names.has(foldValue(spelling))) names.set(foldValue(spelling), name)
  return names
}
