import type { RootContent } from 'mdast'
import { nearest } from '../faults.ts'
import type { Reporter } from '../faults.ts'
import type { TypeScope } from '../path-types.ts'
import type { CheckContext, Directive, Use } from './directive.ts'

/**
 * `::house{from="venues" to="survey" without="topics, coder"}`: the house's own sections in the house's order, so that a review has also those
 * that a later version adds. A section that is a file of the account stands in the place of the house's.
 */
export const house: Directive = {
  type: 'leafDirective', name: 'house', needs: [], may: ['from', 'to', 'without'],
  check: (use, scope, context, reporter) => {
    const { node, attributes } = use
    const known = sectionsIn(context.house)
    const { from, to } = attributes
    const unknown = [from, to, ...leftOut(use)].filter((name) => name !== undefined).filter((name) => !known.includes(name))
    for (const name of unknown) reporter.report(node, 'section-unknown', `section "${name}"`, 'a section of the house', nearest(name, known))
    if (unknown.length > 0) return scope
    if (context.inSection !== null) reporter.report(node, 'section-nested', 'sections of the house inside a section', 'them in the list of the review', 'Move it there.')
    else if (from !== undefined && to !== undefined && known.indexOf(from) > known.indexOf(to)) reporter.fault(node, 'house-order', { from, to })
    else checkChosen(chosen(use, context.house), use, scope, context, reporter)
    return scope
  },
  fill: (use, scope, context) => context.fill(chosen(use, context.house), scope, context.reporter),
}

/** Sections that stand in the review already are told in one fault, and nothing else of them. */
function checkChosen(nodes: readonly RootContent[], { node }: Use, scope: TypeScope, context: CheckContext, reporter: Reporter): void {
  const twice = sectionsIn(nodes).filter((name) => context.calls.sections.has(name))
  if (twice.length > 0) reporter.fault(node, 'section-twice', { name: twice.join(', ') })
  const isTold = (part: RootContent) => twice.some((name) => name === sectionOf(part)) || (twice.length > 0 && part.type === 'leafDirective' && part.name === 'notes')
  context.check(nodes.filter((part) => !isTold(part)), scope, context, reporter.at(node))
}

/** What stands between two sections of the house goes with the first of them. */
function chosen(use: Use, review: readonly RootContent[]): readonly RootContent[] {
  const { from, to } = use.attributes
  const names = review.map(sectionOf)
  const first = from === undefined ? 0 : names.indexOf(from)
  const after = to === undefined ? -1 : names.findIndex((name, at) => name !== undefined && at > names.indexOf(to))
  const left = leftOut(use)
  return review.slice(first, after < 0 ? undefined : after).filter((node) => !left.some((name) => name === sectionOf(node)))
}

function sectionsIn(review: readonly RootContent[]): readonly string[] {
  return review.map(sectionOf).filter((name) => name !== undefined)
}

function sectionOf(node: RootContent): string | undefined {
  return node.type === 'leafDirective' && node.name === 'section' ? node.attributes?.['name'] ?? undefined : undefined
}

function leftOut({ attributes }: Use): readonly string[] {
  return (attributes['without'] ?? '').split(',').map((name) => name.trim()).filter((name) => name !== '')
}
