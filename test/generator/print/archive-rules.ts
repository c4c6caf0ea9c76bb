import { PDFDict, PDFHexString, PDFName, PDFRef, PDFString } from '@cantoo/pdf-lib'
import { operationsOf } from '../../../generator/print/content-stream.ts'
import { annotationsOf, contentOf, dictionaries, dictionary, items, key, ofType, streamBytes, textOf, written, type OpenPdf, type Rule } from './pdf-objects.ts'

/** Operators of ISO 32000-1, annex A, that a page may use: those of text and paths, and of colours only gray and RGB, which the output intent gives a meaning. */
const allowed = new Set('b B b* B* BDC BMC BT c cm d EMC ET f f* g G gs h i j J l m M n q Q re rg RG S s T* Tc Td TD Tf Tj TJ TL Tm Tr Ts Tw Tz v w W W* y \' "'.split(' '))
const blendModes = new Set('Normal Compatible Multiply Screen Overlay Darken Lighten ColorDodge ColorBurn HardLight SoftLight Difference Exclusion Hue Saturation Color Luminosity'.split(' '))

/** ISO 19005-3 (PDF/A-3), level B, as far as it concerns what a print has. */
export const archiveRules = {
  header: { clause: 'PDF/A-3 6.1.2', faults: ({ bytes }) => {
    const start = Buffer.from(bytes.subarray(0, 16))
    return [
      ...(/^%PDF-1\.[0-7][\r\n]/.test(start.toString('latin1')) ? [] : ['no header of PDF 1.0 to 1.7']),
      ...(start[9] === 0x25 && start.subarray(10, 14).every((byte) => byte > 127) ? [] : ['no comment of high bytes after it']),
    ]
  } },
  trailer: { clause: 'PDF/A-3 6.1.3', faults: ({ document }) => {
    const { ID, Encrypt } = document.context.trailerInfo
    return [...(items(ID).length === 2 ? [] : ['no file identifier']), ...(Encrypt === undefined ? [] : ['encrypted'])]
  } },
  limits: { clause: 'PDF/A-3 6.1.13', faults: ({ document }) => document.context.enumerateIndirectObjects().flatMap(([reference, object]) => [
    ...[...(dictionary(object)?.entries() ?? [])].flatMap(([name, value]) => [
      ...(name.asString().length > 128 ? [`${String(reference)}: name longer than 127 bytes`] : []),
      ...(value instanceof PDFString || value instanceof PDFHexString ? (value.asBytes().length > 32767 ? [`${String(reference)}: string longer than 32767 bytes`] : []) : []),
    ]),
  ]).concat(document.getPages().flatMap((page, at) => (deepestState(contentOf(page)) > 28 ? [`page ${at + 1}: q nested deeper than 28`] : []))) },
  streams: { clause: 'PDF/A-3 6.1.7', faults: ({ document }) => dictionaries(document).flatMap((dict) => [
    ...(/LZWDecode|Crypt/.test(written(dict, 'Filter')) ? ['filter that is not allowed'] : []),
    ...(dict.has(key('FFilter')) || dict.has(key('FDecodeParms')) ? ['stream outside the file'] : []),
  ]) },
  outputIntent: { clause: 'PDF/A-3 6.2.3', faults: ({ document }) => {
    const intents = items(document.catalog.lookup(key('OutputIntents'))).map((intent) => dictionary(intent)).filter((intent) => written(intent, 'S') === '/GTS_PDFA1')
    const stream = intents[0]?.lookup(key('DestOutputProfile'))
    const profile = streamBytes(stream)
    if (intents.length !== 1 || profile === undefined) return ['no output intent with a profile']
    const isDisplay = profile.toString('latin1', 12, 20) === 'mntrRGB ' && profile.toString('latin1', 36, 40) === 'acsp' && profile.readUInt32BE(0) === profile.length
    return [...(isDisplay && profile[8] <= 4 ? [] : ['profile of no RGB display']), ...(written(dictionary(stream), 'N') === '3' ? [] : ['profile not of 3 components'])]
  } },
  colours: { clause: 'PDF/A-3 6.2.2, 6.2.4.3', faults: ({ document }) => document.getPages().flatMap((page, at) => (
    [...new Set(operationsOf(contentOf(page)).map(({ operator }) => operator))].filter((operator) => !allowed.has(operator)).map((operator) => `page ${at + 1}: ${operator}`))) },
  transparency: { clause: 'PDF/A-3 6.2.5, 6.2.10', faults: ({ document }) => document.getPages().flatMap((page, at) => {
    const states = (page.node.Resources()?.lookupMaybe(key('ExtGState'), PDFDict)?.values() ?? []).map((state) => dictionary(document.context.lookup(state)))
    const shinesThrough = states.some((state) => Number(written(state, 'ca') || 1) < 1 || Number(written(state, 'CA') || 1) < 1)
    return [
      ...(shinesThrough && written(dictionary(page.node.lookup(key('Group'))), 'CS') === '' ? [`page ${at + 1}: transparent, and in no stated colour space`] : []),
      ...states.flatMap((state) => ['TR', 'TR2', 'HTP', 'HTO'].filter((name) => state?.has(key(name))).map((name) => `page ${at + 1}: ${name}`)),
      ...states.map((state) => written(state, 'BM').slice(1)).filter((mode) => mode !== '' && !blendModes.has(mode)).map((mode) => `page ${at + 1}: blend mode ${mode}`),
    ]
  }) },
  fonts: { clause: 'PDF/A-3 6.2.11', faults: ({ document }) => ofType(document, 'Font').flatMap((font) => {
    const name = written(font, 'BaseFont')
    if (written(font, 'Subtype') === '/Type0') return ['/Identity-H', '/Identity-V'].includes(written(font, 'Encoding')) ? [] : [`${name}: encoding not embedded`]
    const descriptor = font.lookupMaybe(key('FontDescriptor'), PDFDict)
    return [
      ...(written(font, 'Subtype') === '/CIDFontType2' ? [] : [`${name}: ${written(font, 'Subtype')}`]),
      ...(streamBytes(descriptor?.lookup(key('FontFile2'))) === undefined ? [`${name}: not embedded`] : []),
      ...(font.has(key('CIDToGIDMap')) ? [] : [`${name}: no CIDToGIDMap`]),
    ]
  }) },
  annotations: { clause: 'PDF/A-3 6.3', faults: ({ document }) => document.getPages().flatMap((page, at) => annotationsOf(page).flatMap((annotation) => [
    ...(written(annotation, 'Subtype') === '/Link' ? [] : [`page ${at + 1}: ${written(annotation, 'Subtype')}`]),
    // Print set; Invisible, Hidden, NoView, ToggleNoView not
    ...((Number(written(annotation, 'F')) & 0b1_0010_0111) === 0b100 ? [] : [`page ${at + 1}: flags ${written(annotation, 'F') || 'none'}`]),
  ])) },
  actions: { clause: 'PDF/A-3 6.5', faults: ({ document }) => dictionaries(document).flatMap((dict) => [
    ...(dict.has(key('AA')) || dict.has(key('JS')) ? ['additional action or script'] : []),
    ...[dict.lookup(key('A')), dict.lookup(key('OpenAction'))].map((action) => written(dictionary(action), 'S')).filter((kind) => kind !== '' && kind !== '/URI' && kind !== '/GoTo').map((kind) => `action ${kind}`),
  ]) },
  metadata: { clause: 'PDF/A-3 6.6', faults: ({ document }) => metadataFaults(document) },
  attachments: { clause: 'PDF/A-3 6.8', faults: ({ document }) => attachmentFaults(document) },
} as const satisfies Readonly<Record<string, Rule>>

function deepestState(content: string): number {
  let [depth, deepest] = [0, 0]
  for (const { operator } of operationsOf(content)) {
    if (operator === 'q') depth += 1
    if (operator === 'Q') depth -= 1
    deepest = Math.max(deepest, depth)
  }
  return deepest
}

const unescaped = (text: string | undefined): string | undefined => text?.replace(/&lt;/g, '<').replace(/&gt;/g, '>').replace(/&quot;/g, '"').replace(/&amp;/g, '&')

function metadataFaults(document: OpenPdf['document']): readonly string[] {
  const stream = document.catalog.lookup(key('Metadata'))
  const packet = streamBytes(stream)?.toString('utf8') ?? ''
  if (dictionary(stream)?.has(key('Filter')) !== false) return ['no plain metadata']
  const property = (name: string) => unescaped(new RegExp(`<${name}>(?:<rdf:(?:Alt|Seq)><rdf:li[^>]*>)?([^<]*)`).exec(packet)?.[1])
  const seconds = (date: Date | undefined) => date?.toISOString().replace('.000Z', 'Z')
  const expected = {
    'pdfaid:part': '3', 'pdfaid:conformance': 'B', 'dc:title': document.getTitle(), 'dc:creator': document.getAuthor(), 'xmp:CreatorTool': document.getCreator(),
    'pdf:Producer': document.getProducer(), 'xmp:CreateDate': seconds(document.getCreationDate()), 'xmp:ModifyDate': seconds(document.getModificationDate()),
  }
  return [
    ...Object.entries(expected).filter(([name, value]) => property(name) !== value).map(([name, value]) => `${name} is ${property(name) ?? 'missing'}, not ${value ?? 'missing'}`),
  ]
}

function attachmentFaults(document: OpenPdf['document']): readonly string[] {
  const { context, catalog } = document
  const tree = catalog.lookupMaybe(key('Names'), PDFDict)?.lookupMaybe(key('EmbeddedFiles'), PDFDict)
  const names = items(tree?.lookup(key('Names'))).map((name) => textOf(name)).filter((name) => name !== undefined)
  const associated = catalog.lookup(key('AF'))?.toString() ?? ''
  return [
    ...(names.every((name, at) => at === 0 || names[at - 1] < name) ? [] : ['names out of order']),
    ...context.enumerateIndirectObjects().flatMap(([reference, object]) => {
      const specification = dictionary(object)
      if (written(specification, 'Type') !== '/Filespec') return []
      const name = textOf(specification?.lookup(key('UF'))) ?? String(reference)
      const file = dictionary(dictionary(specification?.lookup(key('EF')))?.lookup(key('F')))
      const wants = (what: string, present: boolean) => (present ? [] : [`${name}: no ${what}`])
      return [
        ...wants('F beside UF', textOf(specification?.lookup(key('F'))) === name), ...wants('description', specification?.has(key('Desc')) === true),
        ...wants('relationship', /^\/(Source|Data|Alternative|Supplement|Unspecified)$/.test(written(specification, 'AFRelationship'))),
        ...wants('media type', file?.lookup(key('Subtype')) instanceof PDFName), ...wants('date', dictionary(file?.lookup(key('Params')))?.has(key('ModDate')) === true),
        ...wants('place among associated files', reference instanceof PDFRef && associated.includes(reference.toString())), ...wants('place in the name tree', names.includes(name)),
      ]
    }),
  ]
}
