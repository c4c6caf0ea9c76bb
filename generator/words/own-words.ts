import { closest } from 'fastest-levenshtein'
import type { IntlMessageFormat } from 'intl-messageformat'
import { readPlacedYaml } from '../account/yaml-places.ts'
import { faultOf } from '../faults/catalogue.ts'
import { InputFault, type Fault } from '../faults/fault.ts'
import { argumentsOf, usesOf } from './message-arguments.ts'
import { compile, type OwnWords, type Words } from './words.ts'

/** Forms of numbers that decide plurals; every other form writes text. */
const countingForms: readonly unknown[] = ['plain', 'length']

/**
 * Read an account's own words: messages of the house said otherwise, and new ones for a template of its own.
 *
 *     keyfigure-opinion-label: Opinion, mix-adjusted
 *     our-line: { text: "Opinion moved by {change} points.", arguments: { change: { of: opinion.change.mean, as: change } } }
 *
 * A message of the house has its arguments from the house, of which it may leave some out; a new one declares its own as `sentences.yaml` does.
 *
 * @param source - the file's text, and how faults name it
 * @throws {InputFault} with everything that is wrong, each at its line and column
 */
export function readOwnWords(source: { readonly place: string, readonly text: string }, house: Words): OwnWords {
  const { value, places, faults } = readPlacedYaml(source.text, source.place)
  if (faults.length > 0) throw new InputFault(faults)
  if (value === null) return { ...source, messages: {}, places, added: [] }
  if (!isMap(value)) throw new InputFault([faultOf('words-value', source.place, { actual: 'something else than a map', expected: 'messages by key' })])
  const entries = Object.entries(value)
  const wrong = entries.flatMap(([key, entry]) => checkEntry(key, entry, places[key] ?? source.place, house))
  if (wrong.length > 0) throw new InputFault(wrong)
  return {
    ...source, places, added: entries.map(([key]) => key).filter((key) => !house.has(key)),
    messages: Object.fromEntries(entries.map(([key, entry]) => [key, textOf(entry) ?? ''])),
  }
}

function checkEntry(key: string, entry: unknown, place: string, house: Words): readonly Fault[] {
  const text = textOf(entry)
  if (!/^[a-z0-9_-]+$/i.test(key)) return [faultOf('words-value', place, { actual: `key \`${key}\``, expected: 'a key of letters, digits, hyphens and underscores' })]
  if (text === undefined) return [faultOf('words-value', place, { actual: 'something else than a text', expected: 'a text in quotes, or for a new message `text` and `arguments`' })]
  if (house.has(key) && typeof entry !== 'string') return [faultOf('words-value', place, { actual: '`arguments` of a message of the house', expected: `a text: it has ${listed(house.argumentsOf(key))} from the house` })]
  const message = compiled(key, text, house.locale)
  if (typeof message === 'string') return [faultOf('words-message-invalid', place, { key, reason: message })]
  return house.has(key) ? checkArguments(key, message, house.argumentsOf(key), house.countsOf(key), place) : checkArguments(key, message, ...declared(entry), place)
}

function checkArguments(key: string, message: IntlMessageFormat, known: readonly string[], counts: readonly string[], place: string): readonly Fault[] {
  const unknown = argumentsOf(message.getAst()).filter((name) => !known.includes(name))
  const unfit = usesOf(message.getAst()).filter(({ name, use }) => known.includes(name) && (use === 'formatted' || (use === 'plural' && !counts.includes(name))))
  return [
    ...unknown.map((name) => faultOf('words-argument-unknown', place, { key, name, known, nearest: known.length === 0 ? null : closest(name, [...known]) })),
    ...[...new Set(unfit.map(({ name }) => name))].map((name) => faultOf('words-argument-unfit', place, { key, name, counts })),
  ]
}

/** Arguments that a new message declares, and those among them that are numbers. */
function declared(entry: unknown): [known: readonly string[], counts: readonly string[]] {
  const given = isMap(entry) && isMap(entry['arguments']) ? Object.entries(entry['arguments']) : []
  return [given.map(([name]) => name), given.filter(([, spec]) => isMap(spec) && countingForms.includes(spec['as'])).map(([name]) => name)]
}

function compiled(key: string, text: string, locale: string): IntlMessageFormat | string {
  try {
    return compile(key, text, locale)
  } catch (error) {
    return error instanceof Error && error.cause instanceof Error ? error.cause.message : String(error)
  }
}

function textOf(entry: unknown): string | undefined {
  if (typeof entry === 'string') return entry
  const known = isMap(entry) && Object.keys(entry).every((key) => key === 'text' || key === 'arguments')
  return known && typeof entry['text'] === 'string' ? entry['text'] : undefined
}

function isMap(value: unknown): value is Readonly<Record<string, unknown>> {
  return typeof value === 'object' && value !== null && !Array.isArray(value)
}

function listed(names: readonly string[]): string {
  return names.length === 0 ? 'no arguments' : `its arguments ${names.join(', ')}`
}
