import { checkCondition } from '../check-paths.ts'
import { argumentsFor } from '../sentences.ts'
import { checkMessage } from '../check-message.ts'
import { createReporter, nearest } from '../faults.ts'
import type { Reporter } from '../faults.ts'
import { lookUp } from '../path.ts'
import type { Scope } from '../path.ts'
import type { TypeScope } from '../path-types.ts'
import { readSelection, selectionKeys } from '../read-selection.ts'
import { selected } from '../selection.ts'
import type { Row } from '../../tables/table.ts'
import type { Labels } from '../../words/cells.ts'
import { columnHeader, parseColumns } from '../table-columns.ts'
import type { PrintedColumn } from '../table-columns.ts'
import { tableTree } from '../table-tree.ts'
import type { CheckContext, Directive, Use } from './directive.ts'
import { standing } from './elements.ts'
import { checkMade, madeLink } from './made-link.ts'

const choosing = selectionKeys.filter((key) => key !== 'of')

/**
 * `::table{name="venues" columns="label, mentions, level, level_low..level_high"}`: a table behind the charts, as a table.
 * `a..b` is one column with an interval. `where`, `by`, `order` and `most` choose rows, by the names of its columns. `caption` is a
 * message of its own where the table is shown in part, `head` one for the first column.
 */
export const table: Directive = {
  type: 'leafDirective', name: 'table', needs: ['name', 'columns'], may: [...choosing, 'caption', 'head', 'made'],
  check: (use, scope, context, reporter) => {
    const { node, attributes } = use
    const name = attributes['name'] ?? ''
    const found = context.tables.find((known) => known.name === name)
    if (!found) reporter.report(node, 'table-unknown', `table "${name}"`, 'a known table', nearest(name, context.tables.map((known) => known.name)))
    else {
      checkMessage(captionOf(use), scope, context, node, reporter)
      checkColumns(use, found.columns.map((column) => column.key), scope, context, reporter)
      checkRows(use, { ...scope, item: { properties: Object.fromEntries(found.columns.map(({ key }) => [key, {}])) } }, reporter)
    }
    checkMade(attributes['made'], node, context, reporter)
    return scope
  },
  fill: (use, scope, { words, sentences, tables }) => {
    const { node, attributes } = use
    const name = attributes['name'] ?? ''
    const found = tables.find((known) => known.name === name)
    const selection = readSelection({ ...attributes, of: 'rows' }, node, createReporter('', []))
    if (!found || !selection) return []
    const rows = selected(selection, { ...scope, names: { ...scope.names, rows: found.rows } }) as readonly Row[]
    const say = (message: string) => words.say(message, argumentsFor(sentences.get(message), scope, words))
    const columns = parseColumns(attributes['columns'] ?? '')
    const headers = columns.map((column, at) => say(headerOf(use, column, at)))
    const surroundings = { caption: say(captionOf(use)), after: madeLink(attributes['made'], words), headers, labels: labelsIn(scope) }
    return [standing(tableTree({ ...found, rows }, columns, surroundings, words))]
  },
}

function captionOf({ attributes }: Use): string {
  return attributes['caption'] ?? `table-${attributes['name'] ?? ''}`
}

function headerOf({ attributes }: Use, column: PrintedColumn, at: number): string {
  return (at === 0 ? attributes['head'] : undefined) ?? columnHeader(column)
}

function labelsIn(scope: Scope): Labels {
  const venues = lookUp([{ key: 'venues' }], { ...scope, names: {} })
  return new Map(Array.isArray(venues) ? venues.map(({ venue, label }: { readonly venue: string, readonly label: string }) => [venue, label]) : [])
}

function checkColumns(use: Use, known: readonly string[], scope: TypeScope, context: CheckContext, reporter: Reporter): void {
  const { node, attributes } = use
  for (const [at, column] of parseColumns(attributes['columns'] ?? '').entries()) {
    for (const key of column.keys.filter((key) => !known.includes(key))) {
      reporter.report(node, 'column-unknown', `column "${key}"`, `a column of table "${attributes['name']}"`, nearest(key, known))
    }
    checkMessage(headerOf(use, column, at), scope, context, node, reporter)
  }
}

function checkRows({ node, attributes }: Use, scope: TypeScope, reporter: Reporter): void {
  const selection = readSelection({ ...attributes, of: 'rows' }, node, reporter)
  if (selection?.where) checkCondition(selection.where, scope, node, reporter)
  const by = selection?.by?.[0]?.key
  const known = Object.keys(scope.item?.properties ?? {})
  if (by !== undefined && !known.includes(by)) reporter.report(node, 'column-unknown', `column "${by}"`, 'a column to sort by', nearest(by, known))
}
