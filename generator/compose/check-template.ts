import type { Root, RootContent } from 'mdast'
import type { Fault } from '../faults/fault.ts'
import { directiveOf, formOf, namesOf } from './directives/all.ts'
import type { CheckContext, Directive, DirectiveNode } from './directives/directive.ts'
import { createReporter, nearest } from './faults.ts'
import type { Reporter } from './faults.ts'
import type { TypeScope } from './path-types.ts'

/** Everything that is wrong in one file of a template, whatever the findings of the month. */
export function checkTree(tree: Root, place: string, scope: TypeScope, context: CheckContext): readonly Fault[] {
  const faults: Fault[] = []
  checkNodes(tree.children, scope, context, createReporter(place, faults))
  return faults
}

/** Check nodes that stand beside each other. */
export function checkNodes(nodes: readonly RootContent[], scope: TypeScope, context: CheckContext, reporter: Reporter): void {
  for (const node of nodes) checkNode(node, scope, context, reporter)
}

function checkNode(node: RootContent, scope: TypeScope, context: CheckContext, reporter: Reporter): void {
  if (isDirective(node)) {
    checkNodes(node.children, checkDirective(node, scope, context, reporter), context, reporter)
    return
  }
  checkProse(node, context, reporter)
  if ('children' in node) checkNodes(node.children, scope, context, reporter)
}

/** What Markdown can say and a review can't. */
function checkProse(node: RootContent, context: CheckContext, reporter: Reporter): void {
  if (node.type === 'html') reporter.report(node, 'html-in-template', 'raw HTML', 'Markdown and directives', 'Remove it; a block like :::note gives a place in the design.')
  if (node.type === 'image' || node.type === 'imageReference') reporter.report(node, 'image-in-template', 'a picture', 'charts only', 'Remove it: a review holds no picture from elsewhere; figures are drawn by ::chart.')
  if (node.type === 'link' || node.type === 'definition') checkAddress(node, context, reporter)
  if (node.type === 'footnoteDefinition') reporter.fault(node, 'footnote-in-template', {})
  if (node.type === 'heading' && node.depth > deepestHeading) reporter.fault(node, 'heading-deep', { depth: node.depth })
}

const deepestHeading = 4

function checkAddress(node: RootContent & { readonly url: string }, context: CheckContext, reporter: Reporter): void {
  const { url } = node
  if (url.startsWith('#')) {
    const anchor = url.slice(1)
    if (context.leftOut.has(anchor)) reporter.fault(node, 'anchor-left-out', { anchor })
    else if (!context.anchors.has(anchor)) reporter.report(node, 'anchor-unknown', `anchor "${anchor}"`, 'the message of a heading or the name of a section', nearest(anchor, [...context.anchors]))
  } else if (!/^(https?:\/\/|mailto:)/i.test(url)) {
    reporter.report(node, 'address-unfit', `address "${url}"`, 'https:, http:, mailto: or a place in the document', 'Give a whole https address.')
  }
}

function checkDirective(node: DirectiveNode, scope: TypeScope, context: CheckContext, reporter: Reporter): TypeScope {
  const directive = directiveOf(node)
  if (!directive) {
    const form = formOf(node.name)
    const mend = form === undefined ? nearest(node.name, namesOf(node.type)) : `Write ${form}: the number of colons says whether it stands in a line, on a line of its own, or around a block.`
    reporter.report(node, 'directive-unknown', `directive "${node.name}"`, `a ${typeWords[node.type]}`, mend)
    return scope
  }
  if (context.inNote && node.name !== 'figure') {
    reporter.fault(node, 'note-directive', { name: node.name })
    return scope
  }
  return checkAttributes(node, directive, reporter) ? directive.check({ node, attributes: attributesOf(node) }, scope, context, reporter) : scope
}

const typeWords = { textDirective: 'directive in a line (:name)', leafDirective: 'directive on its own line (::name)', containerDirective: 'block (:::name)' } as const

function checkAttributes(node: DirectiveNode, { name, needs, may }: Directive, reporter: Reporter): boolean {
  const given = Object.keys(attributesOf(node))
  const missing = needs.filter((key) => !given.includes(key))
  const unknown = given.filter((key) => !needs.includes(key) && !may.includes(key))
  for (const key of missing) reporter.report(node, 'attribute-missing', `"${name}" without "${key}"`, `${key}="..."`, `Add ${key}="...".`)
  for (const key of unknown) reporter.report(node, 'attribute-unknown', `attribute "${key}" of "${name}"`, 'a known attribute', nearest(key, [...needs, ...may]))
  return missing.length === 0 && unknown.length === 0
}

export function isDirective(node: RootContent): node is DirectiveNode {
  return node.type === 'textDirective' || node.type === 'leafDirective' || node.type === 'containerDirective'
}

/** A directive's attributes; one without a value counts as an empty text. */
export function attributesOf(node: DirectiveNode): Readonly<Record<string, string>> {
  return Object.fromEntries(Object.entries(node.attributes ?? {}).map(([key, value]) => [key, value ?? '']))
}
