import type { Element, ElementContent, Root as HtmlRoot, RootContent as HtmlContent } from 'hast'
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

/**
 * A link to a place that did not appear this time becomes plain text; where it is all that its paragraph says, or only says where something is made, it
 * falls away.
 */
export function rehypeNoDanglingLinks() {
  return (tree: HtmlRoot): undefined => {
    const ids = new Set<unknown>()
    visit(tree, 'element', (element) => void ids.add(element.properties['id']))
    const dangles = (node: HtmlContent) => {
      const href = node.type === 'element' && node.tagName === 'a' ? node.properties['href'] : undefined
      return typeof href === 'string' && href.startsWith('#') && !ids.has(href.slice(1))
    }
    const pointsOnly = (node: HtmlContent) => dangles(node) && node.type === 'element' && [node.properties['className']].flat().includes('made')
    visit(tree, 'element', (element, index, parent) => {
      const fallen = element.children.filter(pointsOnly)
      const blank = (node: HtmlContent) => node.type === 'text' && node.value.trim() === ''
      if (element.tagName === 'p' && element.children.some(dangles) && element.children.every((node) => dangles(node) || blank(node)) && parent && index !== undefined) {
        parent.children.splice(index, 1)
        return index
      }
      if (fallen.length > 0) element.children = withoutSpaceAtEnd(element.children.filter((node) => !pointsOnly(node)))
      if (!dangles(element)) return undefined
      element.tagName = 'span'
      element.properties = {}
      return undefined
    })
  }
}

/** The space before a link that has fallen away. */
function withoutSpaceAtEnd(nodes: readonly ElementContent[]): ElementContent[] {
  const last = nodes.at(-1)
  return last?.type === 'text' ? [...nodes.slice(0, -1), { ...last, value: last.value.trimEnd() }] : [...nodes]
}
