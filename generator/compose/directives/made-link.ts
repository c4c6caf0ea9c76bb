import type { Element, ElementContent } from 'hast'
import { h } from 'hastscript'
import type { Words } from '../../words/words.ts'
import { nearest } from '../faults.ts'
import type { Reporter } from '../faults.ts'
import type { CheckContext, DirectiveNode } from './directive.ts'

/** Check that `made` names a place of the document. */
export function checkMade(made: string | undefined, node: DirectiveNode, context: CheckContext, reporter: Reporter): void {
  if (made === undefined || context.anchors.has(made)) return
  if (context.leftOut.has(made)) {
    reporter.fault(node, 'anchor-left-out', { anchor: made })
    return
  }
  reporter.report(node, 'anchor-unknown', `anchor "${made}"`, 'the message of a heading or the name of a section', nearest(made, [...context.anchors]))
}

/** Stands in the wording where only the printer knows the number. */
const pageMark = '⟨page⟩'

/** A link to the paragraph that says how figures are made; on paper with the page on which it stands, which the printer fills in. */
export function madeAnchor(made: string, words: Words): Element {
  const [before, after] = words.say('how-made-page', { page: pageMark }).split(pageMark)
  return h('a.made', { href: `#${made}` }, [words.say('how-made'), h('span.on-paper', [before, h('span.page'), after])])
}

/** The link after a caption. */
export function madeLink(made: string | undefined, words: Words): readonly ElementContent[] {
  return made === undefined ? [] : [{ type: 'text', value: ' ' }, madeAnchor(made, words)]
}
