import { LineCounter, isAlias, isMap, isScalar, parseDocument, visit } from 'yaml'
import type { Document, ParsedNode } from 'yaml'
import type { FormName } from '../words/forms.ts'
import { formNames, isFormName, write } from '../words/forms.ts'
import type { OwnWords, WordArguments, Words } from '../words/words.ts'
import { nearest } from './faults.ts'
import type { Reporter } from './faults.ts'
import { lookUp, parsePath } from './path.ts'
import type { Path, Scope } from './path.ts'
import { readSelection, selectionKeys } from './read-selection.ts'
import { selected } from './selection.ts'
import type { Selection } from './selection.ts'

/**
 * Which figures a worded sentence is given: declared once, free of language, in `sentences.yaml`.
 *
 *     opinion-headline:
 *       size: { of: opinion.change.mean, as: size }
 *       venues: { of: venues, where: movement is down, by: drift.mean, order: size, most: 2, pick: label, as: list }
 */
export type Sentences = ReadonlyMap<string, Sentence>

export interface Sentence {
  readonly arguments: Readonly<Record<string, Argument>>
  readonly position: Position
  /** Its file, where that is the account's own. */
  readonly place?: string | undefined
}

export interface Argument {
  readonly of: Path
  readonly as: FormName
  /** Only with lists: which items, and what of each. */
  readonly selection?: Selection
  readonly pick?: Path
  /** The form of each item picked; without one it is taken as it stands, a label by its catalogue. */
  readonly write?: FormName
  /** What the figure is counted in, where its form asks: the kind of a metric, or the grid. */
  readonly unit?: Path
  readonly position: Position
}

interface Position { readonly start: { readonly line: number, readonly column: number } }

/** Read `sentences.yaml`; what can't be read is reported and left out. */
export function parseSentences(text: string, reporter: Reporter): Sentences {
  return readSentences(text, (node) => node, reporter)
}

/** The sentences of an account's own words: messages that declare `arguments`. */
export function parseOwnSentences({ place, text, added }: OwnWords, reporter: Reporter): Sentences {
  const declaring = readSentences(text, (node, anchors) => entries(node, anchors).find(([key]) => key === 'arguments')?.[1] ?? null, reporter)
  return new Map([...declaring].filter(([message]) => added.includes(message)).map(([message, sentence]) => [message, { ...sentence, place }]))
}

/** @param argumentsIn - the part of an entry that holds its arguments */
function readSentences(text: string, argumentsIn: (node: ParsedNode | null, anchors: Anchors) => ParsedNode | null, reporter: Reporter): Sentences {
  const lines = new LineCounter()
  const document = parseDocument(text, { lineCounter: lines })
  const [place, anchors] = [placeIn(lines), anchorsIn(document)]
  for (const error of document.errors) {
    const { line, col: column } = lines.linePos(error.pos[0])
    reporter.report({ position: { start: { line, column } } }, 'sentences-invalid', `YAML (${error.message.split('\n')[0]})`, 'a map from messages to arguments', 'Mend the syntax.')
  }
  return new Map(entries(document.contents, anchors).map(([message, node]) => {
    const position = place(node)
    const found = entries(argumentsIn(node, anchors), anchors).map(([name, spec]) => [name, readArgument(name, asStrings(spec, anchors), place(spec), reporter)] as const)
    return [message, { position, arguments: Object.fromEntries(found.filter((entry): entry is [string, Argument] => entry[1] !== undefined)) }]
  }))
}

function readArgument(name: string, spec: Readonly<Record<string, string>>, position: Position, reporter: Reporter): Argument | undefined {
  const known = [...selectionKeys, 'as', 'pick', 'write', 'unit']
  const wrong = Object.keys(spec).filter((key) => !known.includes(key))
  for (const key of wrong) reporter.report({ position }, 'argument-key-unknown', `key "${key}" of argument "${name}"`, 'a known key', nearest(key, known))
  const [form = '', itemForm = 'text'] = [spec['as'], spec['write']]
  for (const given of [form, itemForm].filter((given) => !isFormName(given))) {
    reporter.report({ position }, 'form-unknown', `form "${given}" of argument "${name}"`, 'a known form', nearest(given, formNames))
  }
  const selection = readSelection(spec, { position }, reporter)
  const [pick, unit] = [spec['pick'], spec['unit']].map((text) => (text === undefined ? undefined : parsePath(text)))
  if (!selection || !isFormName(form) || !isFormName(itemForm) || wrong.length > 0) return undefined
  const chooses = ['where', 'by', 'against', 'order', 'most', 'last', 'pick', 'write'].some((key) => key in spec)
  return { of: selection.of, as: form, position, ...(chooses && { selection }), ...(pick && { pick }), ...(unit && { unit }), ...(spec['write'] !== undefined && { write: itemForm }) }
}

/** The arguments of a sentence, written from the findings. */
export function argumentsFor(sentence: Sentence | undefined, scope: Scope, words: Words): WordArguments {
  return Object.fromEntries(Object.entries(sentence?.arguments ?? {}).map(([name, argument]) => [name, write(valueOf(argument, scope, words), argument.as, words, unitOf(argument, scope))]))
}

function valueOf(argument: Argument, scope: Scope, words: Words): unknown {
  if (!argument.selection) return lookUp(argument.of, scope)
  const { pick, write: form } = argument
  return selected(argument.selection, scope).map((item) => {
    if (!pick) return form ? write(item, form, words) : item
    if (pick.length === 1 && pick[0]?.key === 'label') return write(item, 'label', words)
    const value = lookUp(pick, { ...scope, item })
    return form ? write(value, form, words, unitOf(argument, { ...scope, item })) : value
  })
}

function unitOf({ unit }: Argument, scope: Scope): string {
  const value = unit && lookUp(unit, scope)
  return typeof value === 'string' ? value : ''
}

/** What the names of a file (`&name`) stand for, found in one walk. */
type Anchors = ReadonlyMap<string, unknown>

function anchorsIn(document: Document.Parsed): Anchors {
  const anchors = new Map<string, unknown>()
  visit(document, { Map: (_key, node) => void (node.anchor !== undefined && anchors.set(node.anchor, node)) })
  return anchors
}

/** Keys and values of a map, or of the map that an alias (`*name`) stands for. */
function entries(node: unknown, anchors: Anchors): readonly (readonly [string, ParsedNode | null])[] {
  const found = isAlias(node) ? anchors.get(node.source) : node
  if (!isMap<ParsedNode, ParsedNode | null>(found)) return []
  return found.items.map((pair) => [isScalar(pair.key) ? String(pair.key.value) : '', pair.value])
}

function asStrings(node: ParsedNode | null, anchors: Anchors): Record<string, string> {
  return Object.fromEntries(entries(node, anchors).map(([key, value]) => [key, isScalar(value) ? String(value.value) : '']))
}

function placeIn(lines: LineCounter): (node: ParsedNode | null) => Position {
  return (node) => {
    const { line, col } = lines.linePos(node?.range[0] ?? 0)
    return { start: { line, column: col } }
  }
}
