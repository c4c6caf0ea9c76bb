import { checkCondition } from '../check-paths.ts'
import { holds, parseCondition } from '../condition.ts'
import { readCondition } from '../read-selection.ts'
import type { Directive } from './directive.ts'

/** `:::when{that="opinion.previous exists"}`: its block, if the condition holds; see condition.ts for what may be asked. */
export const when: Directive = {
  type: 'containerDirective', name: 'when', needs: ['that'], may: [],
  check: ({ node, attributes }, scope, _context, reporter) => {
    const condition = readCondition(attributes['that'] ?? '', node, reporter)
    if (condition) checkCondition(condition, scope, node, reporter)
    return scope
  },
  fill: ({ attributes }, scope, _context, children) => {
    const condition = parseCondition(attributes['that'] ?? '')
    return condition && holds(condition, scope) ? children(scope) : []
  },
}
