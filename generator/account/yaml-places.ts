import { isMap, isPair, isScalar, isSeq, LineCounter, parseDocument, visit, type Document, type Node } from 'yaml'
import { faultOf } from '../faults/catalogue.ts'
import type { Fault } from '../faults/fault.ts'

/** Keys and indices from the root of the file to a value. */
export type KeyPath = readonly (string | number)[]

export interface PlacedYaml {
  readonly value: unknown
  /** Place of every key and item, by its dotted path. */
  readonly places: Readonly<Record<string, string>>
  readonly faults: readonly Fault[]
}

const accountFile = 'account.yaml'

/**
 * Read YAML and remember where everything stands; what only YAML's cleverer parts can say is a fault.
 *
 * @param file - what places call it
 */
export function readPlacedYaml(text: string, file = accountFile): PlacedYaml {
  const lines = new LineCounter()
  const document = parseDocument(text, { lineCounter: lines, uniqueKeys: true, stringKeys: true, merge: false, version: '1.2', schema: 'core' })
  const placeAt = (offset: number, path: string): string => {
    const { line, col } = lines.linePos(offset)
    return `${file}:${line}:${col}${path === '' ? '' : ` ${path}`}`
  }
  const faults = [...syntaxFaults(document, placeAt), ...cleverFaults(document, placeAt)]
  if (faults.length > 0) return { value: undefined, places: {}, faults }
  const places = new Map<string, string>()
  collectPlaces(document.contents, [], (path, offset) => { places.set(dotted(path), placeAt(offset, dotted(path))) })
  return { value: document.toJS({ maxAliasCount: 0 }) as unknown, places: Object.fromEntries(places), faults }
}

/** The dotted form of a path, e.g. `mentions.0.columns.id`. */
export function dotted(path: KeyPath): string {
  return path.join('.')
}

/** Place of a path, or of the nearest thing around it that stands in the file. */
export function placeOf(places: Readonly<Record<string, string>>, path: KeyPath): string {
  for (let length = path.length; length > 0; length--) {
    const place = Object.hasOwn(places, dotted(path.slice(0, length))) ? places[dotted(path.slice(0, length))] : undefined
    if (place !== undefined) return length === path.length ? place : `${place.split(' ')[0]} ${dotted(path)}`
  }
  return path.length === 0 ? accountFile : `${accountFile} ${dotted(path)}`
}

type PlaceAt = (offset: number, path: string) => string

function syntaxFaults(document: Document.Parsed, placeAt: PlaceAt): readonly Fault[] {
  return [...document.errors, ...document.warnings].map((problem) => {
    const reason = problem.message.split(/ at line \d+|\n/)[0]!.trim()
    const place = placeAt(problem.pos[0], '')
    if (problem.code === 'DUPLICATE_KEY') return faultOf('account-key-twice', place, { reason })
    if (problem.code === 'TAG_RESOLVE_FAILED') return faultOf('account-alias', place, { found: 'tag' })
    return faultOf('account-unreadable', place, { reason })
  })
}

function cleverFaults(document: Document.Parsed, placeAt: PlaceAt): readonly Fault[] {
  const faults: Fault[] = []
  const report = (node: Node, found: string): void => {
    faults.push(faultOf('account-alias', placeAt(node.range?.[0] ?? 0, ''), { found }))
  }
  visit(document, {
    Alias: (_, node) => report(node, `alias *${node.source}`),
    Value: (_, node) => { if (node.anchor) report(node, `anchor &${node.anchor}`) },
    Pair: (_, pair) => {
      if (isScalar(pair.key) && pair.key.value === '__proto__') faults.push(faultOf('account-key-reserved', placeAt(pair.key.range?.[0] ?? 0, ''), { key: '__proto__' }))
    },
  })
  return faults
}

function collectPlaces(node: unknown, path: KeyPath, remember: (path: KeyPath, offset: number) => void): void {
  if (isMap(node)) {
    for (const pair of node.items) {
      if (!isPair(pair) || !isScalar(pair.key)) continue
      const inner = [...path, String(pair.key.value)]
      remember(inner, pair.key.range?.[0] ?? 0)
      collectPlaces(pair.value, inner, remember)
    }
  }
  if (isSeq(node)) {
    for (const [index, item] of node.items.entries()) {
      const inner = [...path, index]
      remember(inner, (item as Node).range?.[0] ?? 0)
      collectPlaces(item, inner, remember)
    }
  }
}
