import type { Element } from 'hast'
import { toString } from 'hast-util-to-string'
import { visit } from 'unist-util-visit'
import { textWidth } from './charts/text-metrics.ts'
import type { AdvanceTable, Paper } from '../theme/theme.ts'
import { textWidthOf } from './page-boxes.ts'

/** Of paper.css: the size of a table's type, the room before a column; px. */
const portrait = { fontSize: 11.33, padding: 12 } as const
/** Columns of text may break between words; below this they look broken, and tables.css lets none get below the least. */
const narrowestText = 100
const leastText = 75

/**
 * Whether a table fits between the margins of a portrait page without breaking a figure.
 *
 * @param region - the table with what is around it; a cell's class says the kind of its column
 * @param paper - whose margins
 */
export function fitsPortrait(region: Element, advances: AdvanceTable, paper: Paper = 'A4'): boolean {
  const widths: number[] = []
  visit(region, 'element', (row) => {
    if (row.tagName !== 'tr') return
    cellsOf(row).forEach((cell, column) => { widths[column] = Math.max(widths[column] ?? 0, needed(cell, advances)) })
  })
  return widths.reduce((sum, width) => sum + width, 0) + portrait.padding * (widths.length - 1) <= textWidthOf(paper)
}

function cellsOf(row: Element): readonly Element[] {
  return row.children.filter((child): child is Element => child.type === 'element' && (child.tagName === 'th' || child.tagName === 'td'))
}

function needed(cell: Element, advances: AdvanceTable): number {
  const text = toString(cell)
  const isHeader = cell.properties.scope === 'col'
  const width = (part: string) => textWidth(part, { fontSize: portrait.fontSize, fontWeight: isHeader ? 600 : 400 }, advances)
  if (isHeader) return Math.max(...text.split(/\s+/).map(width))
  const { className } = cell.properties
  const breaks = Array.isArray(className) && className.includes('kind-text')
  return breaks ? Math.max(leastText, Math.min(width(text), narrowestText)) : width(text)
}
