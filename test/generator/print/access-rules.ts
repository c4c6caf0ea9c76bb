import { PDFArray, PDFDict, PDFNumber, PDFRef, type PDFPage } from '@cantoo/pdf-lib'
import { operationsOf } from '../../../generator/print/content-stream.ts'
import { childrenOf, elementsOf, kidsOf, parentOf, roleOf, tagsOf, type Element } from '../../../generator/print/tags.ts'
import { annotationsOf, contentOf, dictionary, items, key, shownCodes, streamBytes, textOf, written, type OpenPdf, type Rule } from './pdf-objects.ts'

/** Standard structure types of ISO 32000-1, 14.8.4. */
const standard = new Set(`Document Part Art Sect Div BlockQuote Caption TOC TOCI Index NonStruct Private P H H1 H2 H3 H4 H5 H6 L LI Lbl LBody Table TR TH TD THead TBody TFoot
  Span Quote Note Reference BibEntry Code Link Annot Ruby RB RT RP Warichu WT WP Figure Formula Form`.split(/\s+/))

/** ISO 14289-1 (PDF/UA-1), as far as a program can tell and as it concerns what a print has. */
export const accessRules = {
  declared: { clause: 'PDF/UA-1 5, 6.2, 7.1, 7.2', faults: ({ document: { catalog } }) => [
    ...(written(dictionary(catalog.lookup(key('MarkInfo'))), 'Marked') === 'true' ? [] : ['not marked']),
    ...(written(dictionary(catalog.lookup(key('ViewerPreferences'))), 'DisplayDocTitle') === 'true' ? [] : ['title not shown']),
    ...((textOf(catalog.lookup(key('Lang'))) ?? '') !== '' ? [] : ['no language']),
  ] },
  content: { clause: 'PDF/UA-1 7.1', faults: ({ document }) => document.getPages().flatMap((page, at) => contentFaults(document, page).map((fault) => `page ${at + 1}: ${fault}`)) },
  roles: { clause: 'PDF/UA-1 7.1', faults: ({ document }) => {
    const map = document.catalog.lookup(key('StructTreeRoot'), PDFDict).lookupMaybe(key('RoleMap'), PDFDict)
    return [
      ...new Set(elementsOf(document).map(roleOf).filter((role) => !standard.has(role) && !standard.has(written(map, role).slice(1))).map((role) => `${role} is no role`)),
      ...(map?.keys() ?? []).map((role) => role.decodeText()).filter((role) => standard.has(role)).map((role) => `${role} is given another meaning`),
    ]
  } },
  figures: { clause: 'PDF/UA-1 7.3', faults: ({ document }) => withRole(document, 'Figure').filter((figure) => (textOf(figure.lookup(key('Alt'))) ?? '') === '').map(() => 'figure without alternative') },
  headings: { clause: 'PDF/UA-1 7.4', faults: ({ document }) => {
    const levels = inOrder(document).map((element) => /^H([1-6])$/.exec(roleOf(element))?.[1]).filter((level) => level !== undefined).map(Number)
    return levels.flatMap((level, at) => (level > (at === 0 ? 0 : levels[at - 1]) + 1 ? [`heading ${at + 1} skips to level ${level}`] : []))
  } },
  tables: { clause: 'PDF/UA-1 7.5', faults: ({ document }) => [
    ...withRole(document, 'Table').flatMap((table) => [...strangers(table, ['TR', 'THead', 'TBody', 'TFoot', 'Caption']), ...unevenRows(table)]),
    ...withRole(document, 'TR').flatMap((row) => strangers(row, ['TH', 'TD'])),
    ...withRole(document, 'TH').filter((cell) => !/\/Scope \/(Row|Column|Both)/.test(written(cell, 'A'))).map(() => 'header cell without scope'),
  ] },
  lists: { clause: 'PDF/UA-1 7.6', faults: ({ document }) => [
    ...withRole(document, 'L').flatMap((list) => strangers(list, ['LI', 'L', 'Caption'])), ...withRole(document, 'LI').flatMap((item) => strangers(item, ['Lbl', 'LBody'])),
    ...withRole(document, 'LBody').filter((body) => roleOf(parentOf(body)!) !== 'LI').map(() => 'body of no item'),
  ] },
  artifacts: { clause: 'PDF/UA-1 7.8', faults: ({ document }) => document.getPages().flatMap((page, at) => {
    const texts = [...contentOf(page).matchAll(/\/Artifact ([^\n]*?) ?B[DM]C\n([\s\S]*?)(?:\nEMC|\nET)/g)].filter(([, , painted]) => / T[jJ]/.test(painted))
    return texts.filter(([, kind]) => !kind.includes('/Pagination')).map(() => `page ${at + 1}: text that is neither running head nor read aloud`)
  }) },
  links: { clause: 'PDF/UA-1 7.18', faults: ({ document }) => document.getPages().flatMap((page, at) => annotationsOf(page).flatMap((annotation) => [
    ...(written(page.node, 'Tabs') === '/S' ? [] : [`page ${at + 1}: not read in the order of the structure`]),
    ...((textOf(annotation.lookup(key('Contents'))) ?? '') !== '' ? [] : [`page ${at + 1}: link without description`]),
    ...(isInLink(document, annotation) ? [] : [`page ${at + 1}: link in no Link`]),
  ])) },
  characters: { clause: 'PDF/UA-1 7.21', faults: ({ document }) => document.getPages().flatMap((page, at) => characterFaults(page).map((fault) => `page ${at + 1}: ${fault}`)) },
  bookmarks: { clause: 'PDF/UA-1 7.17', faults: ({ document }) => {
    const first = dictionary(document.catalog.lookup(key('Outlines')))?.lookup(key('First'))
    const pages = new Set(document.getPages().map(({ ref }) => ref.toString()))
    const entries = (entry: PDFDict | undefined): readonly PDFDict[] => (entry === undefined ? [] : [
      entry, ...entries(dictionary(entry.lookup(key('First')))), ...entries(dictionary(entry.lookup(key('Next')))),
    ])
    const found = entries(dictionary(first))
    const isPlace = (target: unknown) => target instanceof PDFArray && pages.has(target.get(0).toString())
    return found.length === 0 ? ['no bookmarks'] : found.filter((entry) => !isPlace(entry.lookup(key('Dest')))).map(() => 'bookmark to nowhere')
  } },
} as const satisfies Readonly<Record<string, Rule>>

function withRole(document: OpenPdf['document'], role: string): readonly Element[] {
  return elementsOf(document).filter((element) => roleOf(element) === role)
}

function inOrder(document: OpenPdf['document']): readonly Element[] {
  const below = (element: Element): readonly Element[] => childrenOf(element).flatMap((child) => [child, ...below(child)])
  return below(document.catalog.lookup(key('StructTreeRoot'), PDFDict))
}

/** Children, content of its own included, that an element may not have. */
function strangers(element: Element, roles: readonly string[]): readonly string[] {
  return kidsOf(element).map((kid) => dictionary(element.context.lookup(kid))).map((kid) => (kid === undefined || !kid.has(key('S')) ? 'content' : roleOf(kid)))
    .filter((role) => !roles.includes(role)).map((role) => `${role} in ${roleOf(element)}`)
}

function unevenRows(table: Element): readonly string[] {
  const span = (cell: Element) => Number(/\/ColSpan (\d+)/.exec(written(cell, 'A'))?.[1] ?? 1)
  // cells that reach down from the row above count in both
  const reaches = inTable(table).some((cell) => Number(/\/RowSpan (\d+)/.exec(written(cell, 'A'))?.[1] ?? 1) > 1)
  const widths = new Set(rowsOf(table).map((row) => childrenOf(row).reduce((sum, cell) => sum + span(cell), 0)))
  return widths.size > 1 && !reaches ? [`rows of ${[...widths].join(', ')} columns`] : []
}

function rowsOf(element: Element): readonly Element[] {
  return childrenOf(element).flatMap((child) => (roleOf(child) === 'TR' ? [child] : rowsOf(child)))
}

function inTable(table: Element): readonly Element[] {
  return rowsOf(table).flatMap(childrenOf)
}

/** Everything painted is an artifact or belongs to one element, which says so too. */
function contentFaults(document: OpenPdf['document'], page: PDFPage): readonly string[] {
  const content = contentOf(page)
  const tags = tagsOf(document, page)
  const faults: string[] = []
  let open: string[] = []
  for (const { operator, start, end } of operationsOf(content)) {
    if (operator === 'BDC' || operator === 'BMC') {
      const opened = content.slice(start, end)
      const number = Number(/\/MCID (\d+)/.exec(opened)?.[1] ?? -1)
      // a ligature is a span with its letters within the text; it is no mark of its own
      if (opened.startsWith('/Span') && number < 0 && open.length > 0) { open.push(''); continue }
      open.push(opened)
      if (number >= 0 && !claims(tags.elementOf(number), page, number)) faults.push(`content ${number} belongs to no element`)
      if (number < 0 && !opened.startsWith('/Artifact')) faults.push(`${opened} is neither text nor artifact`)
    } else if (operator === 'EMC') {
      if (open.length === 0) faults.push('closed without being opened')
      open = open.slice(0, -1)
    } else if (['Tj', 'TJ', 'f', 'f*', 'S', 's', 'B', 'b', 'Do', 'sh'].includes(operator) && open.filter(Boolean).length !== 1) faults.push(`${operator} in ${open.filter(Boolean).length} marks`)
  }
  return open.length === 0 ? faults : [...faults, 'left open']
}

function claims(element: Element | undefined, page: PDFPage, number: number): boolean {
  return element !== undefined && kidsOf(element).some((kid) => {
    const found = element.context.lookup(kid)
    if (found instanceof PDFNumber) return found.asNumber() === number && element.get(key('Pg')) === page.ref
    return found instanceof PDFDict && written(found, 'MCID') === String(number) && found.get(key('Pg')) === page.ref
  })
}

/** By the parent tree, and by the element's own list. */
function isInLink(document: OpenPdf['document'], annotation: PDFDict): boolean {
  const numbers = items(document.catalog.lookup(key('StructTreeRoot'), PDFDict).lookup(key('ParentTree'), PDFDict).lookup(key('Nums')))
  const at = numbers.findIndex((number, index) => index % 2 === 0 && number.toString() === written(annotation, 'StructParent'))
  const element = at < 0 ? undefined : dictionary(numbers[at + 1])
  return element !== undefined && roleOf(element) === 'Link' && kidsOf(element).some((kid) => {
    const reference = dictionary(element.context.lookup(kid))
    const target = reference?.get(key('Obj'))
    return written(reference, 'Type') === '/OBJR' && target instanceof PDFRef && document.context.lookup(target) === annotation
  })
}

/** Every code that is shown is a glyph, and has its character. */
function characterFaults(page: PDFPage): readonly string[] {
  const fonts = page.node.Resources()?.lookup(key('Font'), PDFDict)
  const maps = new Map<string, ReadonlyMap<number, string>>()
  const mapOf = (font: string) => {
    if (!maps.has(font)) maps.set(font, unicodeOf(streamBytes(fonts?.lookup(key(font), PDFDict).lookup(key('ToUnicode')))?.toString('latin1') ?? ''))
    return maps.get(font)!
  }
  return [...new Set(shownCodes(contentOf(page)).flatMap(({ font, codes }) => codes.flatMap((code) => [
    ...(code === 0 ? [`${font} shows .notdef`] : []),
    ...(['', '0000', 'FEFF', 'FFFE'].includes((mapOf(font).get(code) ?? '').toUpperCase()) ? [`${font} has no character for ${code}`] : []),
  ])))]
}

/** A ToUnicode map (ISO 32000-1, 9.10.3): code -> character, as hexadecimal. */
function unicodeOf(map: string): ReadonlyMap<number, string> {
  const characters = new Map<number, string>()
  for (const [, block] of map.matchAll(/beginbfchar([\s\S]*?)endbfchar/g)) {
    for (const [, code, character] of block.matchAll(/<(\w+)>\s*<(\w+)>/g)) characters.set(parseInt(code, 16), character)
  }
  for (const [, block] of map.matchAll(/beginbfrange([\s\S]*?)endbfrange/g)) {
    for (const [, low, high, first] of block.matchAll(/<(\w+)>\s*<(\w+)>\s*<(\w+)>/g)) {
      for (let code = parseInt(low, 16); code <= parseInt(high, 16); code += 1) {
        characters.set(code, (parseInt(first, 16) + code - parseInt(low, 16)).toString(16).padStart(4, '0'))
      }
    }
  }
  return characters
}
