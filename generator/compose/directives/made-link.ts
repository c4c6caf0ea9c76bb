import type { ElementContent } from 'hast'
import { h } from 'hastscript'
import type { Words } from '../../words/words.ts'
import { nearest } from '../faults.ts'
import type { Reporter } from '../faults.ts'
import type { CheckContext, DirectiveNode } from './directive.ts'

/** Check that `made` names a place of the document. */
export function checkMade(made: string | undefined, node: DirectiveNode, context: CheckContext, reporter: Reporter): void {
  if (made === undefined || context.anchors.has(made)) return
  reporter.report(node, 'anchor-unknown', `anchor "${made}"`, 'the message of a heading or the name of a section', nearest(made, [...context.anchors]))
}

/** A link to the paragraph that says how a figure is made. */
export function madeLink(made: string | undefined, words: Words): readonly ElementContent[] {
  return made === undefined ? [] : [{ type: 'text', value: ' ' }, h('a.made', { href: `#${made}` }, words.say('how-made'))]
}
