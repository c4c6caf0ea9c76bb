import { PDFArray, PDFDict, PDFName, PDFNull, PDFNumber, type PDFRef, type PDFDocument, type PDFObject, type PDFPage } from '@cantoo/pdf-lib'

/** An element of the structure tree (ISO 32000-1, 14.7.2), as the dictionary that it is in the file. */
export type Element = PDFDict

export function roleOf(element: Element): string {
  const role = element.get(PDFName.of('S'))
  return role instanceof PDFName ? role.decodeText() : ''
}

/** Every element of the structure tree. */
export function elementsOf(document: PDFDocument): readonly Element[] {
  return document.context.enumerateIndirectObjects().flatMap(([, object]) => (
    object instanceof PDFDict && object.get(PDFName.of('Type')) === PDFName.of('StructElem') ? [object] : []))
}

/** Children of an element as they are listed: references to elements, numbers of marked content, references to marked content or objects. */
export function kidsOf(element: Element): readonly PDFObject[] {
  const kids = element.lookup(PDFName.of('K'))
  return kids instanceof PDFArray ? kids.asArray() : kids === undefined ? [] : [element.get(PDFName.of('K'))!]
}

/** The elements below an element, without content. */
export function childrenOf(element: Element): readonly Element[] {
  return kidsOf(element).map((kid) => element.context.lookup(kid)).filter((kid): kid is Element => kid instanceof PDFDict && kid.has(PDFName.of('S')))
}

export function parentOf(element: Element): Element | undefined {
  return element.lookupMaybe(PDFName.of('P'), PDFDict)
}

/** The tagged content of one page: which element each sequence of marked content belongs to, and how to take a sequence out of the text. */
export interface PageTags {
  elementOf(content: number): Element | undefined
  /** Whether the content continues an element that begins on an earlier page. */
  continues(content: number): boolean
  /** The content belongs to no element any more. */
  release(content: number): void
}

/** @returns the tagged content of a page, by the parent tree (ISO 32000-1, 14.7.4.4) */
export function tagsOf(document: PDFDocument, page: PDFPage): PageTags {
  const number = page.node.lookupMaybe(PDFName.of('StructParents'), PDFNumber)?.asNumber()
  const owners = number === undefined ? undefined : ownersOf(document, number)
  const elementOf = (content: number) => {
    const owner = owners?.lookup(content)
    return owner instanceof PDFDict ? owner : undefined
  }
  const isHere = (element: Element, kid: PDFObject, content: number): boolean => {
    const found = element.context.lookup(kid)
    if (found instanceof PDFNumber) return found.asNumber() === content && element.get(PDFName.of('Pg')) === page.ref
    return isReference(found) && found.lookup(PDFName.of('MCID'), PDFNumber).asNumber() === content && found.get(PDFName.of('Pg')) === page.ref
  }
  return {
    elementOf,
    continues: (content) => {
      const element = elementOf(content)
      return element !== undefined && kidsOf(element).findIndex((kid) => isHere(element, kid, content)) > 0
    },
    release: (content) => {
      const element = elementOf(content)
      if (element === undefined) return
      element.set(PDFName.of('K'), element.context.obj(kidsOf(element).filter((kid) => !isHere(element, kid, content))))
      owners?.set(content, PDFNull)
    },
  }
}

function isReference(object: PDFObject | undefined): object is PDFDict {
  return object instanceof PDFDict && object.get(PDFName.of('Type')) === PDFName.of('MCR')
}

/** Chromium writes the parent tree as one list of numbers and what they stand for. */
function ownersOf(document: PDFDocument, key: number): PDFArray | undefined {
  const root = document.catalog.lookupMaybe(PDFName.of('StructTreeRoot'), PDFDict)
  const numbers = root?.lookupMaybe(PDFName.of('ParentTree'), PDFDict)?.lookupMaybe(PDFName.of('Nums'), PDFArray)
  for (let at = 0; at + 1 < (numbers?.size() ?? 0); at += 2) {
    if (numbers!.lookup(at, PDFNumber).asNumber() !== key) continue
    const owners = numbers!.lookup(at + 1)
    return owners instanceof PDFArray ? owners : undefined
  }
  return undefined
}

/** Put an element between another and some of its children. */
export function wrap(element: Element, reference: PDFRef, role: string, kids: readonly PDFObject[]): void {
  const { context } = element
  const wrapper = context.register(context.obj({ Type: 'StructElem', S: role, P: reference, K: [...kids] }))
  for (const kid of kids) {
    const child = context.lookup(kid)
    if (child instanceof PDFDict && child.has(PDFName.of('P'))) child.set(PDFName.of('P'), wrapper)
  }
  element.set(PDFName.of('K'), context.obj([...kidsOf(element).filter((kid) => !kids.includes(kid)), wrapper]))
}
