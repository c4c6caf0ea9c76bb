import { createHash } from 'node:crypto'
import { deflateSync } from 'node:zlib'
import { PDFDict, PDFHexString, PDFName, PDFString, type PDFDocument, type PDFRef } from '@cantoo/pdf-lib'

/** A file within the PDF. */
export interface Attachment {
  /** Letters and digits of ASCII, points, hyphens, underscores; no folder, since viewers save the file under this name. */
  readonly name: string
  /** Media type, e.g. `text/csv`. */
  readonly mime: string
  /** One line for people, in the review's language. */
  readonly description: string
  /** What the file is to the document (ISO 19005-3, annex E); `Data`: what its pictures and tables are drawn from. */
  readonly relationship: 'Data' | 'Source' | 'Alternative' | 'Supplement' | 'Unspecified'
  readonly bytes: Uint8Array
}

/**
 * Attach files as PDF/A-3 asks (ISO 19005-3, 6.8): each with media type, date, relationship, named in the name tree, and associated
 * with the document as a whole.
 *
 * @param attachments - in order of name
 * @param date - of the review: that of every file
 */
export function attachFiles(document: PDFDocument, attachments: readonly Attachment[], date: Date): void {
  if (attachments.length === 0) return
  const odd = attachments.find(({ name }) => !/^[\w.-]+$/.test(name))
  if (odd !== undefined) throw new Error(`Unexpected name "${odd.name}" of an attached file, expected letters, digits, points, hyphens and underscores`)
  const specifications = attachments.map((attachment) => attach(document, attachment, date))
  const { context, catalog } = document
  const names = catalog.lookupMaybe(PDFName.of('Names'), PDFDict) ?? context.obj({})
  const tree = { Names: attachments.flatMap(({ name }, i) => [PDFString.of(name), specifications[i]]) }
  names.set(PDFName.of('EmbeddedFiles'), context.register(context.obj(tree)))
  catalog.set(PDFName.of('Names'), names)
  catalog.set(PDFName.of('AF'), context.obj(specifications))
}

function attach({ context }: PDFDocument, { name, mime, description, relationship, bytes }: Attachment, date: Date): PDFRef {
  const file = context.register(context.stream(deflateSync(bytes), {
    Type: 'EmbeddedFile', Subtype: mime, Filter: 'FlateDecode',
    Params: {
      Size: bytes.length, ModDate: PDFString.fromDate(date), CreationDate: PDFString.fromDate(date),
      CheckSum: PDFHexString.of(createHash('md5').update(bytes).digest('hex')),
    },
  }))
  return context.register(context.obj({
    Type: 'Filespec', F: PDFString.of(name), UF: PDFHexString.fromText(name), EF: { F: file, UF: file },
    Desc: PDFHexString.fromText(description), AFRelationship: relationship,
  }))
}
