import type { Element } from 'hast'
import { toString } from 'hast-util-to-string'
import { visit } from 'unist-util-visit'
import { type TextStyle, textWidth } from './charts/text-metrics.ts'
import type { AdvanceTable, Paper } from '../theme/theme.ts'
import { textWidthOf } from './page-boxes.ts'

/** Of paper.css: the size of a table's type, the room before a column; px. */
const portrait = { fontSize: 11.33, padding: 12 } as const
const tight = { fontSize: 10, padding: 8 } as const
/** Columns of text may break between words; below this they look broken, and tables.css lets none get below the least. */
const narrowestText = 100
const leastText = 75
/** A word wider than this is cut, so that it does not make the table wider than the page. */
const longestWord = 160

/** What a line may break at: spaces, soft hyphens, and after a hyphen or a slash. */
const breaks = /[\s\u00ad]+|(?<=[-/])/

/**
 * How a table stands between the margins of a portrait page without breaking a figure: as it is (`portrait`), with smaller type and less room between its
 * columns (`tight`), or not at all (`landscape`).
 *
 * @param region - the table with what is around it; a cell's class says the kind of its column
 * @param paper - whose margins
 */
export function tableForm(region: Element, advances: AdvanceTable, paper: Paper = 'A4'): 'portrait' | 'tight' | 'landscape' {
  const widths: number[] = []
  visit(region, 'element', (row) => {
    if (row.tagName !== 'tr') return
    cellsOf(row).forEach((cell, column) => { widths[column] = Math.max(widths[column] ?? 0, needed(cell, advances)) })
  })
  const width = widths.reduce((sum, of) => sum + of, 0)
  const fits = ({ fontSize, padding }: typeof portrait | typeof tight) => width * fontSize / portrait.fontSize + padding * (widths.length - 1) <= textWidthOf(paper)
  if (fits(portrait)) return 'portrait'
  return fits(tight) ? 'tight' : 'landscape'
}

/** Whether a column of text holds a word so long that it has to be cut. */
export function hasLongWords(region: Element, advances: AdvanceTable): boolean {
  let found = false
  visit(region, 'element', (cell) => {
    if ((cell.tagName === 'td' || cell.tagName === 'th') && isText(cell) && widestWord(toString(cell), body, advances) > longestWord) found = true
  })
  return found
}

function isText({ properties: { className } }: Element): boolean {
  return Array.isArray(className) && className.includes('kind-text')
}

const body = { fontSize: portrait.fontSize, fontWeight: 400 } as const
const head = { fontSize: portrait.fontSize, fontWeight: 600 } as const

/** Of the parts that a line holds at least; one that ends in a soft hyphen shows a hyphen. */
function widestWord(text: string, style: TextStyle, advances: AdvanceTable): number {
  return Math.max(...text.split('\u00ad').join('-\u00ad').split(breaks).map((word) => textWidth(word, style, advances)))
}

function cellsOf(row: Element): readonly Element[] {
  return row.children.filter((child): child is Element => child.type === 'element' && (child.tagName === 'th' || child.tagName === 'td'))
}

function needed(cell: Element, advances: AdvanceTable): number {
  const text = toString(cell)
  if (cell.properties.scope === 'col') return widestWord(text, head, advances)
  const width = textWidth(text, body, advances)
  return isText(cell) ? Math.max(leastText, Math.min(width, narrowestText), Math.min(widestWord(text, body, advances), longestWord)) : width
}
