import type { JsonPath, Report } from './check-own-chart.ts'
import { isObject, type Json, type JsonObject } from './chart-spec.ts'

interface Channel {
  readonly path: JsonPath
  readonly of: JsonObject
}

/**
 * Layers that share an axis are ordered alike: one order by a field holds for every layer that says none. Vega-Lite orders the union of several layers
 * only by the least, greatest or number of a field's values, so that the least is taken where nothing is said.
 */
export function sortLayersAlike(value: Json): Json {
  if (Array.isArray(value)) return (value as readonly Json[]).map(sortLayersAlike)
  if (!isObject(value)) return value
  if (!Array.isArray(value.layer)) return Object.fromEntries(Object.entries(value).map(([key, part]) => [key, sortLayersAlike(part)]))
  return ['x', 'y'].reduce<JsonObject>((layered, name) => {
    const sort = sharedOf(layered, name).map(({ of }) => of.sort).find(isFieldSort)
    return sort === undefined ? layered : withSort(layered, name, least(sort)) as JsonObject
  }, value)
}

/** Orders of layers that contradict each other, each told where it stands. */
export function checkLayerSorts(value: Json, path: JsonPath, report: Report): void {
  if (Array.isArray(value)) return (value as readonly Json[]).forEach((part, at) => { checkLayerSorts(part, [...path, at], report) })
  if (!isObject(value)) return
  if (!Array.isArray(value.layer)) return Object.entries(value).forEach(([key, part]) => { checkLayerSorts(part, [...path, key], report) })
  for (const name of ['x', 'y']) {
    const sorted = sharedOf(value, name, path).filter(({ of }) => of.sort !== undefined)
    const [first, ...others] = sorted.map(({ of, path: at }) => ({ at, sort: JSON.stringify(least(of.sort)) }))
    if (!sorted.some(({ of }) => isFieldSort(of.sort))) continue
    for (const other of others) if (other.sort !== first.sort) report([...other.at, 'sort'], 'chart-sort', {})
  }
}

/** Every definition of a channel in layers that share its scale. */
function sharedOf(layered: JsonObject, name: string, path: JsonPath = []): readonly Channel[] {
  const { encoding, layer, resolve } = layered
  const scale = isObject(resolve) && isObject(resolve.scale) ? resolve.scale[name] : undefined
  const own = isObject(encoding) && isObject(encoding[name]) ? [{ path: [...path, 'encoding', name], of: encoding[name] }] : []
  if (!Array.isArray(layer) || scale === 'independent') return own
  return [...own, ...(layer as readonly Json[]).flatMap((part, at) => (isObject(part) ? sharedOf(part, name, [...path, 'layer', at]) : []))]
}

function withSort(value: Json, name: string, sort: Json): Json {
  if (!isObject(value)) return value
  const { encoding, layer } = value
  const channel = isObject(encoding) ? encoding[name] : undefined
  const ordered = isObject(channel) && typeof channel.field === 'string' && (channel.sort === undefined || isFieldSort(channel.sort))
  return {
    ...value,
    ...(ordered && isObject(encoding) ? { encoding: { ...encoding, [name]: { ...channel, sort } } } : {}),
    ...(Array.isArray(layer) ? { layer: (layer as readonly Json[]).map((part) => withSort(part, name, sort)) } : {}),
  }
}

function isFieldSort(sort: Json | undefined): sort is JsonObject {
  return isObject(sort) && typeof sort.field === 'string'
}

function least(sort: Json | undefined): Json {
  return isFieldSort(sort) ? { op: 'min', ...sort } : sort ?? null
}
