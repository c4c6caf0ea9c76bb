import type { RunningPart, RunningPlace, RunningText } from '../theme/running-text.ts'
import type { Paper, Theme } from '../theme/theme.ts'
import type { Words } from '../words/words.ts'
import { textWidth } from './charts/text-metrics.ts'
import type { Imprint } from './imprint.ts'

/** Width and height in mm: ISO 216, and ANSI/ASME Y14.1. */
const sizes = { A4: [210, 297], letter: [215.9, 279.4] } as const satisfies Readonly<Record<Paper, readonly [number, number]>>
const margins = { top: 21, sides: 20, bottom: 20, firstTop: 11, firstBottom: 16, cover: 26 } as const

/** Width of the text between the margins of a portrait page, whole px of 1/96 inch. */
export function textWidthOf(paper: Paper): number {
  return Math.floor(((sizes[paper][0] - 2 * margins.sides) / 25.4) * 96)
}

/** Stand in the wording where only the printer knows the number. */
const marks = { page: '⟨page⟩', pages: '⟨pages⟩' } as const

/**
 * The printed page: its size and margins, and what runs in them: by default the title on top from the second page on, `page x of y` below.
 * No custom property reaches a margin box, and the words differ from review to review, so this part of the style sheet is made for each.
 */
export function pageBoxes(theme: Theme, words: Words, title: string, imprint: Imprint): string {
  const said: Facts = { ...imprint, title }
  const face = `font-family:"${theme.chart.font}";font-size:8.5pt;color:${theme.chart.quiet};`
  const head = contentOf(theme.running.head ?? [{ place: 'title' }], said)
  const foot = contentOf(theme.running.foot ?? pageOf(words), said)
  const ground = theme.chart.paper === '#ffffff' ? '' : `background:${theme.chart.paper};`
  const bare = '@top-left{content:none}'
  const opening = `margin-top:${margins.firstTop}mm;margin-bottom:${margins.firstBottom}mm;${bare}`
  return [
    `@page{size:${theme.paper};margin:${margins.top}mm ${margins.sides}mm ${margins.bottom}mm;${ground}${face}`
    + `@top-left{content:${head};${face}vertical-align:middle}@bottom-right{content:${foot};${face}vertical-align:middle}}`,
    `@page landscape{size:${theme.paper} landscape;margin:18mm 16mm 16mm}`,
    theme.cover ? coverPage(theme.paper, opening) : `@page:first{${opening}}`,
    smallerFirstPage(theme),
  ].join('')
}

/** Ordinary prose, and its width in the house's typeface, em: what another typeface is compared with. */
export const prose = { text: 'The main reason: mentions in one venue, less kind than the rest, went from 33% to 40% of all.', width: 38.862 } as const

/** Text is set no smaller than this share of its usual size, though the first page then run over. */
const smallest = 0.85

/**
 * The first page is to serve a reader who reads nothing else, and to be one page: it is full on A4 in the house's typeface. On shorter paper, and in a wider
 * typeface, its text is set smaller; the chart keeps its size. The square root, since smaller text fills fewer lines as well as lower ones.
 */
function smallerFirstPage({ paper, advances }: Theme): string {
  const heightOf = (of: Paper): number => sizes[of][1] - margins.firstTop - margins.firstBottom
  const share = (heightOf(paper) / heightOf('A4')) * Math.sqrt(prose.width / textWidth(prose.text, { fontSize: 1 }, advances))
  return share > 0.995 ? '' : `@media print{.section-first-page{zoom:${Math.max(smallest, share).toFixed(3)}}}`
}

/** A cover comes first, and what was the first page keeps its shape by a name of its own. */
function coverPage(paper: Paper, opening: string): string {
  // a mm less, so that rounding makes no second page
  const height = Math.floor(sizes[paper][1] - margins.cover - margins.bottom) - 1
  return `@page cover{margin-top:${margins.cover}mm;@top-left{content:none}@bottom-right{content:none}}@page opening{${opening}}`
    + `:root{--cover-height:${height}mm}@media print{.section-first-page{page:opening}}`
}

type Facts = Readonly<Record<Exclude<RunningPlace, 'page' | 'pages'>, string>>

function contentOf(text: RunningText, said: Facts): string {
  return text.length === 0 ? 'none' : text.map((part) => partOf(part, said)).join(' ')
}

function partOf(part: RunningPart, said: Facts): string {
  if ('text' in part) return cssString(part.text)
  return part.place === 'page' || part.place === 'pages' ? `counter(${part.place})` : cssString(said[part.place])
}

/** The house's foot, as the catalogue words it. */
function pageOf(words: Words): RunningText {
  return words.say('page-of', { page: marks.page, pages: marks.pages }).split(/(⟨\w+⟩)/u).filter((part) => part !== '')
    .map((part): RunningPart => (part === marks.page ? { place: 'page' } : part === marks.pages ? { place: 'pages' } : { text: part }))
}

/** CSS Syntax 3, 4.3.5: everything but plain letters, digits and spaces is escaped, so that no title can end the string or the element. */
export function cssString(text: string): string {
  return `"${text.replace(/[^\p{L}\p{N} ]/gu, (character) => `\\${(character.codePointAt(0) ?? 0).toString(16)} `)}"`
}
