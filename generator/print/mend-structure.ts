import { PDFDict, type PDFDocument, PDFHexString, PDFName, PDFRef, PDFString } from '@cantoo/pdf-lib'
import { plainName } from './page-numbers.ts'
import { childrenOf, elementsOf, kidsOf, parentOf, roleOf, wrap, type Element } from './tags.ts'

/**
 * Bring Chromium's structure tree to what ISO 32000-1, 14.8.4 and PDF/UA-1 ask for: roles of PDF 1.7, pictures with a text alternative, lists whose
 * items have a label and a body, links that say where they lead.
 *
 * @param names - text of the heading that each target of a link inside the document stands for, by id
 */
export function mendStructure(document: PDFDocument, names: ReadonlyMap<string, string>): void {
  const references = new Map<PDFDict, PDFRef>()
  for (const [reference, object] of document.context.enumerateIndirectObjects()) if (object instanceof PDFDict) references.set(object, reference)
  for (const element of elementsOf(document)) {
    const role = roleOf(element)
    if (role === 'Figure') keepPicture(element)
    if (role === 'Lbl') nameBullet(element)
    if (role === 'LI') giveBody(element, references.get(element)!)
  }
  mapRoles(document)
  describeLinks(document, names)
}

/** Roles that Chromium takes from PDF 2.0, and what they are in PDF 1.7. */
const newRoles = { Strong: 'Span', Em: 'Span' }

/** PDF/UA-1, 7.1: a role that is no standard one is mapped to one that is. */
function mapRoles({ catalog, context }: PDFDocument): void {
  catalog.lookupMaybe(PDFName.of('StructTreeRoot'), PDFDict)?.set(PDFName.of('RoleMap'), context.obj(newRoles))
}

/**
 * PDF/UA-1, 7.3: a Figure has a text alternative. Chromium makes one of the picture, which has it, and one of the frame with the caption around it,
 * which has none: the frame becomes a plain division, and the caption a paragraph in it.
 */
function keepPicture(element: Element): void {
  if (element.has(PDFName.of('Alt'))) return
  setRole(element, 'Div')
  for (const child of childrenOf(element)) if (roleOf(child) === 'Caption') setRole(child, 'P')
}

function setRole(element: Element, role: string): void {
  element.set(PDFName.of('S'), PDFName.of(role))
}

/** The bullets of a list without numbers are painted as a path: said to be what they look like. */
function nameBullet(element: Element): void {
  const list = parentOf(element) === undefined ? undefined : parentOf(parentOf(element)!)
  if (list !== undefined && /\/ListNumbering \/(Disc|Circle|Square)/.test(list.lookup(PDFName.of('A'))?.toString() ?? '')) {
    element.set(PDFName.of('ActualText'), PDFHexString.fromText('\u2022'))
  }
}

/** ISO 32000-1, 14.8.4.3.3: what is not the label of an item is its body. */
function giveBody(item: Element, reference: PDFRef): void {
  const loose = kidsOf(item).filter((kid) => {
    const child = item.context.lookup(kid)
    return kid instanceof PDFRef && child instanceof PDFDict && child.has(PDFName.of('S')) && !['Lbl', 'LBody'].includes(roleOf(child))
  })
  if (loose.length > 0) wrap(item, reference, 'LBody', loose)
}

/** PDF/UA-1, 7.18.5: a link says where it leads; Chromium leaves it out. */
function describeLinks(document: PDFDocument, names: ReadonlyMap<string, string>): void {
  for (const page of document.getPages()) {
    const annotations = page.node.Annots()
    for (let index = 0; index < (annotations?.size() ?? 0); index += 1) {
      const annotation = annotations?.lookup(index, PDFDict)
      if (annotation === undefined || annotation.get(PDFName.of('Subtype')) !== PDFName.of('Link')) continue
      annotation.set(PDFName.of('Contents'), PDFHexString.fromText(destination(annotation, names)))
    }
  }
}

function destination(annotation: PDFDict, names: ReadonlyMap<string, string>): string {
  const action = annotation.lookupMaybe(PDFName.of('A'), PDFDict)
  const address = action?.lookup(PDFName.of('URI'))
  if (address instanceof PDFString || address instanceof PDFHexString) return address.decodeText()
  const target = annotation.lookup(PDFName.of('Dest'))
  const id = target instanceof PDFName ? plainName(target.decodeText()) : ''
  return names.get(id) ?? id
}
