import { PDFArray, PDFDict, PDFDocument, PDFHexString, PDFName, PDFNumber, PDFRef, PDFString } from '@cantoo/pdf-lib'

/** An element of a tagged PDF: its role, its text alternative, the pages on which its content stands, its children. */
export interface Tagged {
  readonly role: string
  readonly alt: string | undefined
  readonly pages: ReadonlySet<string>
  readonly children: readonly Tagged[]
}

export async function readStructure(pdf: Uint8Array): Promise<Tagged> {
  const document = await PDFDocument.load(pdf, { updateMetadata: false })
  return readElement(document.catalog.lookup(PDFName.of('StructTreeRoot'), PDFDict), undefined)
}

function readElement(element: PDFDict, page: string | undefined): Tagged {
  const own = element.get(PDFName.of('Pg'))
  const standsOn = own instanceof PDFRef ? own.toString() : page
  const kids = element.lookup(PDFName.of('K'))
  const list = kids instanceof PDFArray ? kids.asArray().map((kid) => element.context.lookup(kid)) : kids === undefined ? [] : [kids]
  const children: Tagged[] = []
  const pages = new Set<string>()
  for (const kid of list) {
    if (kid instanceof PDFNumber && standsOn !== undefined) pages.add(standsOn)
    if (!(kid instanceof PDFDict)) continue
    const type = kid.get(PDFName.of('Type'))
    if (type === PDFName.of('MCR') || type === PDFName.of('OBJR')) {
      const on = kid.get(PDFName.of('Pg'))
      pages.add(on instanceof PDFRef ? on.toString() : String(standsOn))
    } else children.push(readElement(kid, standsOn))
  }
  for (const child of children) for (const on of child.pages) pages.add(on)
  const alt = element.lookup(PDFName.of('Alt'))
  const role = element.get(PDFName.of('S'))
  return {
    role: role instanceof PDFName ? role.decodeText() : 'Root',
    alt: alt instanceof PDFString || alt instanceof PDFHexString ? alt.decodeText() : undefined,
    pages, children,
  }
}

export function withRole(root: Tagged, role: string): readonly Tagged[] {
  return [...(root.role === role ? [root] : []), ...root.children.flatMap((child) => withRole(child, role))]
}

/** Elements of these roles whose content stands on more than one page. */
export function cutInTwo(root: Tagged, roles: readonly string[]): readonly Tagged[] {
  return roles.flatMap((role) => withRole(root, role)).filter((element) => element.pages.size > 1)
}
