import { inflateSync, deflateSync } from 'node:zlib'
import { type PDFContext, PDFArray, PDFName, type PDFPageLeaf, PDFRawStream, type PDFRef } from '@cantoo/pdf-lib'
import { operationsOf, type Operation } from './content-stream.ts'

/**
 * Mark what a page paints outside any tagged content as artifact (ISO 32000-1, 14.8.2.2): running heads, page numbers, rules and backgrounds.
 * Chromium leaves the text of margin boxes unmarked, and a screen reader would read it in the middle of a sentence.
 */
export function markArtifacts(context: PDFContext, page: PDFPageLeaf): void {
  const contents = page.get(PDFName.of('Contents'))
  const single = contents instanceof PDFArray ? undefined : context.lookup(contents)
  if (!(single instanceof PDFRawStream)) return
  const filter = single.dict.get(PDFName.of('Filter'))
  // An empty page has a stream without a filter; with any other filter the stream is left as it is.
  if (filter !== undefined && filter !== PDFName.of('FlateDecode')) return
  const bytes = filter === undefined ? single.getContents() : inflateSync(single.getContents())
  const source = Buffer.from(bytes).toString('latin1')
  const marked = deflateSync(Buffer.from(withArtifacts(source), 'latin1'), { level: 6 })
  const stream = context.stream(marked, { Filter: 'FlateDecode' })
  context.assign(contents as PDFRef, stream)
}

const paints = new Set(['f', 'F', 'f*', 'B', 'B*', 'b', 'b*', 'S', 's', 'Do', 'sh'])
const drawsPath = new Set(['m', 're'])

/**
 * @param source - a page's content stream
 * @returns the same with `/Artifact BMC ... EMC` around every text object and every painted path outside marked content
 */
export function withArtifacts(source: string): string {
  const operations = operationsOf(source)
  const pieces: string[] = []
  let written = 0
  let depth = 0
  for (let index = 0; index < operations.length; index += 1) {
    const { operator } = operations[index]
    if (operator === 'BDC' || operator === 'BMC') { depth += 1; continue }
    if (operator === 'EMC') { depth -= 1; continue }
    if (depth > 0) continue
    const last = endOfUnmarked(operations, index)
    if (last === null) continue
    pieces.push(source.slice(written, operations[index].start), '/Artifact BMC\n', source.slice(operations[index].start, operations[last].end), '\nEMC')
    written = operations[last].end
    index = last
  }
  return pieces.join('') + source.slice(written)
}

const continuesPath = new Set(['m', 'l', 'c', 'v', 'y', 'h', 're'])

/** Index of the operation that ends what begins at `from`, if it paints and nothing inside is tagged already; else null. */
function endOfUnmarked(operations: readonly Operation[], from: number): number | null {
  const { operator } = operations[from]
  if (paints.has(operator)) return from
  let end = from + 1
  if (operator === 'BT') {
    while (end < operations.length && operations[end].operator !== 'ET') {
      if (operations[end].operator === 'BDC' || operations[end].operator === 'BMC') return null
      end += 1
    }
    return end < operations.length ? end : null
  }
  if (!drawsPath.has(operator)) return null
  while (end < operations.length && continuesPath.has(operations[end].operator)) end += 1
  return end < operations.length && paints.has(operations[end].operator) ? end : null
}
