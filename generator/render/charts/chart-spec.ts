import type { TopLevelSpec } from 'vega-lite'
import { z } from 'zod'
import type { Words } from '../../words/words.ts'
import type { DrawingSize } from '../../theme/theme.ts'

export type Json = string | number | boolean | null | readonly Json[] | { readonly [key: string]: Json }
export type JsonObject = Readonly<Record<string, Json>>

export const ownPlace: unique symbol = Symbol('place of an own chart')

/**
 * A chart as kept in templates/charts: a Vega-Lite specification that holds no words and no figures. It names tables as its data, and under
 * `usermeta` it may say how it is laid out:
 * - `narrow`: what differs on a phone (RFC 7396, JSON merge patch);
 * - `panels`: small multiples, one per value of `by` in `table`, at most `columns` beside each other;
 * - `stacked`: panels below each other on one axis of time, of which one without rows is left out; `axis` and `labels` say what room the axis
 *   on the left and the longest label on the right need, `alone` how high a panel is that is left alone;
 * - `ends`: labels at the right end of a stack of shares of `factor`;
 * - `width`: of a small picture, px; it is drawn but once, for page and phone alike.
 */
export interface ChartSpec {
  readonly name: string
  /** The file of a chart that is an account's own: what is wrong with it is a fault of the input. No part of the specification, so no key of it. */
  readonly [ownPlace]?: string
  readonly [key: string]: Json
}

export interface Panels { readonly table: string, readonly by: string, readonly columns: number, readonly gap: number, readonly axis: number }
export interface Stacked { readonly axis: number, readonly gap: number, readonly labels: readonly string[], readonly alone?: number | undefined }
export interface Ends { readonly factor: string, readonly height: number }

const layout = z.strictObject({
  narrow: z.record(z.string(), z.json()).optional(),
  panels: z.strictObject({ table: z.string(), by: z.string(), columns: z.number().int(), gap: z.number(), axis: z.number() }).optional(),
  stacked: z.strictObject({ axis: z.number(), gap: z.number(), labels: z.array(z.string()), alone: z.number().optional() }).optional(),
  ends: z.strictObject({ factor: z.string(), height: z.number() }).optional(),
  width: z.number().min(40).max(350).optional(),
})
export type Layout = z.infer<typeof layout>

/** What a chart says of its own layout at one size. @throws {Error} naming the chart and the key that is not known */
export function layoutOf(spec: ChartSpec): Layout {
  const read = layout.safeParse(spec.usermeta ?? {})
  if (!read.success) throw new Error(`Unexpected usermeta of chart ${spec.name}: ${z.prettifyError(read.error)}`)
  return read.data
}

/** What is wrong with how a chart is laid out: the path of each key and why. */
export function layoutProblems(usermeta: Json): readonly { readonly path: readonly PropertyKey[], readonly reason: string }[] {
  return layout.safeParse(usermeta).error?.issues.map(({ path, message }) => ({ path, reason: message })) ?? []
}

/** The specification at one size: with what differs on a phone put in, and `narrow` told to its expressions. */
export function atSize(spec: ChartSpec, size: DrawingSize): ChartSpec {
  const patched = size === 'narrow' ? mergePatch(spec, layoutOf(spec).narrow ?? {}) as ChartSpec : spec
  const params = Array.isArray(patched.params) ? patched.params as readonly Json[] : []
  // some marks, such as a boxplot, take no parameters: none is given where nothing asks for it
  if (!JSON.stringify({ ...patched, usermeta: null }).includes('narrow')) return patched
  return { ...patched, params: [{ name: 'narrow', value: size === 'narrow' }, ...params] }
}

/** RFC 7396: objects are merged key by key, null removes a key, anything else replaces. */
export function mergePatch(target: Json, patch: Json): Json {
  if (!isObject(patch)) return patch
  const base = isObject(target) ? target : {}
  const kept = Object.entries(base).filter(([key]) => patch[key] !== null)
  const changed = Object.entries(patch).filter(([, value]) => value !== null).map(([key, value]) => [key, mergePatch(base[key] ?? null, value)] as const)
  return Object.fromEntries([...kept, ...changed])
}

/** Every string that begins with `@` becomes the message of that name. @throws {Error} for a message that the catalogue lacks */
export function worded(spec: Json, words: Words): Json {
  if (typeof spec === 'string') return spec.startsWith('@') ? words.say(spec.slice(1)) : spec
  if (Array.isArray(spec)) return (spec as readonly Json[]).map((part) => worded(part, words))
  if (!isObject(spec)) return spec
  return Object.fromEntries(Object.entries(spec).map(([key, value]) => [key, worded(value, words)]))
}

/** Names of the tables that a chart draws from, in order of first use. */
export function tablesIn(spec: Json): readonly string[] {
  if (Array.isArray(spec)) return [...new Set((spec as readonly Json[]).flatMap(tablesIn))]
  if (!isObject(spec)) return []
  const own = isObject(spec.data) && typeof spec.data.name === 'string' ? [spec.data.name] : []
  return [...new Set([...own, ...Object.values(spec).flatMap(tablesIn)])]
}

/** The one place where our JSON is taken for Vega-Lite's own type: its compiler checks it. */
export function asVegaLite(spec: Omit<ChartSpec, 'name'>): TopLevelSpec {
  return spec as unknown as TopLevelSpec
}

/** Whether a part of a specification has parts of its own by name. */
export function isObject(value: Json | undefined): value is JsonObject {
  return typeof value === 'object' && value !== null && !Array.isArray(value)
}
