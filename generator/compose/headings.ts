import type { Element, ElementContent, Root as HtmlRoot } from 'hast'
import { h } from 'hastscript'
import { toString } from 'hast-util-to-string'
import type { Heading as MarkdownHeading, Root, RootContent } from 'mdast'
import rehypeSlug from 'rehype-slug'
import { unified } from 'unified'
import { visit } from 'unist-util-visit'
import type { Heading } from './document.ts'

/** The message that words a heading, which is also its id; undefined where it is plain text. */
export function messageOfHeading(heading: MarkdownHeading): string | undefined {
  const say = heading.children.find((child) => child.type === 'textDirective' && child.name === 'say')
  return say?.type === 'textDirective' ? say.attributes?.['message'] ?? undefined : undefined
}

/** Ids of the headings of a template file: the name of the message, or what becomes of plain words. */
export function anchorsOf(tree: Root): readonly string[] {
  const anchors: string[] = []
  visit(tree, 'heading', (heading) => void anchors.push(messageOfHeading(heading) ?? slugOf(plainText(heading))))
  return anchors
}

/** The text of a node without its marks. */
export function plainText(node: RootContent): string {
  if ('value' in node) return node.value
  return 'children' in node ? node.children.map(plainText).join('') : ''
}

function slugOf(words: string): string {
  const tree: HtmlRoot = { type: 'root', children: [h('h2', words)] }
  unified().use(rehypeSlug).runSync(tree)
  return headingsOf(tree)[0]?.id ?? ''
}

/** The headings of a finished tree, in order. */
export function headingsOf(tree: HtmlRoot): readonly Heading[] {
  const headings: Heading[] = []
  visit(tree, 'element', (element) => {
    const depth = depthOf(element)
    if (depth !== undefined) headings.push({ depth, id: String(element.properties['id'] ?? ''), text: toString(element) })
  })
  return headings
}

function depthOf(element: Element): number | undefined {
  const [, depth] = /^h([1-6])$/.exec(element.tagName) ?? []
  return depth === undefined ? undefined : Number(depth)
}

/** Give each id once: a heading inside a repeated block gets `-2`, `-3`, ... */
export function rehypeUniqueIds() {
  return (tree: HtmlRoot): undefined => {
    const seen = new Map<string, number>()
    visit(tree, 'element', (element) => {
      const id = element.properties['id']
      if (typeof id !== 'string') return
      const times = (seen.get(id) ?? 0) + 1
      seen.set(id, times)
      if (times > 1) element.properties['id'] = `${id}-${times}`
    })
  }
}

/** Fill `::contents` with the headings of sections (second level) that follow it; each line has a place for a page number. */
export function rehypeContents() {
  return (tree: HtmlRoot): undefined => {
    let contents: Element | undefined
    const entries: ElementContent[] = []
    visit(tree, 'element', (element) => {
      if (element.tagName === 'nav') contents = element
      else if (contents && element.tagName === 'h2') entries.push(h('li', [h('a', { href: `#${String(element.properties['id'])}` }, [h('span.entry', toString(element)), h('span.page')])]))
    })
    if (contents) contents.children = [h('ol', entries)]
  }
}

/** A link to a place that did not appear this time becomes plain text. */
export function rehypeNoDanglingLinks() {
  return (tree: HtmlRoot): undefined => {
    const ids = new Set<unknown>()
    visit(tree, 'element', (element) => void ids.add(element.properties['id']))
    visit(tree, 'element', (element) => {
      const { href } = element.properties
      if (element.tagName !== 'a' || typeof href !== 'string' || !href.startsWith('#') || ids.has(href.slice(1))) return
      element.tagName = 'span'
      element.properties = {}
    })
  }
}
