import type { Element, Properties, Root } from 'hast'
import { h } from 'hastscript'
import { visit } from 'unist-util-visit'
import { hasLongWords, tableForm } from './table-width.ts'
import type { Theme } from '../theme/theme.ts'

const fewColumns = 4
const fewRows = 16

/** Where a chart goes: the element that holds it, and which. */
export interface DrawingPlace {
  readonly chart: string
  /** Unique in the page, also where a chart is shown twice. */
  readonly id: string
  /** The computed text alternative. */
  readonly alt: string
}

/**
 * Make compose's tree ready for the page: each chart's frame gets the place of its drawing; tables are
 * marked by their size; each place of a page number says whose it waits for.
 *
 * @returns a new tree, and the places to be drawn in, in order
 */
export function prepareTree(tree: Root, theme: Pick<Theme, 'advances' | 'paper'>): { readonly tree: Root, readonly places: readonly DrawingPlace[] } {
  const prepared = structuredClone(tree)
  const places: DrawingPlace[] = []
  visit(prepared, 'element', (element) => {
    if (typeof element.properties.dataChart === 'string') places.push(frameDrawing(element, element.properties.dataChart, places))
    if (element.tagName === 'div' && hasClass(element, 'table')) markTable(element, theme)
    if (element.tagName === 'a') awaitPageNumber(element)
  })
  return { tree: prepared, places }
}

function frameDrawing(figure: Element, chart: string, before: readonly DrawingPlace[]): DrawingPlace {
  const times = before.filter((place) => place.chart === chart).length
  const id = times === 0 ? chart : `${chart}-${times + 1}`
  const { dataAlt } = figure.properties
  // ARIA in HTML allows no role on a figure with a caption.
  figure.properties = without(figure.properties, ['dataChart', 'dataAlt', 'role'])
  figure.children.push(h('div.drawing', { dataDrawing: id }))
  return { chart, id, alt: typeof dataAlt === 'string' ? dataAlt : '' }
}

const formClasses = { portrait: [], tight: ['tight'], landscape: ['wide'] } as const

/** What the style sheet cannot count: columns that need smaller type or a landscape page, so few that they stand closer, so few rows that no page break is needed, words that have to be cut. */
function classesOf(region: Element, theme: Pick<Theme, 'advances' | 'paper'>): readonly string[] {
  let [columns, rows] = [0, 0]
  visit(region, 'element', (element) => {
    if (element.tagName === 'th' && element.properties.scope === 'col') columns += 1
    if (element.tagName === 'tr') rows += 1
  })
  return [
    ...formClasses[tableForm(region, theme.advances, theme.paper)], ...(columns <= fewColumns ? ['few-columns'] : []), ...(rows <= fewRows ? ['few-rows'] : []),
    ...(hasLongWords(region, theme.advances) ? ['long-words'] : []),
  ]
}

function markTable(region: Element, theme: Pick<Theme, 'advances' | 'paper'>): void {
  region.properties = { ...without(region.properties, ['dataTable']), className: ['table', ...classesOf(region, theme)] }
}

function awaitPageNumber(link: Element): void {
  const { href } = link.properties
  if (typeof href !== 'string') return
  visit(link, 'element', (place) => {
    if (hasClass(place, 'page')) place.properties = { ...place.properties, dataPageOf: href.replace(/^#/, '') }
  })
}

function without(properties: Properties, names: readonly string[]): Properties {
  return Object.fromEntries(Object.entries(properties).filter(([name]) => !names.includes(name)))
}

function hasClass(element: Element, name: string): boolean {
  const { className } = element.properties
  return Array.isArray(className) && className.includes(name)
}
