import { createHash } from 'node:crypto'
import { PDFArray, PDFDocument, PDFHexString, ParseSpeeds } from '@cantoo/pdf-lib'
import { attachFiles, type Attachment } from './attach-files.ts'
import { declareArchive } from './declare-archive.ts'
import { markArtifacts } from './mark-artifacts.ts'
import { mendStructure } from './mend-structure.ts'
import { plainText } from './xmp-packet.ts'

/** What the file says of itself. */
export interface PdfFacts {
  readonly title: string
  readonly author: string
  /** ISO date of the review, e.g. the last day of its period: every date in the file. */
  readonly date: string
  /** BCP 47, e.g. `en-GB`. */
  readonly language: string
}

/** What a file is made of. */
export interface Finishing {
  /** What was printed. */
  readonly html: string
  readonly facts: PdfFacts
  readonly attachments: readonly Attachment[]
  /** Text of the heading that each target of a link inside the document stands for, by id. */
  readonly names: ReadonlyMap<string, string>
}

/** Read a print, its dates untouched, without pausing: nothing else waits in this process. */
export async function readPdf(pdf: Uint8Array): Promise<PDFDocument> {
  return PDFDocument.load(pdf, { updateMetadata: false, parseSpeed: ParseSpeeds.Fastest })
}

const creator = 'Tareline'

/**
 * Finish a print as a PDF/A-3b tagged for PDF/UA-1: dates and file identifier from the review instead of the clock, title, author and language,
 * decoration marked as no part of the text, the structure mended, files attached.
 *
 * @param document - a tagged print by Chromium, as `readPdf` reads it; changed in place
 * @returns the same bytes for the same input
 */
export async function finishPdf(document: PDFDocument, { html, facts, attachments, names }: Finishing): Promise<Uint8Array> {
  const date = new Date(`${facts.date}T00:00:00Z`)
  const [title, author] = [plainText(facts.title), plainText(facts.author)]
  document.setTitle(title, { showInWindowTitleBar: true })
  document.setAuthor(author)
  document.setLanguage(facts.language)
  document.setCreator(creator)
  document.setCreationDate(date)
  document.setModificationDate(date)
  for (const page of document.getPages()) markArtifacts(document, page)
  mendStructure(document, names)
  const ordered = [...attachments].sort((a, b) => (a.name < b.name ? -1 : 1))
  attachFiles(document, ordered, date)
  declareArchive(document, { title, author, language: facts.language, date: `${facts.date}T00:00:00Z`, creator, producer: document.getProducer() ?? '' })
  identify(document, createHash('md5').update(html).update(JSON.stringify(facts)), ordered)
  return document.save({ addDefaultPage: false, updateFieldAppearances: false, objectsPerTick: Infinity })
}

/** The file's two identifiers: the same for the same contents. */
function identify({ context }: PDFDocument, hash: ReturnType<typeof createHash>, attachments: readonly Attachment[]): void {
  for (const { bytes, ...told } of attachments) hash.update(JSON.stringify(told)).update(bytes)
  const identifier = PDFHexString.of(hash.digest('hex'))
  const identifiers = PDFArray.withContext(context)
  identifiers.push(identifier)
  identifiers.push(identifier)
  context.trailerInfo.ID = identifiers
}
