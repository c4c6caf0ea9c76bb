import { LineCounter, isNode, parseDocument } from 'yaml'
import { faultOf } from '../../faults/catalogue.ts'
import { InputFault } from '../../faults/fault.ts'
import { type ChartContext, type JsonPath, ownChartFaults } from './check-own-chart.ts'
import { sortLayersAlike } from './layer-sorts.ts'
import { type ChartSpec, isObject, type Json, type JsonObject, ownPlace } from './chart-spec.ts'

/**
 * Read a chart of an account.
 *
 * @param name - the file's, without `.json`
 * @param place - how faults name the file
 * @returns the specification in UTC, which is what the dates of all tables are in, its layers ordered alike
 * @throws {InputFault} with everything that is wrong in it
 */
export function readOwnChart(name: string, place: string, text: string, context: ChartContext): ChartSpec {
  if (!/^[a-z][a-z0-9-]*$/.test(name)) throw new InputFault([faultOf('chart-name', place, { name })])
  const spec = objectIn(text, place)
  // before anything that goes through it by calling itself
  if (deeperThan(deepest, spec)) throw new InputFault([faultOf('chart-deep', place, {})])
  const faults = ownChartFaults(spec, context, placesIn(text, place))
  if (faults.length > 0) throw new InputFault(faults)
  return { ...inUtc(sortLayersAlike(spec) as JsonObject), name, [ownPlace]: place }
}

const deepest = 60

function deeperThan(most: number, value: Json): boolean {
  if (typeof value !== 'object' || value === null) return false
  return most === 0 || Object.values(value).some((part: Json) => deeperThan(most - 1, part))
}

function objectIn(text: string, place: string): { readonly [key: string]: Json } {
  let reason = 'no object'
  try {
    const value = JSON.parse(text) as Json
    if (isObject(value)) return value
  } catch (error) {
    reason = error instanceof Error ? error.message : String(error)
  }
  const at = /position (\d+)/.exec(reason)?.[1]
  const lines = text.slice(0, Number(at ?? 0)).split('\n')
  throw new InputFault([faultOf('chart-no-json', `${place}:${lines.length}:${(lines.at(-1)?.length ?? 0) + 1}`, { reason: reason.replace(/\s+/g, ' ') })])
}

/** Places of values by their path: JSON is YAML, whose reader knows where each value stands. */
function placesIn(text: string, place: string): (path: JsonPath) => string {
  const lines = new LineCounter()
  const document = parseDocument(text, { lineCounter: lines, logLevel: 'silent' })
  return (path) => {
    const node = document.errors.length > 0 ? undefined : document.getIn(path, true)
    const position = isNode(node) && node.range ? lines.linePos(node.range[0]) : undefined
    const written = path.map((part, at) => (typeof part === 'number' ? `[${part}]` : at === 0 ? part : `.${part}`)).join('')
    return `${place}${position ? `:${position.line}:${position.col}` : ''}${written === '' ? '' : ` ${written}`}`
  }
}

/** Dates as they are, wherever the program runs: scales of time and units of time in UTC. */
function inUtc<T extends Json>(value: T): T
function inUtc(value: Json): Json {
  if (Array.isArray(value)) return (value as readonly Json[]).map((part) => inUtc(part))
  if (!isObject(value)) return value
  const entries = Object.entries(value).map(([key, part]) => [key, key === 'timeUnit' ? unitInUtc(part) : inUtc(part)] as const)
  const copy = Object.fromEntries(entries)
  if (copy.type !== 'temporal' || copy.scale === null) return copy
  return { ...copy, scale: { type: 'utc', ...isObject(copy.scale) ? copy.scale : {} } }
}

function unitInUtc(unit: Json): Json {
  if (isObject(unit)) return { ...unit, ...unit.unit === undefined ? {} : { unit: unitInUtc(unit.unit) } }
  return typeof unit === 'string' && !unit.startsWith('utc') ? `utc${unit}` : unit
}
