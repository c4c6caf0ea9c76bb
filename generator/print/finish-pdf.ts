import { createHash } from 'node:crypto'
import { PDFArray, PDFDict, PDFDocument, PDFHexString, PDFName, PDFString, ParseSpeeds } from '@cantoo/pdf-lib'
import { markArtifacts } from './mark-artifacts.ts'

/** What the file says of itself. */
export interface PdfFacts {
  readonly title: string
  readonly author: string
  /** ISO date of the review, e.g. the last day of its period: both dates of the file. */
  readonly date: string
  /** BCP 47, e.g. `en-GB`. */
  readonly language: string
}

/** Read a print, its dates untouched, without pausing: nothing else waits in this process. */
export async function readPdf(pdf: Uint8Array): Promise<PDFDocument> {
  return PDFDocument.load(pdf, { updateMetadata: false, parseSpeed: ParseSpeeds.Fastest })
}

/**
 * Finish a print: dates and file identifier from the review instead of the clock, title, author and language, the running head marked as
 * no part of the text, a description on every link, and no Figure but the pictures.
 *
 * @param document - a tagged print by Chromium, as `readPdf` reads it; changed in place
 * @param html - what was printed: the file's identifier is made from it and the facts
 * @returns the same bytes for the same input
 */
export async function finishPdf(document: PDFDocument, html: string, facts: PdfFacts): Promise<Uint8Array> {
  const date = new Date(`${facts.date}T00:00:00Z`)
  document.setTitle(facts.title, { showInWindowTitleBar: true })
  document.setAuthor(facts.author)
  document.setLanguage(facts.language)
  document.setCreator('Tareline')
  document.setCreationDate(date)
  document.setModificationDate(date)
  for (const page of document.getPages()) markArtifacts(document.context, page.node)
  describeLinks(document)
  keepPictures(document)
  const identifier = PDFHexString.of(createHash('md5').update(html).update(JSON.stringify(facts)).digest('hex'))
  const identifiers = PDFArray.withContext(document.context)
  identifiers.push(identifier)
  identifiers.push(identifier)
  document.context.trailerInfo.ID = identifiers
  return document.save({ addDefaultPage: false, updateFieldAppearances: false, objectsPerTick: Infinity })
}

/**
 * PDF/UA-1, 7.3: a Figure has a text alternative. Chromium makes one of the picture, which has it, and one of the frame with the caption around it,
 * which has none: the frame becomes a plain division.
 */
function keepPictures(document: PDFDocument): void {
  for (const [, object] of document.context.enumerateIndirectObjects()) {
    if (!(object instanceof PDFDict) || object.get(PDFName.of('S')) !== PDFName.of('Figure')) continue
    if (!object.has(PDFName.of('Alt'))) object.set(PDFName.of('S'), PDFName.of('Div'))
  }
}

/** PDF/UA-1, 7.18.5: a link says where it leads; Chromium leaves it out. */
function describeLinks(document: PDFDocument): void {
  for (const page of document.getPages()) {
    const annotations = page.node.Annots()
    for (let index = 0; index < (annotations?.size() ?? 0); index += 1) {
      const annotation = annotations?.lookup(index, PDFDict)
      if (annotation === undefined || annotation.get(PDFName.of('Subtype')) !== PDFName.of('Link')) continue
      annotation.set(PDFName.of('Contents'), PDFHexString.fromText(destination(annotation)))
    }
  }
}

function destination(annotation: PDFDict): string {
  const action = annotation.lookupMaybe(PDFName.of('A'), PDFDict)
  const address = action?.lookup(PDFName.of('URI'))
  if (address instanceof PDFString || address instanceof PDFHexString) return address.decodeText()
  const target = annotation.lookup(PDFName.of('Dest'))
  return target instanceof PDFName ? target.decodeText() : ''
}
