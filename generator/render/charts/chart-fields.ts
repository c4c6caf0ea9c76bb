import type { Table } from '../../tables/table.ts'
import { isObject, type Json, type JsonObject, tablesIn } from './chart-spec.ts'

/** Transforms that make columns of names which only the data, or a default of Vega-Lite, know. */
const namesUnknown = ['pivot', 'fold', 'density', 'quantile', 'regression', 'loess', 'flatten', 'lookup', 'extent']
/** What layouts of this program add to the rows. */
const ofLayouts = ['rank', 'from', 'to', 'shade', 'leads', 'middle', 'place']

/**
 * The fields that a chart may name: columns of its tables, what this program adds to them, and what its transforms make.
 *
 * @returns undefined where a transform makes fields whose names can't be told from the specification alone
 */
export function fieldsKnown(spec: JsonObject, tables: readonly Table[]): readonly string[] | undefined {
  const found = partsOf(spec)
  if (found.some((part) => namesUnknown.some((name) => Object.hasOwn(part, name)))) return undefined
  const named = tablesIn(spec)
  const columns = tables.filter(({ name }) => named.includes(name) || named.includes('stack')).flatMap((table) => table.columns.map(({ key }) => key))
  const made = found.flatMap(({ as }) => [as ?? []].flat()).filter((name) => typeof name === 'string')
  return [...new Set([...columns, ...columns.flatMap((key) => [`${key}_shown`, `${key}_said`]), ...made, ...ofLayouts])]
}

/** Every object of a specification. */
function partsOf(value: Json): readonly JsonObject[] {
  if (Array.isArray(value)) return (value as readonly Json[]).flatMap(partsOf)
  return isObject(value) ? [value, ...Object.values(value).flatMap(partsOf)] : []
}
