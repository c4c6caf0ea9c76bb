import { deflateSync } from 'node:zlib'
import { PDFDict, PDFHeader, PDFName, PDFNumber, PDFString, type PDFDocument } from '@cantoo/pdf-lib'
import { srgbProfile } from './srgb-profile.ts'
import { xmpPacket, type XmpFacts } from './xmp-packet.ts'

/**
 * What makes a print a PDF/A-3b besides its fonts, which Chromium embeds: the version that its features belong to, what its colours mean, and what
 * it says of itself in XMP.
 */
export function declareArchive(document: PDFDocument, facts: XmpFacts): void {
  const { context, catalog } = document
  // Chromium writes 1.4, and the tags and compressed object streams of 1.5
  context.header = PDFHeader.forVersion(1, 7)
  const profile = context.register(context.stream(deflateSync(srgbProfile()), { N: 3, Filter: 'FlateDecode' }))
  const colours = PDFString.of('sRGB IEC61966-2.1')
  catalog.set(PDFName.of('OutputIntents'), context.obj([{ Type: 'OutputIntent', S: 'GTS_PDFA1', OutputConditionIdentifier: colours, Info: colours, DestOutputProfile: profile }]))
  // not compressed: a program that knows no PDF finds it
  const metadata = context.stream(new TextEncoder().encode(xmpPacket(facts)), { Type: 'Metadata', Subtype: 'XML' })
  catalog.set(PDFName.of('Metadata'), context.register(metadata))
  for (const page of document.getPages()) {
    if (isTransparent(page.node.Resources())) page.node.set(PDFName.of('Group'), context.obj({ Type: 'Group', S: 'Transparency', CS: 'DeviceRGB' }))
  }
}

/** Whether a page may paint what shines through: then the colours are mixed in a stated space. */
function isTransparent(resources: PDFDict | undefined): boolean {
  const states = resources?.lookupMaybe(PDFName.of('ExtGState'), PDFDict)
  return (states?.keys() ?? []).some((name) => {
    const state = states?.lookup(name, PDFDict)
    return ['ca', 'CA'].some((key) => (state?.lookupMaybe(PDFName.of(key), PDFNumber)?.asNumber() ?? 1) < 1)
  })
}
