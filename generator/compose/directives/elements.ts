import type { Element, ElementContent, Properties } from 'hast'
import type { BlockContent, DefinitionContent, PhrasingContent, RootContent } from 'mdast'
import type { ContainerDirective, TextDirective } from './directive.ts'

/** Untrusted or worded text enters the tree here, as a text node: nothing parses it. */
export function text(value: string | number): PhrasingContent {
  return { type: 'text', value: String(value) }
}

/** A block of the template that becomes an HTML element around its own children. */
export function wrapped(tagName: string, properties: Properties, children: readonly RootContent[]): ContainerDirective {
  const content = children as readonly (BlockContent | DefinitionContent)[]
  return { type: 'containerDirective', name: tagName, children: [...content], data: { hName: tagName, hProperties: properties } }
}

/** A ready HTML element in a line of the Markdown tree. */
export function standingInLine(element: Element): TextDirective {
  const { tagName, properties, children } = element
  return { type: 'textDirective', name: tagName, children: [], data: { hName: tagName, hProperties: properties, hChildren: children as ElementContent[] } }
}

/** A ready HTML element as a block of the Markdown tree. */
export function standing(element: Element): ContainerDirective {
  const { tagName, properties, children } = element
  return { type: 'containerDirective', name: tagName, children: [], data: { hName: tagName, hProperties: properties, hChildren: children as ElementContent[] } }
}
