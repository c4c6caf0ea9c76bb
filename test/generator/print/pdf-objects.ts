import { inflateSync } from 'node:zlib'
import { PDFArray, PDFDict, PDFHexString, PDFName, PDFRawStream, PDFString, type PDFDocument, type PDFObject, type PDFPage } from '@cantoo/pdf-lib'

/** One rule of a standard, looked for in a file. */
export interface Rule {
  /** Clause that it is in; clauses are named from memory. */
  readonly clause: string
  /** @returns what breaks the rule; nothing: it is kept */
  readonly faults: (pdf: OpenPdf) => readonly string[]
}

/** A PDF as bytes and as objects. */
export interface OpenPdf {
  readonly bytes: Uint8Array
  readonly document: PDFDocument
}

export const key = (name: string): PDFName => PDFName.of(name)

export function dictionary(object: PDFObject | undefined): PDFDict | undefined {
  return object instanceof PDFDict ? object : object instanceof PDFRawStream ? object.dict : undefined
}

export function textOf(object: PDFObject | undefined): string | undefined {
  return object instanceof PDFString || object instanceof PDFHexString ? object.decodeText() : undefined
}

/** Entry of a dictionary as it is written, e.g. `/Link`; absent: ''. */
export function written(dict: PDFDict | undefined, name: string): string {
  return dict?.lookup(key(name))?.toString() ?? ''
}

/** Every dictionary among the file's objects, those of streams included. */
export function dictionaries(document: PDFDocument): readonly PDFDict[] {
  return document.context.enumerateIndirectObjects().map(([, object]) => dictionary(object)).filter((dict) => dict !== undefined)
}

export function ofType(document: PDFDocument, type: string): readonly PDFDict[] {
  return dictionaries(document).filter((dict) => written(dict, 'Type') === `/${type}`)
}

export function contentOf(page: PDFPage): string {
  const stream = page.node.lookup(key('Contents'))
  if (!(stream instanceof PDFRawStream)) throw new Error('expected one stream a page')
  return (stream.dict.has(key('Filter')) ? Buffer.from(inflateSync(stream.getContents())) : Buffer.from(stream.getContents())).toString('latin1')
}

/** Bytes of a stream, inflated where it is deflated. */
export function streamBytes(object: PDFObject | undefined): Buffer | undefined {
  if (!(object instanceof PDFRawStream)) return undefined
  return Buffer.from(object.dict.has(key('Filter')) ? inflateSync(object.getContents()) : object.getContents())
}

export function annotationsOf(page: PDFPage): readonly PDFDict[] {
  const annotations = page.node.Annots()
  return annotations === undefined ? [] : annotations.asArray().map((_, at) => annotations.lookup(at, PDFDict))
}

export function items(object: PDFObject | undefined): readonly PDFObject[] {
  return object instanceof PDFArray ? object.asArray().map((_, at) => object.lookup(at)!) : []
}

/** Each text that is shown, with the resource name of its font: the codes, two bytes each, as fonts of Chromium have them. */
export function shownCodes(content: string): readonly { readonly font: string; readonly codes: readonly number[] }[] {
  const shown: { readonly font: string; readonly codes: readonly number[] }[] = []
  let font = ''
  for (const match of content.matchAll(/\/(\S+) \S+ Tf|<([0-9A-Fa-f]+)>(?=[^[\]]*?(?:Tj|\]))/g)) {
    if (match[1] !== undefined) font = match[1]
    else shown.push({ font, codes: (match[2].match(/.{4}/g) ?? []).map((code) => parseInt(code, 16)) })
  }
  return shown
}
