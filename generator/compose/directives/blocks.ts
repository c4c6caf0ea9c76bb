import { checkForm } from '../check-paths.ts'
import { lookUp, parsePath } from '../path.ts'
import { readPath } from '../read-selection.ts'
import type { Directive } from './directive.ts'
import { wrapped } from './elements.ts'

/** Blocks that only give their content a place in the design: `:::keyfigures` becomes `<div class="keyfigures">`. */
const blockNames = ['overline', 'lead', 'reading', 'keyfigures', 'keyfigure', 'note', 'method', 'caveat', 'item'] as const

/** `is="caveat.severity"` adds a class from the findings: `<div class="caveat is-serious">`. */
export const blocks: readonly Directive[] = blockNames.map((name) => ({
  type: 'containerDirective', name, needs: [], may: ['is'],
  check: ({ node, attributes }, scope, _context, reporter) => {
    const path = attributes['is'] === undefined ? undefined : readPath(attributes['is'], node, reporter)
    if (path) checkForm(path, 'text', scope, node, reporter)
    return scope
  },
  fill: ({ attributes }, scope, _context, children) => [wrapped('div', { className: [name, ...classOf(attributes['is'], scope)] }, children(scope))],
}))

function classOf(path: string | undefined, scope: Parameters<typeof lookUp>[1]): readonly string[] {
  const value = path === undefined ? undefined : lookUp(parsePath(path) ?? [], scope)
  return typeof value === 'string' && /^[a-z-]+$/.test(value) ? [`is-${value}`] : []
}
