import type { Heading, Root, RootContent } from 'mdast'
import { attributesOf, isDirective } from './check-template.ts'
import { directiveOf } from './directives/all.ts'
import type { FillContext } from './directives/directive.ts'
import { messageOfHeading } from './headings.ts'
import { joinLists } from './directives/join-lists.ts'
import type { Scope } from './path.ts'

/** The tree with every directive replaced by what it stands for; the tree given stays as it is. */
export function fillTree(tree: Root, scope: Scope, context: FillContext): Root {
  return { ...tree, children: [...fillNodes(tree.children, scope, context)] }
}

/** Fill nodes that stand beside each other; lists that then do are one. */
export function fillNodes(nodes: readonly RootContent[], scope: Scope, context: FillContext): readonly RootContent[] {
  return joinLists(nodes.flatMap((node) => fillNode(node, scope, context)))
}

function fillNode(node: RootContent, scope: Scope, context: FillContext): readonly RootContent[] {
  if (isDirective(node)) {
    const children = (inner: Scope) => fillNodes(node.children, inner, context)
    return directiveOf(node)?.fill({ node, attributes: attributesOf(node) }, scope, context, children) ?? []
  }
  if (!('children' in node)) return [node]
  const filled = { ...node, children: [...fillNodes(node.children, scope, context)] } as RootContent
  return [node.type === 'heading' ? withId(filled as Heading, node) : filled]
}

/** A heading is found by the name of its message, which no language changes. */
function withId(filled: Heading, source: Heading): Heading {
  const id = messageOfHeading(source)
  return id === undefined ? filled : { ...filled, data: { ...filled.data, hProperties: { id } } }
}
