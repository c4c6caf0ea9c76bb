import type { JsonPath, Report } from './check-own-chart.ts'
import { isObject, type Json } from './chart-spec.ts'

/** Formats of figures. @see https://d3js.org/d3-format, locale.format (from memory) */
const figure = /^(?:.?[<>=^])?[-+( ]?[$#]?0?\d*,?(?:\.\d+)?~?[%bcdefgnoprsxX]?$/
/** Formats of dates: every `%` begins one of the directives. @see https://d3js.org/d3-time-format, locale.format (from memory) */
const date = /^(?:[^%]|%[-_0]?[AaBbcdefGgHIjLMmpQqSsUuVWwXxYyZ%])*$/

/** Formats that would print something else than a figure or a date, each told where it stands. */
export function checkFormats(spec: Json, from: JsonPath, report: Report): void {
  walk(spec, from, undefined)

  function walk(value: Json, path: JsonPath, of: Kind | undefined): void {
    if (Array.isArray(value)) (value as readonly Json[]).forEach((part, at) => { walk(part, [...path, at], of) })
    if (!isObject(value)) return
    const kind = kindOf(value) ?? of
    for (const [key, part] of Object.entries(value)) {
      if (key === 'format' && typeof part === 'string') checkOne(part, [...path, key], kind ?? (/%[-_0]?[A-Za-z]/.test(part) ? 'date' : 'figure'))
      else walk(part, [...path, key], kind)
    }
  }

  function checkOne(format: string, path: JsonPath, kind: Kind): void {
    const sound = kind === 'figure' ? figure.test(format) : date.test(format) && format.includes('%')
    if (!sound) report(path, 'chart-format', { format, kind })
  }
}

type Kind = 'figure' | 'date'

/** What a channel writes, where it says so. */
function kindOf({ type, timeUnit, formatType }: { readonly [key: string]: Json }): Kind | undefined {
  if (formatType !== undefined) return formatType === 'time' ? 'date' : formatType === 'number' ? 'figure' : undefined
  if (type === 'temporal' || timeUnit !== undefined) return 'date'
  return type === 'quantitative' ? 'figure' : undefined
}
