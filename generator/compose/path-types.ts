import { z } from 'zod'
import { findingsSchema } from '../../model/findings/schema.ts'
import { nearOnes } from './faults.ts'
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
  /** What a number is counted in, where the schema says so. */
  readonly unit?: string
}

/** Like `Scope`, with types for values. */
export interface TypeScope {
  readonly findings: TypeNode
  readonly names: Readonly<Record<string, TypeNode>>
  readonly item?: TypeNode
}

/** The scope outside any block. */
export const findingsScope: TypeScope = { findings: z.toJSONSchema(findingsSchema) as TypeNode, names: {} }

export type PathType = { readonly known: true, readonly type: TypeNode } | { readonly known: false, readonly unknown: string, readonly mend: string }

/** The type at a path; or the first of its names that is unknown, and how to mend it. */
export function typeAt(path: Path, scope: TypeScope): PathType {
  const [first, ...rest] = path
  if (!first) return { known: false, unknown: '', mend: seeSchema }
  const starts = [scope.item, { properties: scope.names }, scope.findings].filter((start) => start !== undefined)
  const start = starts.find((node) => child(node, first.key)) ?? { properties: Object.fromEntries(starts.flatMap((node) => Object.entries(node.properties ?? {}))) }
  const found = [first, ...rest].reduce<PathType>((before, step, at) => before.known ? throughList(before.type, path, at) ?? follow(before.type, step, scope) : before, { known: true, type: start })
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
  const choices = withoutNull(child(item, step.pick.field) ?? {}).enum
  if (choices && typeof step.pick.value === 'string' && !choices.includes(step.pick.value)) return unknown(step.pick.value, item, `Known for ${step.pick.field} are ${choices.join(', ')}.`)
  const wanted = typeof step.pick.value === 'string' ? undefined : typeAt(step.pick.value, scope)
  return wanted && !wanted.known ? wanted : { known: true, type: withoutNull(item) }
}

const seeSchema = 'See model/findings/findings.schema.json for what there is.'

function unknown(name: string, node: TypeNode, mend?: string): PathType {
  const names = Object.keys(withoutNull(node).properties ?? {})
  const [near] = nearOnes(name, names)
  const known = names.length > 0 && names.length <= mostNames ? `Known here are ${names.join(', ')}.` : seeSchema
  return { known: false, unknown: name, mend: mend ?? (near === undefined ? known : `Write "${near}", if that is meant.`) }
}

/** So many names are told where none is near. */
const mostNames = 20

/** A name that the items of a list have, and the list has not. */
function throughList(list: TypeNode, path: Path, at: number): PathType | undefined {
  const { items } = withoutNull(list)
  const [before, step] = [path[at - 1], path[at]]
  if (!items || !before || !step || !child(items, step.key)) return undefined
  return unknown(step.key, list, `"${before.key}" is a list: write ${before.key}[first].${step.key}, name an item as in ${before.key}[${idOf(items)}=...].${step.key}, or repeat a block over it by :::each.`)
}

/** The field by which an item is best picked: the first one that is a text. */
function idOf(item: TypeNode): string {
  return Object.entries(withoutNull(item).properties ?? {}).find(([, node]) => kindOf(node) === 'string')?.[0] ?? 'label'
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
  if (isAnything(node)) return true
  if (kind === 'shift') return 'share_from' in properties && 'share_to' in properties
  if (kind === 'fieldwork') return 'field_start' in properties && 'field_end' in properties
  if (kind === 'restatable') return 'previous' in properties && 'previous_sealed' in properties
  if (kind === 'spans') return 'best_lag' in properties && 'span_days' in properties
  return kind === 'event' ? 'label' in properties && 'date' in properties : kindOf(node) === kind
}

/** After a fault nothing is known of what follows from it, and nothing is held against it. */
function isAnything(node: TypeNode): boolean {
  const { type, properties, items, anyOf, enum: choices } = node
  return [type, properties, items, anyOf, choices].every((part) => part === undefined) && !('const' in node)
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

/** What a figure, the bounds of an interval or the figures of a list are counted in; undefined where the schema does not say. */
export function unitOf(node: TypeNode): string | undefined {
  const { unit, properties, items } = withoutNull(node)
  if (unit !== undefined) return unit
  const inner = items ?? (properties?.['low'] && withoutNull(properties['low']))
  return inner && unitOf(inner)
}
