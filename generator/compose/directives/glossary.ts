import { h } from 'hastscript'
import { checkMessage } from '../check-message.ts'
import type { Directive, Use } from './directive.ts'
import { standing } from './elements.ts'

/** `::glossary{terms="mention, venue"}`: each term with its meaning, from the messages `term-NAME` and `term-NAME-means`. */
export const glossary: Directive = {
  type: 'leafDirective', name: 'glossary', needs: ['terms'], may: [],
  check: (use, scope, context, reporter) => {
    for (const message of termsOf(use).flatMap(messagesOf)) checkMessage(message, scope, context, use.node, reporter)
    return scope
  },
  fill: (use, _scope, { words }) => [standing(h('dl.glossary', termsOf(use).map((term) => {
    const [name, means] = messagesOf(term)
    return h('div', [h('dt', words.say(name)), h('dd', words.say(means))])
  })))],
}

function termsOf({ attributes }: Use): readonly string[] {
  return (attributes['terms'] ?? '').split(',').map((term) => term.trim())
}

function messagesOf(term: string): readonly [string, string] {
  return [`term-${term}`, `term-${term}-means`]
}
