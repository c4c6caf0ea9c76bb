import { nearest } from '../../compose/faults.ts'
import { faultOf, type FaultCode } from '../../faults/catalogue.ts'
import type { Fault } from '../../faults/fault.ts'
import type { Table } from '../../tables/table.ts'
import type { Words } from '../../words/words.ts'
import { fieldsKnown } from './chart-fields.ts'
import { isObject, type Json, type JsonObject, layoutProblems } from './chart-spec.ts'
import { checkExpression } from './check-expression.ts'
import { checkFormats } from './check-format.ts'
import { checkNames } from './known-names.ts'
import { checkLayerSorts } from './layer-sorts.ts'

/** What an own chart is checked against. */
export interface ChartContext {
  readonly tables: readonly Table[]
  readonly words: Words
}

export type JsonPath = readonly (string | number)[]

/** Tells what is wrong at a path of the file. */
export type Report = <C extends FaultCode>(path: JsonPath, code: C, details: Parameters<typeof faultOf<C>>[2]) => void

/** Keys that lead or load from somewhere, or that mean something to the language the program is written in. */
const refusedKeys = new Set(['url', 'href', 'datasets', 'usermeta', '__proto__', 'constructor', 'prototype'])
const refusedMarks = new Set(['image', 'geoshape'])
/** Keys whose text is an expression; the last three join the conditions of a filter. */
const expressionKeys = new Set(['expr', 'calculate', 'filter', 'test', 'labelExpr', 'signal', 'update', 'and', 'or', 'not'])
/** Keys that name a column, or list several. */
const fieldKeys = new Set(['field', 'groupby'])

/**
 * Everything that is wrong in a chart of an account: it may draw tables of the findings and nothing else, leads nowhere, loads nothing, and gives
 * the same whenever it is drawn.
 *
 * @param placeOf - the place of a value in the file, by its path
 */
export function ownChartFaults(spec: JsonObject, { tables, words }: ChartContext, placeOf: (path: JsonPath) => string): readonly Fault[] {
  const faults: Fault[] = []
  const fault: Report = (path, code, details) => void faults.push(faultOf(code, placeOf(path), details))
  const { usermeta, ...drawn } = spec
  const made = isObject(usermeta) && usermeta.ends !== undefined ? ['stack', 'ends'] : []
  const names = [...tables.map(({ name }) => name), ...made]
  const fields = fieldsKnown(spec, tables)

  const walk = (value: Json, path: JsonPath): void => {
    if (typeof value === 'string') checkText(value, path)
    else if (Array.isArray(value)) (value as readonly Json[]).forEach((part, at) => { walk(part, [...path, at]) })
    else if (isObject(value)) for (const [key, part] of Object.entries(value)) checkEntry(key, part, [...path, key])
  }
  const checkEntry = (key: string, value: Json, path: JsonPath): void => {
    if (refusedKeys.has(key)) fault(path, 'chart-key', { key })
    else if (key === 'data') checkData(value, path)
    else {
      if (key === 'mark') checkMark(value, path)
      if (fieldKeys.has(key)) checkFields(value, path)
      walk(value, path)
    }
  }
  const checkFields = (value: Json, path: JsonPath): void => {
    if (Array.isArray(value)) (value as readonly Json[]).forEach((part, at) => { checkFields(part, [...path, at]) })
    if (typeof value === 'string' && fields?.includes(value) === false) fault(path, 'chart-field', { field: value, nearest: nearest(value, fields) })
  }
  const checkData = (value: Json, path: JsonPath): void => {
    if (!isObject(value) || typeof value.name !== 'string' || Object.keys(value).length > 1) fault(path, 'chart-data', {})
    else if (!names.includes(value.name)) fault(path, 'chart-table', { name: value.name, nearest: nearest(value.name, names) })
  }
  const checkMark = (value: Json, path: JsonPath): void => {
    const mark = isObject(value) ? value.type : value
    if (typeof mark === 'string' && refusedMarks.has(mark)) fault(path, 'chart-mark', { mark })
  }
  const checkText = (text: string, path: JsonPath): void => {
    const key = path.findLast((part) => typeof part === 'string')
    if (/url\s*\(/i.test(text)) fault(path, 'chart-address', {})
    if (key !== undefined && expressionKeys.has(key)) checkExpression(text, path, fields, fault)
    if (text.startsWith('@') && !words.has(text.slice(1))) fault(path, 'chart-message', { message: text.slice(1), nearest: nearest(text.slice(1), words.keys) })
  }

  for (const { path, reason } of usermeta === undefined ? [] : layoutProblems(usermeta)) fault(['usermeta', ...path.map(String)], 'chart-layout', { reason })
  walk(drawn, [])
  if (isObject(usermeta)) for (const [key, part] of Object.entries(usermeta)) walk(part, ['usermeta', key])
  for (const { part, path } of [{ part: drawn, path: [] }, ...(isObject(usermeta) && isObject(usermeta.narrow) ? [{ part: usermeta.narrow, path: ['usermeta', 'narrow'] }] : [])]) {
    checkNames(part, path, { keys: refusedKeys, values: refusedMarks }, fault)
    checkFormats(part, path, fault)
    checkLayerSorts(part, path, fault)
  }
  if (spec.data === undefined && spec.layer === undefined && spec.hconcat === undefined && spec.vconcat === undefined && spec.concat === undefined) fault([], 'chart-data', {})
  const panels = isObject(usermeta) && isObject(usermeta.panels) ? usermeta.panels.table : undefined
  if (typeof panels === 'string' && !names.includes(panels)) fault(['usermeta', 'panels', 'table'], 'chart-table', { name: panels, nearest: nearest(panels, names) })
  return faults
}
