import type { Element } from 'hast'
import { h } from 'hastscript'
import type { Words } from '../words/words.ts'
import { breakBetween, type ListedPeriod } from './order-reviews.ts'
import type { PageFigures } from './page-figures.ts'
import type { Picture } from './pictures.ts'
import type { ListedReview } from './read-reviews.ts'
import { changeCell, opinionCell, periodCell, probabilityCell, revisionCell, sealedCell, seriousCell, unreadText, type CellContext, type Content } from './review-cells.ts'

interface Column {
  readonly name: string
  readonly kind: string
  /** Message of its head. */
  readonly head: string
}

interface FigureColumn extends Column {
  readonly cell: (figures: PageFigures, context: CellContext) => Content
}

const periodColumn: Column = { name: 'period', kind: 'text', head: 'archive-page-column-period' }
const stepsColumn: Column = { name: 'steps', kind: 'text', head: 'archive-page-column-steps' }
/** Those of a review whose figures can't be read are one cell that says so. */
const figureColumns: readonly FigureColumn[] = [
  { name: 'opinion', kind: 'points', head: 'archive-page-column-opinion', cell: opinionCell },
  { name: 'change', kind: 'change', head: 'archive-page-column-change', cell: changeCell },
  { name: 'probability', kind: 'probability', head: 'archive-page-column-probability', cell: probabilityCell },
  { name: 'serious', kind: 'text', head: 'archive-page-column-serious', cell: seriousCell },
]
const revisionColumn: Column = { name: 'revision', kind: 'text', head: 'archive-page-column-revision' }
const sealedColumn: Column = { name: 'sealed', kind: 'text', head: 'archive-page-column-sealed' }
const columns: readonly Column[] = [periodColumn, stepsColumn, ...figureColumns, revisionColumn, sealedColumn]

/**
 * Every sealed review, a row each, under its period; a rule stands where the program changed.
 *
 * Roles are written out: on a phone the style sheet makes a block of each row, and browsers then forget what it was.
 *
 * @param pictures - by name of the review
 * @param severalIntervals - whether reviews state their intervals at different levels
 */
export function reviewTable(periods: readonly ListedPeriod[], pictures: ReadonlyMap<string, Picture>, severalIntervals: boolean, words: Words): Element {
  const caption = words.say('archive-page-caption')
  const order = periods.flat()
  const bodies = periods.map((those) => h('tbody', { role: 'rowgroup' }, those.flatMap((review) => {
    const before = order[order.indexOf(review) - 1]
    const row = rowOf(review, { those, severalIntervals, words }, pictures.get(review.name))
    return before === undefined ? [row] : [...breakRow(before, review, words), row]
  })))
  return h('div.table', { role: 'group', ariaLabel: caption, tabIndex: 0 }, [
    h('table.table-archive', { role: 'table' }, [
      h('caption', caption),
      h('thead', { role: 'rowgroup' }, [h('tr', { role: 'row' }, columns.map(({ kind, head }) => h('th', { scope: 'col', role: 'columnheader', className: [`kind-${kind}`] }, words.say(head))))]),
      ...bodies,
    ]),
  ])
}

function rowOf(review: ListedReview, context: CellContext, picture: Picture | undefined): Element {
  const { figures } = review
  const { those, words } = context
  const cell = ({ name, kind, head }: Column, content: Content): Element => (
    h('td', { role: 'cell', className: [`kind-${kind}`, `in-${name}`], dataLabel: words.say(head) }, [...content])
  )
  return h('tr', { role: 'row', className: those[0] === review ? undefined : 'replaced' }, [
    h('th', { scope: 'row', role: 'rowheader', className: [`kind-${periodColumn.kind}`] }, [...periodCell(review, context)]),
    cell(stepsColumn, picture === undefined ? [] : [h('div', { dataChart: picture.spec.name, dataAlt: picture.alt })]),
    ...(typeof figures === 'string'
      ? [h('td.kind-text', { role: 'cell', colSpan: figureColumns.length }, [unreadText(figures, words)])]
      : figureColumns.map((column) => cell(column, column.cell(figures, context)))),
    cell(revisionColumn, revisionCell(review, context)),
    cell(sealedColumn, sealedCell(review, context)),
  ])
}

function breakRow(above: ListedReview, below: ListedReview, words: Words): readonly Element[] {
  const kind = breakBetween(above, below)
  if (kind === null) return []
  const text = words.say('archive-page-break', { kind, above: above.manifest.program.version, below: below.manifest.program.version })
  return [h('tr.break', { role: 'row' }, [h('td', { role: 'cell', colSpan: columns.length }, text)])]
}
