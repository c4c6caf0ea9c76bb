import { h } from 'hastscript'
import type { Directive } from './directive.ts'
import { standing } from './elements.ts'

/** `::contents`: the place of the table of contents; filled once the headings are known. */
export const contents: Directive = {
  type: 'leafDirective', name: 'contents', needs: [], may: [],
  check: (_use, scope) => scope,
  fill: (_use, _scope, { words }) => [standing(h('nav.contents', { ariaLabel: words.say('contents') }))],
}
