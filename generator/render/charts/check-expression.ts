import { codegenExpression, expressionFunction, parseExpression } from 'vega'
import { nearest } from '../../compose/faults.ts'
import type { JsonPath, Report } from './check-own-chart.ts'

/** A node of an expression, of which only this is looked at. */
interface ExpressionNode {
  readonly type: string
  readonly name?: string
  readonly value?: unknown
  readonly computed?: boolean
  readonly callee?: ExpressionNode
  readonly object?: ExpressionNode
  readonly property?: ExpressionNode
}

/** Parts of a chart in whose expressions `datum` is no row but a tick, an entry of a legend or a heading. */
const ofGuides = ['axis', 'legend', 'header']

/** Functions that give something else each time. */
const unsteady: readonly string[] = ['now', 'random']

/**
 * What is wrong in an expression of a chart: its grammar, a function that there is not or that gives something else each time, a field that the rows
 * don't have. Nothing is evaluated.
 *
 * @param fields - what rows have; undefined where that can't be told
 */
export function checkExpression(text: string, path: JsonPath, fields: readonly string[] | undefined, report: Report): void {
  const nodes = nodesOf(text)
  if (typeof nodes === 'string') return report(path, 'chart-expression-invalid', { reason: nodes })
  for (const name of new Set(nodes.flatMap(calledBy))) {
    if (unsteady.includes(name)) report(path, 'chart-expression', { name })
    else if (!isFunction(name)) report(path, 'chart-function', { name })
  }
  if (fields === undefined || path.some((part) => ofGuides.includes(String(part)))) return
  for (const field of new Set(nodes.flatMap(fieldRead))) {
    if (!fields.includes(field) && !madeByEncoding(field, fields)) report(path, 'chart-field', { field, nearest: nearest(field, fields) })
  }
}

/** Every node of an expression, or why it is none. */
function nodesOf(text: string): readonly ExpressionNode[] | string {
  try {
    return within(parseExpression(text))
  } catch (error) {
    return error instanceof Error ? error.message : String(error)
  }
}

function within(node: ExpressionNode): readonly ExpressionNode[] {
  const parts = Object.values(node).flat().filter((part): part is ExpressionNode => typeof part === 'object' && part !== null && 'type' in part)
  return [node, ...parts.flatMap(within)]
}

function calledBy({ type, callee }: ExpressionNode): readonly string[] {
  return type === 'CallExpression' && callee?.name !== undefined ? [callee.name] : []
}

/** The language's own functions are known to its generator of code, which is asked and whose code is not used; the others are registered by name. */
function isFunction(name: string): boolean {
  if (expressionFunction(name) !== undefined) return true
  try {
    codegenExpression({ allowed: [], forbidden: [], globalvar: '_', fieldvar: '_' })(parseExpression(`${name}(0, 0, 0)`))
    return true
  } catch {
    return false
  }
}

/** The field that a node reads of its row: `datum.share`, `datum['share']`; one whose name is computed is not known. */
function fieldRead({ type, object, property, computed }: ExpressionNode): readonly string[] {
  if (type !== 'MemberExpression' || object?.type !== 'Identifier' || object.name !== 'datum') return []
  if (computed !== true) return property?.name === undefined ? [] : [property.name]
  return property?.type === 'Literal' && typeof property.value === 'string' ? [property.value] : []
}

/** Fields that encodings make have the name of what they are made of in theirs: `mean_share`, `share_end`, `bin_maxbins_10_share`; a count has none. */
function madeByEncoding(field: string, fields: readonly string[]): boolean {
  return ['__count', 'count_*', 'datum'].includes(field) || fields.some((known) => field.endsWith(`_${known}`) || field.includes(`_${known}_`) || ['_start', '_end', '_range'].includes(field.replace(known, '')))
}
