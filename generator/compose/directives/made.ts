import type { Directive } from './directive.ts'
import { standingInLine } from './elements.ts'
import { checkMade, madeAnchor } from './made-link.ts'

/** `:made{at="made-opinion"}`: a link to the paragraph that says how the figures of a section are made. */
export const made: Directive = {
  type: 'textDirective', name: 'made', needs: ['at'], may: [],
  check: ({ node, attributes }, scope, context, reporter) => {
    checkMade(attributes['at'], node, context, reporter)
    return scope
  },
  fill: ({ attributes }, _scope, { words }) => [standingInLine(madeAnchor(attributes['at'] ?? '', words))],
}
