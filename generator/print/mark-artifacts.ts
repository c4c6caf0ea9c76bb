import { inflateSync, deflateSync } from 'node:zlib'
import { PDFArray, type PDFDocument, PDFName, type PDFPage, PDFRawStream, type PDFRef } from '@cantoo/pdf-lib'
import { operationsOf, type Operation } from './content-stream.ts'
import { childrenOf, parentOf, roleOf, tagsOf, type Element, type PageTags } from './tags.ts'

/**
 * Mark what is no part of the text as artifact (ISO 32000-1, 14.8.2.2): what a page paints outside any tagged content, that is running heads, page
 * numbers and backgrounds; and what Chromium tags though it is decoration: borders of cells and headings, and the head of a table once more on its
 * next page. A screen reader would read them in the middle of a sentence.
 */
export function markArtifacts(document: PDFDocument, page: PDFPage): void {
  const { context } = document
  const contents = page.node.get(PDFName.of('Contents'))
  const single = contents instanceof PDFArray ? undefined : context.lookup(contents)
  if (!(single instanceof PDFRawStream)) return
  const filter = single.dict.get(PDFName.of('Filter'))
  // An empty page has a stream without a filter; with any other filter the stream is left as it is.
  if (filter !== undefined && filter !== PDFName.of('FlateDecode')) return
  const bytes = filter === undefined ? single.getContents() : inflateSync(single.getContents())
  const source = Buffer.from(bytes).toString('latin1')
  const tags = tagsOf(document, page)
  const marked = withArtifacts(source, page.getHeight(), (content, painted) => released(tags, content, painted))
  context.assign(contents as PDFRef, context.stream(deflateSync(Buffer.from(marked, 'latin1'), { level: 6 }), { Filter: 'FlateDecode' }))
}

/** What a sequence of tagged content paints. */
export interface Painted {
  readonly text: boolean
  readonly image: boolean
}

const layout = '/Artifact BMC'
const pagination = '/Artifact <</Type /Pagination >>BDC'

/** Take decoration out of the structure tree; @returns what it is to be marked as instead, or null for what is text or picture. */
function released(tags: PageTags, content: number, painted: Painted): string | null {
  const element = tags.elementOf(content)
  if (element === undefined) return null
  const artifact = artifactOf(element, painted, () => tags.continues(content))
  if (artifact !== null) tags.release(content)
  return artifact
}

function artifactOf(element: Element, { text, image }: Painted, continues: () => boolean): string | null {
  // the lines of a chart are the chart, and the bullet of a list is its label
  if (!text && !image) return ['Figure', 'Lbl'].includes(roleOf(element)) ? null : layout
  return standsInHead(element) && continues() ? pagination : null
}

function standsInHead(element: Element): boolean {
  for (let at: Element | undefined = element; at !== undefined; at = parentOf(at)) {
    if (roleOf(at) === 'TR') return childrenOf(at).every((cell) => roleOf(cell) === 'TH')
  }
  return false
}

const paints = new Set(['f', 'F', 'f*', 'B', 'B*', 'b', 'b*', 'S', 's', 'Do', 'sh'])
const showsText = new Set(['Tj', 'TJ', '\'', '"'])
const drawsPath = new Set(['m', 're'])

/** A stretch of the source, from `start` up to `end`, and what stands there instead. */
interface Edit {
  readonly start: number
  readonly end: number
  readonly text: string
}

/**
 * @param source - a page's content stream
 * @param height - of the page, in points: text outside marked content is a header in its upper half, else a footer
 * @param release - asked about each sequence of tagged content: what it is to be marked as instead, null: it stays
 * @returns the same with `/Artifact ... EMC` around every text object and every painted path outside marked content, and around what was released
 */
export function withArtifacts(source: string, height: number, release: (content: number, painted: Painted) => string | null): string {
  const operations = operationsOf(source)
  const edits: Edit[] = []
  for (let index = 0; index < operations.length; index += 1) {
    const first = operations[index]
    if (opens(first)) {
      const last = endOfMarked(operations, index)
      const content = /\/MCID (\d+)/.exec(source.slice(first.start, first.end))
      const artifact = content === null ? null : release(Number(content[1]), paintedBy(operations, index, last))
      if (artifact !== null) edits.push({ start: first.start, end: first.end, text: artifact })
      index = last
      continue
    }
    const last = endOfUnmarked(source, operations, index)
    if (last === null) continue
    const { end } = operations[last]
    const opener = first.operator === 'BT' ? runningText(source.slice(first.start, end), height) : layout
    edits.push({ start: first.start, end: first.start, text: `${opener}\n` }, { start: end, end, text: '\nEMC' })
    index = last
  }
  return edited(source, edits)
}

function edited(source: string, edits: readonly Edit[]): string {
  const pieces: string[] = []
  let written = 0
  for (const { start, end, text } of edits) {
    pieces.push(source.slice(written, start), text)
    written = end
  }
  return pieces.join('') + source.slice(written)
}

/** Points in a CSS pixel; margin boxes are laid out in pixels of the whole page. */
const pixel = 0.75

function runningText(text: string, height: number): string {
  const down = /1 0 0 -1 \S+ (\S+) Tm/.exec(text)
  if (down === null) return layout
  return `/Artifact <</Type /Pagination /Subtype /${Number(down[1]) * pixel < height / 2 ? 'Header' : 'Footer'} >>BDC`
}

function opens({ operator }: Operation): boolean {
  return operator === 'BDC' || operator === 'BMC'
}

/** Index of the EMC that closes what is opened at `from`. */
function endOfMarked(operations: readonly Operation[], from: number): number {
  let depth = 0
  for (let index = from; index < operations.length; index += 1) {
    if (opens(operations[index])) depth += 1
    else if (operations[index].operator === 'EMC') depth -= 1
    if (depth === 0) return index
  }
  return operations.length - 1
}

function paintedBy(operations: readonly Operation[], from: number, to: number): Painted {
  let [text, image] = [false, false]
  for (let index = from; index < to; index += 1) {
    const { operator } = operations[index]
    text ||= showsText.has(operator)
    image ||= operator === 'Do' || operator === 'sh'
  }
  return { text, image }
}

const continuesPath = new Set(['m', 'l', 'c', 'v', 'y', 'h', 're'])

/** Index of the operation that ends what begins at `from`, if it paints and nothing inside is tagged already; else null. */
function endOfUnmarked(source: string, operations: readonly Operation[], from: number): number | null {
  const { operator } = operations[from]
  if (paints.has(operator)) return from
  let end = from + 1
  if (operator === 'BT') {
    while (end < operations.length && operations[end].operator !== 'ET') {
      // the letters of a ligature may stand in a span of their own
      if (opens(operations[end]) && !source.slice(operations[end].start, operations[end].end).includes('/ActualText')) return null
      end += 1
    }
    return end < operations.length ? end : null
  }
  if (!drawsPath.has(operator)) return null
  while (end < operations.length && continuesPath.has(operations[end].operator)) end += 1
  return end < operations.length && paints.has(operations[end].operator) ? end : null
}
