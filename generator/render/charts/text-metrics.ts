import { textMetrics } from 'vega'
import type { AdvanceTable } from '../../theme/theme.ts'

export interface TextStyle {
  readonly fontSize?: number
  readonly fontWeight?: string | number
}

/**
 * Width of one line of text in px.
 *
 * @param table - advance widths of the embedded font, thousandths of an em; a character it lacks counts as wide as `m`
 */
export function textWidth(text: string, style: TextStyle, table: AdvanceTable): number {
  const advances = table.advances[String(faceWeight(style.fontWeight))]
  const unknown = advances[table.characters.indexOf('m')]
  let sum = 0
  for (const character of text) {
    const index = table.characters.indexOf(character)
    sum += index < 0 ? unknown : advances[index]
  }
  return (sum / table.perEm) * (style.fontSize ?? 11)
}

function faceWeight(weight: string | number | undefined): 400 | 600 | 700 {
  if (weight === 'bold') return 700
  const number = Number(weight)
  if (!(number > 400)) return 400
  return number > 600 ? 700 : 600
}

/**
 * Let vega measure text by the embedded font. There is no canvas on a server, and vega's own estimate is 73 % too wide on average.
 * This is vega's one global: it is set before every drawing, so that no drawing depends on what was drawn before.
 */
export function measureBy(table: AdvanceTable): void {
  textMetrics.width = (item: TextStyle & { readonly limit?: number }, text: unknown) => textWidth(text === null || text === undefined ? '' : String(text), item, table)
}

/**
 * Break a label into lines no wider than `limit`, between words; a single word that is wider stays whole.
 *
 * @returns the lines, joined by line feeds
 */
export function wrapLabel(label: string, limit: number, style: TextStyle, table: AdvanceTable): string {
  const lines: string[] = []
  for (const word of label.split(/\s+/)) {
    const longer = lines.length === 0 ? word : `${lines[lines.length - 1]} ${word}`
    if (lines.length > 0 && textWidth(longer, style, table) <= limit) lines[lines.length - 1] = longer
    else lines.push(word)
  }
  return lines.join('\n')
}
