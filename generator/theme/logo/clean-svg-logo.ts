import type { Element, Root } from 'xast'
import { fromXml } from 'xast-util-from-xml'
import { toXml } from 'xast-util-to-xml'
import { allowedAttributes, allowedElements, leftOut, presentation } from './svg-parts.ts'

/** What is wrong, with its line and column where it has one. */
export interface DrawingFault {
  readonly found: string
  readonly expected: string
  readonly mend: string
  readonly line?: number | undefined
  readonly column?: number | undefined
}

const mostElements = 5000
const deepest = 40

/**
 * A drawing with nothing in it but shapes and their colours, by a list of what may stay. What could run, load, or draw without end is refused, so that its maker
 * hears of it; what editors leave behind (metadata, their own names, comments) goes without a word.
 *
 * @param text - SVG as XML; no document type, so no entity but those of XML itself
 * @returns the drawing as XML
 */
export function cleanSvgLogo(text: string): string | readonly DrawingFault[] {
  const root = parsed(text)
  const svg = root?.children.find((node) => node.type === 'element')
  if (root === null || svg?.type !== 'element' || localName(svg) !== 'svg') return [{ found: 'text that is no SVG', expected: 'one well-formed svg element', mend: 'Export the logo again as plain SVG.' }]
  if (root.children.some((node) => node.type === 'doctype' || node.type === 'instruction' && node.name !== 'xml')) {
    return [{ found: 'a document type or an instruction', expected: 'an svg element alone', mend: 'Export the logo as plain SVG, without a document type, style sheet or entities.' }]
  }
  const size = sizeOf(svg)
  if (size === null) return [{ found: 'a drawing without a size', expected: 'a `viewBox` with a width and height above 0', mend: 'Export the logo with a viewBox.', ...placeOf(svg) }]
  const faults: DrawingFault[] = []
  const counted: Counted = { elements: 0, told: false }
  const cleaned = cleanElement(svg, 0, counted, faults)
  if (faults.length > 0) return faults
  const [width, height] = size.slice(2).map(String)
  return toXml({ ...cleaned, attributes: { ...cleaned.attributes, xmlns: 'http://www.w3.org/2000/svg', viewBox: size.join(' '), width, height } })
}

function parsed(text: string): Root | null {
  try {
    return fromXml(text)
  } catch {
    return null
  }
}

interface Counted { elements: number, told: boolean }

function cleanElement(element: Element, depth: number, counted: Counted, faults: DrawingFault[]): Element {
  counted.elements += 1
  if (depth > deepest || counted.elements > mostElements) {
    if (!counted.told) faults.push({ found: 'a drawing of very many parts', expected: `at most ${mostElements} elements, ${deepest} inside each other`, mend: 'Simplify the drawing.', ...placeOf(element) })
    counted.told = true
    return { ...element, attributes: {}, children: [] }
  }
  const children = element.children.flatMap((child): Element[] => {
    if (child.type !== 'element') return []
    const name = localName(child)
    if (name === null || leftOut.has(name)) return []
    if (allowedElements.has(name)) return [cleanElement(child, depth + 1, counted, faults)]
    faults.push({ found: `element \`${name}\``, expected: `shapes, gradients and clip paths: ${[...allowedElements].join(', ')}`, mend: mendOf(name), ...placeOf(child) })
    return []
  })
  const name = localName(element)!
  return { type: 'element', name, attributes: cleanAttributes(element, faults), children }
}

function mendOf(name: string): string {
  if (name === 'text' || name === 'tspan' || name === 'textPath') return 'Turn letters into paths: a logo brings no font.'
  if (name === 'style') return 'Export the logo with presentation attributes instead of a style sheet.'
  if (name === 'use' || name === 'symbol') return 'Expand copies before the export.'
  return 'Export the logo without it.'
}

function cleanAttributes(element: Element, faults: DrawingFault[]): Record<string, string> {
  const given = Object.entries(element.attributes).flatMap(([name, value]): (readonly [string, string])[] => (
    name === 'style' ? declarations(value ?? '') : [[name === 'xlink:href' ? 'href' : name, (value ?? '').trim()]]
  ))
  const kept: Record<string, string> = {}
  for (const [name, value] of given) {
    const fault = attributeFault(element, name, value)
    if (fault !== null) faults.push({ ...fault, ...placeOf(element) })
    else if (allowedAttributes.has(name) || name === 'href') kept[name] = value
  }
  return kept
}

/** Values are numbers, names, colours, paths and references to the drawing's own parts: no character that an address or another language needs. */
const plain = /^[\w\s.,#%()+-]*$/

function attributeFault(element: Element, name: string, value: string): DrawingFault | null {
  const own = 'Export the logo so that it refers to nothing but its own parts.'
  if (/^on/i.test(name)) return { found: `attribute \`${name}\` of \`${element.name}\``, expected: 'no script', mend: 'Export the logo without scripts.' }
  if (name === 'href') return /^#[\w.-]+$/.test(value) ? null : { found: `reference \`${value}\` of \`${element.name}\``, expected: 'a reference to a part of the drawing itself', mend: own }
  if (!allowedAttributes.has(name) && !/url\s*\(/i.test(value)) return null
  const unreferred = value.replace(/url\(\s*(['"]?)#[\w.-]+\1\s*\)/g, '')
  return plain.test(unreferred) && !/url|expression|import/i.test(unreferred) ? null : { found: `value \`${value}\` of \`${name}\``, expected: 'numbers, names, colours and references to the drawing itself', mend: own }
}

/** `fill:red;stroke:none` as attributes; what is no presentation of a shape is left out, unless it refers elsewhere. */
function declarations(style: string): (readonly [string, string])[] {
  return style.split(';').map((declaration) => declaration.split(/:(.*)/s).map((part) => part.trim()))
    .filter(([name, value]) => presentation.has(name) || /url\s*\(/i.test(value ?? ''))
    .map(([name, value]) => [name, value ?? ''] as const)
}

/** null for a name with another prefix than svg: an editor's own. */
function localName({ name }: Element): string | null {
  return name.startsWith('svg:') ? name.slice(4) : name.includes(':') ? null : name
}

function sizeOf({ attributes }: Element): readonly number[] | null {
  const box = attributes.viewBox?.trim().split(/[\s,]+/).map(Number) ?? [0, 0, Number.parseFloat(attributes.width ?? ''), Number.parseFloat(attributes.height ?? '')]
  const right = box.length === 4 && box.every((part) => Number.isFinite(part) && Math.abs(part) < 1e6) && box[2] > 0 && box[3] > 0
  return right ? box : null
}

function placeOf({ position }: Element): { readonly line?: number | undefined, readonly column?: number | undefined } {
  return { line: position?.start.line, column: position?.start.column }
}
