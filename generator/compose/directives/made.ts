import type { Directive } from './directive.ts'
import { checkMade } from './made-link.ts'

/** `:made{at="made-opinion"}`: a link to the paragraph that says how a figure is made. */
export const made: Directive = {
  type: 'textDirective', name: 'made', needs: ['at'], may: [],
  check: ({ node, attributes }, scope, context, reporter) => {
    checkMade(attributes['at'], node, context, reporter)
    return scope
  },
  fill: ({ attributes }, _scope, { words }) => [{
    type: 'link', url: `#${attributes['at']}`, children: [{ type: 'text', value: words.say('how-made') }], data: { hProperties: { className: ['made'] } },
  }],
}
