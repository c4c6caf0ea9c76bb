import { closest } from 'fastest-levenshtein'
import { z } from 'zod'
import { findingsSchema } from '../../model/findings/schema.ts'
import type { Path, Step } from './path.ts'

/**
 * Paths checked against the type of the findings instead of their values: a template is right or wrong whatever the
 * month, and a misspelt path is found even inside a block that does not appear this time.
 */
export interface TypeNode {
  readonly type?: string | readonly string[]
  readonly enum?: readonly unknown[]
  readonly const?: unknown
  readonly properties?: Readonly<Record<string, TypeNode>>
  readonly additionalProperties?: TypeNode | boolean
  readonly items?: TypeNode
  readonly anyOf?: readonly TypeNode[]
}

/** Like `Scope`, with types for values. */
export interface TypeScope {
  readonly findings: TypeNode
  readonly names: Readonly<Record<string, TypeNode>>
  readonly item?: TypeNode
}

/** The scope outside any block. */
export const findingsScope: TypeScope = { findings: z.toJSONSchema(findingsSchema) as TypeNode, names: {} }

export type PathType = { readonly known: true, readonly type: TypeNode } | { readonly known: false, readonly unknown: string, readonly nearest: string | undefined }

/** The type at a path; or the first of its names that is unknown, and the known name nearest to it. */
export function typeAt(path: Path, scope: TypeScope): PathType {
  const [first, ...rest] = path
  if (!first) return { known: false, unknown: '', nearest: undefined }
  const starts = [scope.item, { properties: scope.names }, scope.findings].filter((start) => start !== undefined)
  const start = starts.find((node) => child(node, first.key)) ?? { properties: Object.fromEntries(starts.flatMap((node) => Object.entries(node.properties ?? {}))) }
  const found = [first, ...rest].reduce<PathType>((at, step) => at.known ? follow(at.type, step, scope) : at, { known: true, type: start })
  return found.known && path.some(({ all }) => all) && !withoutNull(found.type).items ? { known: true, type: { type: 'array', items: found.type } } : found
}

function follow(node: TypeNode, step: Step, scope: TypeScope): PathType {
  const next = child(node, step.key)
  if (!next) return unknown(step.key, node)
  if (!step.pick && !step.end && !step.all) return { known: true, type: next }
  const item = withoutNull(next).items
  if (!item) return unknown(`${step.key}[${step.all ? 'all' : step.end ?? `${step.pick?.field}=`}]`, node)
  if (!step.pick) return { known: true, type: withoutNull(item) }
  if (!child(item, step.pick.field)) return unknown(step.pick.field, item)
  const wanted = typeof step.pick.value === 'string' ? undefined : typeAt(step.pick.value, scope)
  return wanted && !wanted.known ? wanted : { known: true, type: withoutNull(item) }
}

function unknown(name: string, node: TypeNode): PathType {
  const names = Object.keys(withoutNull(node).properties ?? {})
  return { known: false, unknown: name, nearest: names.length > 0 ? closest(name, names) : undefined }
}

function child(node: TypeNode, key: string): TypeNode | undefined {
  const { properties, additionalProperties } = withoutNull(node)
  if (properties && Object.hasOwn(properties, key)) return properties[key]
  return typeof additionalProperties === 'object' ? additionalProperties : undefined
}

/** The type of a value that is there. */
export function withoutNull(node: TypeNode): TypeNode {
  return node.anyOf?.find((option) => option.type !== 'null') ?? node
}

/** Whether a value of the type can be written by a form made from `kind`. */
export function isOfKind(node: TypeNode, kind: string): boolean {
  const { properties = {} } = withoutNull(node)
  if (kind === 'shift') return 'share_from' in properties && 'share_to' in properties
  if (kind === 'fieldwork') return 'field_start' in properties && 'field_end' in properties
  if (kind === 'spans') return 'best_lag' in properties && 'span_days' in properties
  return kind === 'event' ? 'label' in properties && 'date' in properties : kindOf(node) === kind
}

/** What a value of the type can be written as: see the forms of generator/words. */
export function kindOf(node: TypeNode): string {
  const { type, properties, items } = withoutNull(node)
  if (items) return 'list'
  if (properties && 'low' in properties) return 'estimate'
  if (properties && 'label' in properties) return 'level'
  if (properties && 'start' in properties && 'end' in properties) return 'span'
  const [named = 'nothing'] = [type ?? []].flat().filter((name) => name !== 'null')
  return named === 'integer' ? 'number' : named
}
