import { argumentsFor } from '../sentences.ts'
import { checkMessage } from '../check-message.ts'
import type { Directive } from './directive.ts'
import { text } from './elements.ts'

/** `:say{message="opinion-headline"}`: a worded sentence; `sentences.yaml` says which figures it is given. */
export const say: Directive = {
  type: 'textDirective', name: 'say', needs: ['message'], may: [],
  check: ({ node, attributes }, scope, context, reporter) => {
    checkMessage(attributes['message'] ?? '', scope, context, node, reporter)
    return scope
  },
  fill: ({ attributes }, scope, { words, sentences }) => {
    const message = attributes['message'] ?? ''
    return [text(words.say(message, argumentsFor(sentences.get(message), scope, words)))]
  },
}
