import { closest } from 'fastest-levenshtein'
import type { z } from 'zod'
import { faultOf } from '../faults/catalogue.ts'
import type { Fault } from '../faults/fault.ts'
import { placeOf, type KeyPath } from './yaml-places.ts'

type Issue = z.core.$ZodIssue

/** The keys that a map at a path may have, for the nearest one: paths are written with `*` for any name or index. */
export type KnownKeys = Readonly<Record<string, readonly string[]>>

const accountKeys: KnownKeys = {
  'base': ['from', 'to'],
  'mentions.*': ['files', 'cells', 'columns', 'score', 'delimiter', 'quote', 'time_format'],
  'mentions.*.score': ['labels', 'range'],
  'venues.*': ['label', 'values', 'cost_per_author', 'drift'],
  'topics.*': ['label', 'values'],
  'posters': ['occasional', 'regular'],
  'survey': ['files', 'headline', 'lags', 'labels', 'next_fieldwork'],
  'survey.*': ['from', 'to'],
}

/** The faults of one zod issue: what zod found, said in the words of the catalogue and placed in the file. */
export function shapeFaults(issue: Issue, base: KeyPath, given: unknown, places: Readonly<Record<string, string>>, knownKeys = accountKeys): readonly Fault[] {
  const path = [...base, ...issue.path.map((part) => (typeof part === 'number' ? part : String(part)))]
  if (issue.code === 'unrecognized_keys') {
    const known = knownKeys[path.map((part, index) => (index > 0 && (typeof part === 'number' || index === 1) ? '*' : part)).join('.')] ?? ['files']
    return issue.keys.map((key) => unknownKey([...path, key], known, places))
  }
  const actual = valueAt(given, issue.path)
  const place = placeOf(places, path)
  if (actual === undefined && path.length > 0) return [faultOf('account-key-absent', place, { key: String(path.at(-1)) })]
  return [faultOf('account-value', place, { actual: describe(actual), expected: expectation(issue) })]
}

/** The fault of a key that nothing reads. */
export function unknownKey(path: KeyPath, known: readonly string[], places: Readonly<Record<string, string>>): Fault {
  const key = String(path.at(-1))
  return faultOf('account-key-unknown', placeOf(places, path), { key, nearest: closest(key, [...known]), known })
}

/** A value as a message shows it, short. */
export function describe(value: unknown): string {
  if (value === null) return 'nothing'
  // a pair is told by its values: which of them is wrong is seen at once
  if (Array.isArray(value)) return value.length === 2 && value.every((part) => typeof part === 'number') ? `list \`[${value.join(', ')}]\`` : `list of ${value.length}`
  if (typeof value === 'object') return 'map'
  const text = JSON.stringify(value) ?? 'nothing'
  return `\`${text.length > 60 ? `${text.slice(0, 57)}...` : text}\``
}

function expectation(issue: Issue): string {
  if (issue.code === 'invalid_value') return issue.values.map(String).join(', ').replace(/, ([^,]*)$/, ' or $1')
  if (issue.code !== 'invalid_type') return issue.message
  const kinds: Readonly<Record<string, string>> = {
    string: 'text', number: 'a number', int: 'a whole number', array: 'a list', tuple: 'a list of two', object: 'a map', record: 'a map', boolean: 'true or false',
  }
  return kinds[issue.expected] ?? issue.expected
}

function valueAt(given: unknown, path: readonly PropertyKey[]): unknown {
  let value = given
  for (const part of path) {
    if (value === null || typeof value !== 'object' || !Object.hasOwn(value, part)) return undefined
    value = (value as Record<PropertyKey, unknown>)[part]
  }
  return value
}
